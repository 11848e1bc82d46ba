import type { TrapResult } from '@riseback/contracts';
import { applyBatch, fromFile, type NetworkDocument, readNetworkFile, type Trap } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { judgeModel, trapDemand } from './model-judgement';

const SI = { system: 'si', atmosphericPressurePa: 101_325 } as const;
const FILE = {
  format: 'riseback-network',
  version: 1,
  name: 'Judged',
  nodes: [
    {
      id: 'T1',
      kind: 'trap',
      elevationM: 0,
      inletPressurePa: 601_325,
      loadKgS: 0.05,
      sizingFactor: 3,
      trapType: 'invertedBucket',
      maximumPressurePa: 1_101_325,
    },
  ],
  cases: [
    { id: 'design', name: 'Design' },
    { id: 'start', name: 'Start-up', loadFactor: 2 },
    { id: 'one', name: 'One', loadFactor: 2, overrides: [{ node: 'T1', loadKgS: 0.04 }] },
  ],
};
const result = { backPressurePa: 201_325, differentialPa: 400_000 } as TrapResult;
/** 100 g/s at 100 kPa, so by the root 200 g/s at 400 kPa. */
const twice = {
  name: 'Twice',
  capacity: [
    { differentialPa: 100_000, flowKgS: 0.1 },
    { differentialPa: 900_000, flowKgS: 0.3 },
  ],
};

function plant(): { document: NetworkDocument; trap: Trap } {
  const read = readNetworkFile(FILE);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  const document = fromFile(read.file);
  const trap = document.nodes.get('T1')?.value;
  if (trap?.kind !== 'trap') throw new Error('no trap');
  return { document, trap };
}

function demandIn(caseId: string) {
  const { document, trap } = plant();
  return trapDemand(document, caseId, trap, result);
}

describe('what a trap needs', () => {
  it.each([
    ['design', 0.15],
    ['start', 0.3],
    ['one', 0.12],
    ['', 0.15],
  ])('in case "%s"', (caseId, needKgS) => {
    expect(demandIn(caseId).needKgS.toFixed(6)).toBe(needKgS.toFixed(6));
    expect(demandIn(caseId).inletPressurePa).toBe(601_325);
  });
});

describe('a model at a trap', () => {
  it('is judged by the capacity at the trap’s own differential, by the root between its points', () => {
    const judged = judgeModel(twice, demandIn('design'), SI);
    expect(judged.capacityKgS?.toFixed(6)).toBe('0.200000');
    expect(judged).toMatchObject({ verdict: 'pass', words: 'Passes 1.3 times what is needed.' });
    expect(judgeModel(twice, demandIn('start'), SI)).toMatchObject({
      verdict: 'fail',
      words: 'Passes 67 % of what is needed.',
    });
  });

  it('is no pass where its capacity is not known', () => {
    expect(judgeModel({ name: 'Bare' }, demandIn('design'), SI)).toEqual({
      capacityKgS: null,
      verdict: 'none',
      words: 'The trap’s model gives no capacities.',
    });
  });

  it('is told apart by its ratings too', () => {
    // the safety valve's setting is 1,000 kPa above the atmosphere
    const weak = { ...twice, maximumDifferentialPa: 900_000, bodyPressurePa: 1_000_000 };
    expect(judgeModel(weak, demandIn('design'), SI)).toMatchObject({
      verdict: 'fail',
      words: 'Passes 1.3 times what is needed. Orifice rating: fail. Body rating: fail.',
    });
  });

  it('has nothing to pass where the trap has no load', () => {
    const { document } = plant();
    const idle = applyBatch(document, [{ op: 'set', in: 'nodes', id: 'T1', key: 'loadKgS', from: 0.05, to: 0 }]);
    if (!idle.ok) throw new Error('refused');
    const trap = idle.document.nodes.get('T1')?.value as Trap;
    expect(judgeModel(twice, trapDemand(idle.document, 'design', trap, result), SI).words).toBe(
      'Nothing is needed in this case.',
    );
  });
});
