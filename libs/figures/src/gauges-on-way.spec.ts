import { fromFile, readNetworkFile } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { gaugesOnWay } from './gauges-on-way';

const read = readNetworkFile({
  format: 'riseback-network',
  version: 1,
  name: 'Gauges on a way',
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 6e5, loadKgS: 0.1 },
    { id: 'J1', kind: 'junction', elevationM: 2 },
    { id: 'R1', kind: 'receiver', elevationM: 2, vented: true },
    { id: 'T2', kind: 'trap', elevationM: 0, inletPressurePa: 6e5, loadKgS: 0.1 },
  ],
  pipes: [
    { id: 'L1', from: 'T1', to: 'J1', lengthM: 10, insideDiameterM: 0.05 },
    // drawn against the flow
    { id: 'L2', from: 'R1', to: 'J1', lengthM: 20, insideDiameterM: 0.05 },
    { id: 'L3', from: 'T2', to: 'J1', lengthM: 5, insideDiameterM: 0.05 },
  ],
  gauges: [
    { id: 'G1', tag: 'PI-1', pipe: 'L2', distanceM: 5, elevationM: 4 },
    { id: 'G2', tag: 'PI-2', node: 'J1', elevationM: 3 },
    { id: 'G3', tag: 'PI-3', pipe: 'L3', distanceM: 1, elevationM: 3 },
    { id: 'G4', tag: 'PI-4', node: 'J1', elevationM: 3, retired: true },
  ],
});
if (!read.ok) throw new Error(JSON.stringify(read.errors));
const document = fromFile(read.file);
const points = [
  { distanceM: 0, elevationM: 0, pressurePa: 130_000, pipeId: 'L1' },
  { distanceM: 10, elevationM: 2, pressurePa: 110_000, pipeId: 'L1' },
  { distanceM: 30, elevationM: 2, pressurePa: 101_325, pipeId: 'L2' },
];

describe('gaugesOnWay', () => {
  it('finds those at nodes and on pipes of the way, in its order, counted from the trap whatever way an arrow runs', () => {
    const found = gaugesOnWay(document, 'T1', ['L1', 'L2'], points);
    expect(found.map(({ tag, distanceM, elevationM }) => [tag, distanceM, elevationM])).toEqual([
      ['PI-2', 10, 3],
      ['PI-1', 25, 4],
    ]);
  });

  it('tells what is predicted at the tap', () => {
    const [atNode, onPipe] = gaugesOnWay(document, 'T1', ['L1', 'L2'], points);
    expect([atNode?.pressurePa, atNode?.tapElevationM]).toEqual([110_000, 2]);
    // three quarters of the way from 110,000 down to 101,325 Pa
    expect(Math.abs((onPipe?.pressurePa ?? NaN) - (110_000 - 0.75 * 8_675))).toBeLessThan(5e-7);
  });
});
