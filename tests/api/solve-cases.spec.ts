import { describe, expect, it } from 'vitest';
import { solveCases } from '../../server/src/solve/solve-cases';
import { networkFile } from '../fixtures/solver/small-networks';

const file = networkFile({
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.05 },
    { id: 'R1', kind: 'receiver', elevationM: 2, pressurePa: 1.2e5 },
  ],
  pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 5, insideDiameterM: 0.05 }],
});
const outcomes = (cases: number) => solveCases({ file, caseIds: new Array<string>(cases).fill(''), partial: true });

describe('the cases of a job', () => {
  it('give each trap both bands', () => {
    const [first] = outcomes(2);
    if (first?.status !== 'solved') throw new Error('not solved');
    expect(first.result.traps[0]?.credible?.highPa).toBeGreaterThan(1.2e5);
    expect(first.result.traps[0]?.spread?.highPa).toBeGreaterThan(1.2e5);
  });

  it('say so where there are too many pipes for bands in time', () => {
    const [first] = outcomes(8001);
    if (first?.status !== 'solved') throw new Error('not solved');
    expect(first.result.traps[0]).not.toHaveProperty('spread');
    expect(first.result.warnings.map(({ code, element }) => [code, element])).toContainEqual(['bandsLeftOut', '']);
  });
});
