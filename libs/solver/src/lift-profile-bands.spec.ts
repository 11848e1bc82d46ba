import { readNetworkFile, type NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { liftProfile } from './lift-profile';
import { liftProfileBands } from './lift-profile-bands';
import { isRefusal, solveNetwork } from './solve-network';

// A trap, a junction where a second trap joins, a rise of 6.7 m in two pieces, a vessel held at 15 psig.
const file = read({
  format: 'riseback-network',
  version: 1,
  name: 'Bands along a way',
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 1.5, inletPressurePa: 618_000, loadKgS: 0.12 },
    { id: 'T2', kind: 'trap', elevationM: 1.5, inletPressurePa: 1_135_000, loadKgS: 0.2 },
    { id: 'J1', kind: 'junction', elevationM: 1.2 },
    { id: 'V1', kind: 'flashVessel', elevationM: 7.9, pressurePa: 204_700 },
    { id: 'R1', kind: 'receiver', elevationM: 1, vented: true },
  ],
  pipes: [
    { id: 'L1', from: 'T1', to: 'J1', lengthM: 12, size: { nps: '1', schedule: '80' } },
    { id: 'L2', from: 'T2', to: 'J1', lengthM: 5, size: { nps: '1-1/4', schedule: '80' } },
    {
      id: 'L3',
      from: 'J1',
      to: 'V1',
      lengthM: 60,
      size: { nps: '2', schedule: '80' },
      route: [
        { lengthM: 20, riseM: 0 },
        { lengthM: 6.7, riseM: 6.7 },
        { lengthM: 33.3, riseM: 0 },
      ],
    },
    { id: 'L4', from: 'V1', to: 'R1', lengthM: 20, size: { nps: '2', schedule: '80' } },
  ],
});

describe('liftProfileBands', () => {
  const solved = solveNetwork(file, { partial: false, bands: true });
  if (isRefusal(solved)) throw new Error(JSON.stringify(solved));

  it.each(['T1', 'T2'])('meets the bands that the solve gives %s, which are computed by another way', (id) => {
    const trap = solved.traps.find((one) => one.id === id);
    const [atTrap] = liftProfileBands(file, solved, id) ?? [];
    expect(relativeError(atTrap?.spreadLowPa ?? 0, trap?.spread?.lowPa ?? 1)).toBeLessThan(1e-6);
    expect(relativeError(atTrap?.spreadHighPa ?? 0, trap?.spread?.highPa ?? 1)).toBeLessThan(1e-6);
    expect(relativeError(atTrap?.credibleLowPa ?? 0, trap?.credible?.lowPa ?? 1)).toBeLessThan(1e-6);
    expect(relativeError(atTrap?.credibleHighPa ?? 0, trap?.credible?.highPa ?? 1)).toBeLessThan(1e-6);
  });

  it('has a band for each point of the profile, none at the vessel, and the chosen method within the spread all along', () => {
    const points = liftProfile(file, solved, 'T1');
    const bands = liftProfileBands(file, solved, 'T1') ?? [];
    expect(bands.length).toBe(points.length);
    expect(bands.at(-1)).toEqual({
      spreadLowPa: 204_700,
      spreadHighPa: 204_700,
      credibleLowPa: 204_700,
      credibleHighPa: 204_700,
    });
    points.forEach(({ pressurePa }, i) => {
      // the profile is marched once more, to the march's own tolerance
      expect(pressurePa).toBeGreaterThanOrEqual((bands[i]?.spreadLowPa ?? Infinity) - 1);
      expect(pressurePa).toBeLessThanOrEqual((bands[i]?.spreadHighPa ?? -Infinity) + 1);
    });
  });

  it('answers nothing for a trap that the result does not have', () => {
    expect(liftProfileBands(file, solved, 'T9')).toBeUndefined();
  });
});

function read(given: unknown): NetworkFile {
  const result = readNetworkFile(given);
  if (!result.ok) throw new Error(JSON.stringify(result.errors));
  return result.file;
}
