import type { SavedBatch } from '@riseback/contracts';
import {
  applyBatch,
  type EditBatch,
  type EditOp,
  fromFile,
  type NetworkDocument,
  readNetworkFile,
  removalOps,
  setOp,
} from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { choiceOfMine } from './conflict-choice';
import { replayOver } from './conflicts';
import { touchesOf } from './touches';

/** A trap that lifts over a junction into a receiver; a case that shuts the trap off. */
const start = documentOf({
  format: 'riseback-network',
  version: 1,
  name: 'Two people',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [
    { id: 'T1', kind: 'trap', tag: 'TR-1', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
    { id: 'J1', kind: 'junction', elevationM: 3 },
    { id: 'R1', kind: 'receiver', elevationM: 3, pressurePa: 120_000 },
  ],
  pipes: [
    { id: 'L1', from: 'T1', to: 'J1', lengthM: 6, insideDiameterM: 0.025 },
    { id: 'L2', from: 'J1', to: 'R1', lengthM: 30, insideDiameterM: 0.025 },
  ],
  cases: [{ id: 'C1', name: 'Night', overrides: [{ node: 'T1', state: 'isolated' }] }],
});

/** Both make their edits on the same document; theirs are saved first. */
function meet(theirs: readonly EditOp[], ...mine: (readonly EditOp[])[]) {
  const saved: SavedBatch = {
    version: 2,
    batchId: crypto.randomUUID(),
    personId: 'ada',
    personName: 'Ada Other',
    at: '2026-03-01T08:00:00.000Z',
    label: 'theirs',
    ops: [...theirs],
    solverHash: 'h',
  };
  const pending = mine.map((ops, index): EditBatch => ({
    batchId: crypto.randomUUID(),
    label: `mine ${String(index)}`,
    ops: [...ops],
  }));
  const replayed = replayOver({
    before: start,
    after: applied(start, theirs),
    pending,
    touches: touchesOf([saved], ({ personName }) => personName),
    others: 'Ada Other',
  });
  return { ...replayed, sent: pending };
}
const set = (id: string, key: string, to: unknown, document = start): EditOp =>
  setOp(document, document.nodes.has(id) ? 'nodes' : 'pipes', id, key, to);

describe('edits of two people', () => {
  it('merge where they touch different properties, also of one element, and keep their batch', () => {
    const { present, pending, sent, conflicts } = meet([set('T1', 'loadKgS', 0.06)], [set('T1', 'elevationM', 1)]);
    expect(present.nodes.get('T1')?.value).toMatchObject({ loadKgS: 0.06, elevationM: 1 });
    expect(pending).toEqual(sent);
    expect(conflicts).toEqual([]);
  });

  it('are no conflict where both set the same value', () => {
    const { pending, conflicts } = meet([set('J1', 'elevationM', 4)], [set('J1', 'elevationM', 4)]);
    expect(pending).toEqual([]);
    expect(conflicts).toEqual([]);
  });

  it('of one property keep before, theirs and mine; the rest of the batch goes on under a new id', () => {
    const both = [set('J1', 'elevationM', 5), set('T1', 'elevationM', 1)];
    const { present, pending, sent, conflicts } = meet([set('J1', 'elevationM', 4)], both);
    expect(present.nodes.get('J1')?.value.elevationM).toBe(4);
    expect(present.nodes.get('T1')?.value.elevationM).toBe(1);
    expect(pending.map(({ ops }) => ops)).toEqual([[both[1]]]);
    expect(pending[0]?.batchId).not.toBe(sent[0]?.batchId);
    expect(conflicts).toMatchObject([
      {
        place: { in: 'nodes', id: 'J1', key: 'elevationM' },
        name: 'J1',
        who: 'Ada Other',
        before: { there: true, value: 3 },
        mine: { there: true, value: 5 },
      },
    ]);
  });

  it('ask once for a property that was changed several times, by its last value', () => {
    const once = applied(start, [set('J1', 'elevationM', 5)]);
    const { pending, conflicts } = meet(
      [set('J1', 'elevationM', 4)],
      [set('J1', 'elevationM', 5)],
      [set('J1', 'elevationM', 6, once)],
    );
    expect(pending).toEqual([]);
    expect(conflicts.map(({ before, mine }) => [before, mine])).toEqual([
      [
        { there: true, value: 3 },
        { there: true, value: 6 },
      ],
    ]);
  });

  it('tell the undo what is left to take back', () => {
    const { fates, sent } = meet(
      [set('J1', 'elevationM', 4)],
      [set('J1', 'elevationM', 5), set('T1', 'elevationM', 1)],
      [set('J1', 'elevationM', 7, applied(start, [set('J1', 'elevationM', 5)]))],
    );
    const [first, second] = sent.map(({ batchId }) => fates.get(batchId));
    expect(first?.inverse).toEqual([{ op: 'set', in: 'nodes', id: 'T1', key: 'elevationM', from: 1, to: 0 }]);
    expect(second).toBeNull();
  });
});

describe('a removal', () => {
  it('of what the other changed is asked about once, with all that goes along', () => {
    const { present, pending, conflicts } = meet(
      [set('L1', 'lengthM', 9)],
      [...removalOps(start, { nodes: ['T1'] }), set('J1', 'elevationM', 5)],
    );
    expect(present.nodes.has('T1')).toBe(true);
    expect(present.pipes.get('L1')?.value.lengthM).toBe(9);
    expect(present.nodes.get('J1')?.value.elevationM).toBe(5);
    expect(pending).toHaveLength(1);
    expect(conflicts.map(({ place, mine }) => ({ place, mine }))).toEqual([
      { place: { in: 'nodes', id: 'T1' }, mine: { there: false } },
    ]);
    const choice = choiceOfMine(present, conflicts);
    const after = applied(present, choice.ops);
    expect([after.nodes.has('T1'), after.pipes.has('L1'), after.overrides.size]).toEqual([false, false, 0]);
  });

  it('by the other keeps what I changed, and mine brings back the element with its lines and case values', () => {
    const { present, pending, conflicts } = meet(removalOps(start, { nodes: ['T1'] }), [set('T1', 'loadKgS', 0.07)]);
    expect(present.nodes.has('T1')).toBe(false);
    expect(pending).toEqual([]);
    expect(conflicts).toMatchObject([{ place: { in: 'nodes', id: 'T1' }, name: 'TR-1', who: 'Ada Other' }]);
    const after = applied(present, choiceOfMine(present, conflicts).ops);
    expect(after.nodes.get('T1')?.value).toMatchObject({ loadKgS: 0.07, tag: 'TR-1' });
    expect(after.pipes.get('L1')).toEqual(start.pipes.get('L1'));
    expect(after.overrides.get('C1/T1')).toEqual(start.overrides.get('C1/T1'));
  });

  it('by both is no conflict', () => {
    const ops = removalOps(start, { nodes: ['T1'] });
    const { conflicts, pending } = meet(ops, ops);
    expect(conflicts).toEqual([]);
    expect(pending).toEqual([]);
  });

  it('by the other of a node that I drew a pipe to brings both back', () => {
    const pipe = { id: 'L3', from: 'T2', to: 'J1', lengthM: 1, insideDiameterM: 0.02 };
    const trap = { id: 'T2', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.01 };
    const { present, pending, conflicts } = meet(removalOps(start, { nodes: ['J1'] }), [
      { op: 'add', in: 'nodes', ordinal: 9, value: trap },
      { op: 'add', in: 'pipes', ordinal: 9, value: pipe },
    ]);
    expect(present.nodes.has('T2')).toBe(true);
    expect(pending).toHaveLength(1);
    expect(conflicts).toMatchObject([{ place: { in: 'pipes', id: 'L3' }, before: { there: false } }]);
    const after = applied(present, choiceOfMine(present, conflicts).ops);
    expect([after.nodes.has('J1'), after.pipes.has('L3')]).toEqual([true, true]);
  });
});

describe('what both add', () => {
  it('takes another id where both took the same, and what refers to it follows', () => {
    const add = (id: string, elevationM: number): EditOp => ({
      op: 'add',
      in: 'nodes',
      ordinal: 3,
      value: { id, kind: 'junction', elevationM },
    });
    const pipe: EditOp = {
      op: 'add',
      in: 'pipes',
      ordinal: 2,
      value: { id: 'L3', from: 'T1', to: 'J2', lengthM: 1, insideDiameterM: 0.02 },
    };
    const { present, pending, conflicts, renamed } = meet([add('J2', 1)], [add('J2', 2)], [pipe]);
    expect(conflicts).toEqual([]);
    expect([...renamed]).toEqual([['J2', 'J3']]);
    expect([present.nodes.get('J2')?.value.elevationM, present.nodes.get('J3')?.value.elevationM]).toEqual([1, 2]);
    expect(present.pipes.get('L3')?.value.to).toBe('J3');
    expect(pending).toHaveLength(2);
  });

  it('to one element in one case is merged value by value', () => {
    const add = (value: object): EditOp => ({
      op: 'add',
      in: 'overrides',
      id: 'C2/T1',
      ordinal: 0,
      value: { node: 'T1', ...value },
    });
    const theirs: EditOp[] = [{ op: 'add', in: 'cases', ordinal: 1, value: { id: 'C2', name: 'Day' } }];
    const day = applied(start, theirs);
    const replayed = replayOver({
      before: day,
      after: applied(day, [add({ loadKgS: 0.1 })]),
      pending: [{ batchId: crypto.randomUUID(), label: 'mine', ops: [add({ loadKgS: 0.2, inletPressurePa: 5e5 })] }],
      touches: new Map(),
      others: 'Ada Other',
    });
    expect(replayed.present.overrides.get('C2/T1')?.value).toMatchObject({ loadKgS: 0.1, inletPressurePa: 5e5 });
    expect(replayed.conflicts).toMatchObject([
      { place: { in: 'overrides', id: 'C2/T1', key: 'loadKgS' }, name: 'TR-1 in Day', mine: { value: 0.2 } },
    ]);
  });
});

describe('settings of the network', () => {
  const method = (to: object): EditOp => ({
    op: 'set',
    in: 'network',
    key: 'method',
    from: start.method,
    to: { ...start.method, ...to },
  });

  it('are merged key by key', () => {
    const { present, conflicts } = meet([method({ friction: 'friedel' })], [method({ dropCredit: 0.5 })]);
    expect(present.method).toMatchObject({ friction: 'friedel', dropCredit: 0.5 });
    expect(conflicts).toEqual([]);
  });

  it('of one key are a conflict about that key alone; the rest of mine is kept', () => {
    const { present, conflicts } = meet(
      [method({ dropCredit: 0.2 })],
      [method({ dropCredit: 0.5, friction: 'friedel' })],
    );
    expect(present.method).toMatchObject({ dropCredit: 0.2, friction: 'friedel' });
    expect(conflicts).toMatchObject([
      { place: { in: 'network', key: 'method', path: ['dropCredit'] }, name: 'The network', mine: { value: 0.5 } },
    ]);
    const after = applied(present, choiceOfMine(present, conflicts).ops);
    expect(after.method).toMatchObject({ dropCredit: 0.5, friction: 'friedel' });
  });
});

it('mine brings values along that only fit together', () => {
  const vented: EditOp[] = [set('R1', 'pressurePa', undefined), set('R1', 'vented', true)];
  const { present, conflicts } = meet(vented, [set('R1', 'pressurePa', 130_000)]);
  const after = applied(present, choiceOfMine(present, conflicts).ops);
  expect(after.nodes.get('R1')?.value).toEqual({ ...start.nodes.get('R1')?.value, pressurePa: 130_000 });
});

function applied(document: NetworkDocument, ops: readonly EditOp[]): NetworkDocument {
  const result = applyBatch(document, ops);
  if (!result.ok) throw new Error(result.errors.map(({ detail }) => detail).join('; '));
  return result.document;
}

function documentOf(json: unknown): NetworkDocument {
  const read = readNetworkFile(json);
  if (!read.ok) throw new Error(read.errors.map(({ detail }) => detail).join('; '));
  return fromFile(read.file);
}
