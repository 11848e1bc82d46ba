import { describe, expect, it } from 'vitest';
import { applyBatch, type NetworkDocument, setOp } from '@riseback/network';
import { trialDocument } from '../lists/testing/trial-document';
import { EMPTY_TRIAL, labelOf, layOver, Trial, withoutStep, withoutStepsAt, withStep } from './trial';

const base = trialDocument();
const sized = (id: string, nps: string) => ({
  id: `step ${id} ${nps}`,
  words: `Size ${nps} in: ${id}`,
  values: [
    { in: 'pipes' as const, id, key: 'size', to: { nps, schedule: '80' } },
    { in: 'pipes' as const, id, key: 'insideDiameterM' },
  ],
});

describe('a trial', () => {
  it('changes a copy and nothing else, and says what keeping it would do as one batch', () => {
    const trial = withStep(base, withStep(base, EMPTY_TRIAL, sized('L1', '1-1/2')), sized('L1', '2'));
    const { document, ops, overtaken } = layOver(base, trial);
    expect(base.pipes.get('L1')?.value.size?.nps).toBe('1');
    expect(document.pipes.get('L1')?.value.size?.nps).toBe('2');
    // two steps at one place are one change, from what stands in the network
    expect(ops).toEqual([setOp(base, 'pipes', 'L1', 'size', { nps: '2', schedule: '80' })]);
    expect(overtaken).toEqual([]);
    expect(applyBatch(base, ops)).toMatchObject({ ok: true, document: { pipes: document.pipes } });
  });

  it('takes a bore away where a size comes', () => {
    const { document, ops } = layOver(base, withStep(base, EMPTY_TRIAL, sized('L2', '2')));
    expect(document.pipes.get('L2')?.value.insideDiameterM).toBeUndefined();
    expect(ops.length).toBe(2);
  });

  it('stands on top of what others changed elsewhere, and names where both changed the same', () => {
    const trial = withStep(base, EMPTY_TRIAL, sized('L1', '2'));
    const elsewhere = changed(base, 'nodes', 'T1', 'loadKgS', 0.07);
    expect(layOver(elsewhere, trial).overtaken).toEqual([]);
    expect(layOver(elsewhere, trial).document.nodes.get('T1')?.value).toMatchObject({ loadKgS: 0.07 });

    const there = changed(base, 'pipes', 'L1', 'size', { nps: '1-1/2', schedule: '80' });
    const { overtaken, ops } = layOver(there, trial);
    expect(overtaken).toEqual([{ place: 'pipes/L1/size', name: 'CR-1', key: 'size' }]);
    expect(ops).toEqual([setOp(there, 'pipes', 'L1', 'size', { nps: '2', schedule: '80' })]);
    expect(withoutStepsAt(trial, new Set(overtaken.map(({ place }) => place)))).toEqual(EMPTY_TRIAL);
    // the same as ours: nothing is left to keep and nothing to ask
    const same = changed(base, 'pipes', 'L1', 'size', { nps: '2', schedule: '80' });
    expect(layOver(same, trial)).toMatchObject({ ops: [], overtaken: [] });
  });

  it('leaves out what was deleted, and a step that the network refuses, by name', () => {
    const trial = withStep(base, EMPTY_TRIAL, sized('L1', '2'));
    const deleted = applied(base, [{ op: 'remove', in: 'pipes', id: 'L1' }]);
    expect(layOver(deleted, trial)).toMatchObject({ ops: [], gone: ['L1'] });
    const refused = withStep(base, trial, {
      id: 'load',
      words: 'Load',
      values: [{ in: 'nodes', id: 'T1', key: 'loadKgS', to: -1 }],
    });
    expect(layOver(base, refused).refused.map(({ stepId }) => stepId)).toEqual(['load']);
  });

  it('loses one step and keeps the rest; survives being written and read', () => {
    const trial = withStep(base, withStep(base, EMPTY_TRIAL, sized('L1', '2')), sized('L2', '3'));
    const left = withoutStep(trial, 'step L1 2');
    expect(left.steps.map(({ words }) => words)).toEqual(['Size 3 in: L2']);
    expect(left.seen.map(({ place }) => place)).toEqual(['pipes/L2/size', 'pipes/L2/insideDiameterM']);
    const read = Trial.parse(JSON.parse(JSON.stringify(trial)));
    expect(layOver(base, read).ops).toEqual(layOver(base, trial).ops);
    expect(layOver(base, read).overtaken).toEqual([]);
  });

  it('has a label that an edit may bear', () => {
    const many = { ...EMPTY_TRIAL, steps: Array.from({ length: 20 }, () => sized('L1', '2')) };
    expect(labelOf(many).length).toBe(120);
  });
});

function changed(document: NetworkDocument, collection: 'nodes' | 'pipes', id: string, key: string, to: unknown) {
  return applied(document, [setOp(document, collection, id, key, to)]);
}

function applied(document: NetworkDocument, ops: Parameters<typeof applyBatch>[1]): NetworkDocument {
  const result = applyBatch(document, ops);
  if (!result.ok) throw new Error(result.errors.map(({ detail }) => detail).join('; '));
  return result.document;
}
