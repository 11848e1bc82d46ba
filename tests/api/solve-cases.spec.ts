import { describe, expect, it } from 'vitest';
import { bandsInTime, solveCases, withoutBands } from '../../server/src/solve/solve-cases';
import { networkFile } from '../fixtures/solver/small-networks';

const file = networkFile({
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.05 },
    { id: 'R1', kind: 'receiver', elevationM: 2, pressurePa: 1.2e5 },
  ],
  pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 5, insideDiameterM: 0.05 }],
});
const job = (cases: number) => ({ file, caseIds: new Array<string>(cases).fill(''), partial: true });

describe('the cases of a job', () => {
  it('give each trap both bands where they are asked for', () => {
    const [first] = solveCases({ ...job(2), bands: true });
    if (first?.status !== 'solved') throw new Error('not solved');
    expect(first.result.traps[0]?.credible?.highPa).toBeGreaterThan(1.2e5);
    expect(first.result.traps[0]?.spread?.highPa).toBeGreaterThan(1.2e5);
  });

  it('say so where there are too many pipes for bands in time', () => {
    expect([bandsInTime(job(8_000)), bandsInTime(job(8_001))]).toEqual([true, false]);
    const [first] = withoutBands(solveCases({ ...job(1), bands: false }));
    if (first?.status !== 'solved') throw new Error('not solved');
    expect(first.result.traps[0]).not.toHaveProperty('spread');
    expect(first.result.warnings.map(({ code, element }) => [code, element])).toContainEqual(['bandsLeftOut', '']);
  });
});
