import type { NetworkFile } from '@riseback/network';
import { saturationTemperatureK } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { networkFile, solved, trapOf } from '../fixtures/solver/small-networks';

function line(loadKgS: number, riseM: number, pipe: object = {}, more: object = {}): NetworkFile {
  return networkFile({
    nodes: [
      { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS },
      { id: 'R1', kind: 'receiver', elevationM: riseM, pressurePa: 1.2e5 },
    ],
    pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 20, size: { nps: '2', schedule: '40' }, ...pipe }],
    ...more,
  });
}

const codes = (file: NetworkFile): string[] => solved(file).warnings.map(({ code, verdict }) => `${code} ${verdict}`);

describe('findings at a pipe', () => {
  it('are none for a line that carries little and falls', () => {
    expect(codes(line(0.02, -0.2))).toEqual([]);
  });

  it('say that a rise carries flash steam, and that the dry-return basis was not made for it', () => {
    expect(codes(line(0.02, 3))).toEqual(expect.arrayContaining(['uphillTwoPhase watch', 'dryBasis watch']));
    const full = codes(line(0.02, 3, {}, { method: { friction: 'friedel' } }));
    expect(full).toContain('uphillTwoPhase watch');
    expect(full).not.toContain('dryBasis watch');
  });

  it('count every rise of a route', () => {
    const route = [
      { lengthM: 4, riseM: 2 },
      { lengthM: 12, riseM: -0.1 },
      { lengthM: 4, riseM: 1.5 },
    ];
    const [finding] = solved(line(0.02, 3.4, { route })).warnings.filter(({ code }) => code === 'uphillTwoPhase');
    expect(finding?.value).toBe(3.5);
  });

  it('say where the steam carries the liquid along although the basis lets it drain', () => {
    const { pipes } = solved(line(0.4, 0));
    expect(pipes[0]?.flowPattern).toBe('annular');
    expect(codes(line(0.4, 0))).toContain('dryBasis watch');
    expect(codes(line(0.4, 0, {}, { method: { friction: 'byPattern' } }))).not.toContain('dryBasis watch');
  });

  it('name slugs in a rise and plugs in a level run', () => {
    // a rise of some flash steam churns or slugs; a nearly full level run of hardly any is intermittent (Taitel-Dukler)
    expect(codes(line(0.3, 3))).toContain('slug watch');
    const nearlyCold = networkFile({
      nodes: [
        { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 1.3e5, loadKgS: 4 },
        { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: 1.2e5 },
      ],
      pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 0.5, size: { nps: '2', schedule: '40' } }],
    });
    const result = solved(nearlyCold);
    expect(result.pipes[0]?.flowPattern).toBe('intermittent');
    expect(result.warnings.map(({ code }) => code)).toContain('slug');
  });

  it('name a choked outlet', () => {
    const file = line(4, 0, {}, { method: { friction: 'homogeneous' } });
    const [pipe] = solved(file).pipes;
    expect(pipe?.choked).toBe(true);
    const finding = solved(file).warnings.find(({ code }) => code === 'choked');
    expect([finding?.verdict, finding?.value, finding?.limit]).toEqual(['fail', pipe?.outletPressurePa, 1.2e5]);
  });

  it('are none for a pipe that stands still', () => {
    const cases = [{ id: 'off', name: 'Off', overrides: [{ node: 'T1', state: 'isolated' }] }];
    expect(codes(line(0.4, 3, {}, { cases }))).toEqual([]);
  });
});

describe('thermal shock', () => {
  const main = (temperatureK: number, more: object = {}): NetworkFile =>
    networkFile({
      nodes: [
        { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.05 },
        { id: 'P1', kind: 'pumpedInlet', elevationM: 0, flowKgS: 1, temperatureK },
        { id: 'J1', kind: 'junction', elevationM: 0 },
        { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: 1.2e5 },
      ],
      pipes: [
        { id: 'L1', from: 'T1', to: 'J1', lengthM: 5, insideDiameterM: 0.04 },
        { id: 'L2', from: 'P1', to: 'J1', lengthM: 5, insideDiameterM: 0.05 },
        { id: 'L3', from: 'J1', to: 'R1', lengthM: 5, insideDiameterM: 0.05 },
      ],
      ...more,
    });
  const shock = (file: NetworkFile) => solved(file).warnings.find(({ code }) => code === 'thermalShock');

  it('is told of a flashing trap into a full cold main, at the trap’s pipe', () => {
    const finding = shock(main(320));
    expect([finding?.element, finding?.verdict, finding?.limit]).toEqual(['L1', 'watch', 30]);
    const { nodes } = solved(main(320));
    const boilsK = saturationTemperatureK(nodes.find(({ id }) => id === 'J1')?.pressurePa ?? NaN);
    expect(Math.abs((finding?.value ?? NaN) - (boilsK - 320))).toBeLessThan(0.1);
    // people know pipes by their tags, which a solve does not have: no id of the file stands in the words
    expect(finding?.message).toMatch(/meets another/);
    expect(finding?.message).not.toMatch(/\bL\d/);
  });

  it('is not told of streams nearly as hot, nor beyond the site’s own limit', () => {
    expect(shock(main(355))).toBeUndefined();
    expect(shock(main(320, { limits: { thermalShock: { limitK: 80 } } }))).toBeUndefined();
  });
});

describe('stall', () => {
  const service = { kind: 'modulating', control: 'varyingInlet', secondaryInletK: 283.15, secondaryOutletK: 333.15 };
  const stallAt = (loadFactor: number, more: object = {}, limits: object = {}) => {
    const file = networkFile({
      limits,
      nodes: [
        { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 4.76e5, loadKgS: 0.02, service, ...more },
        { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: 101_418 },
      ],
      pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 1, insideDiameterM: 0.2 }],
      cases: [{ id: 'part', name: 'Part load', loadFactor }],
    });
    const trap = trapOf(solved(file, { caseId: 'part' }), 'T1');
    return trap.checks.find(({ code }) => code === 'stall') ?? trap.notChecked.find(({ code }) => code === 'stall');
  };

  // steam tables: 4.76 bar boils at 150 °C, 1.014 bar at 100 °C; so (100 − 60)/(150 − 60) = 0.444 by hand
  it.each([
    [0.9, 'pass'],
    [0.55, 'watch'],
    [0.4, 'fail'],
  ])('at %f of the load: %s', (loadFactor, verdict) => {
    const check = stallAt(loadFactor);
    expect(check).toMatchObject({ verdict });
    if (check === undefined || !('verdict' in check)) throw new Error('not made');
    expect(Math.abs((check.value ?? NaN) - 40 / 90)).toBeLessThan(2e-3);
    expect(Math.abs((check.limit ?? NaN) - loadFactor)).toBeLessThan(1e-12);
  });

  it('watches within the site’s own margin', () => {
    expect(stallAt(0.55, {}, { stall: { watchMargin: 0.05 } })).toMatchObject({ verdict: 'pass' });
  });

  it('says why it is not made, and says nothing of steam that is not modulated', () => {
    expect(stallAt(1, { loadKgS: 0 })).toMatchObject({ reason: expect.stringMatching(/without a load/) as string });
    expect(stallAt(1, { service: { ...service, secondaryOutletK: 500 } })).toMatchObject({
      reason: expect.stringMatching(/hotter/) as string,
    });
    expect(stallAt(1, { service: { kind: 'constant' } })).toBeUndefined();
  });
});
