import type { SavedBatch } from '@riseback/contracts';
import {
  applyBatch,
  COLLECTION_NAMES,
  type EditBatch,
  type EditOp,
  emptyDocument,
  jsonEqual,
  newElementId,
  nextOrdinal,
  type NetworkDocument,
  removalOps,
  setNetworkOp,
  setOp,
} from '@riseback/network';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { choiceOfMine } from './conflict-choice';
import { type Conflict, replayOver, sideOf } from './conflicts';
import { touchesOf } from './touches';

/** What a person may do next; the numbers choose among what the document then has. */
const deed = fc.record({
  what: fc.constantFrom('set', 'set', 'set', 'addNode', 'addPipe', 'remove', 'override', 'limits'),
  pick: fc.nat(),
  value: fc.integer({ min: 1, max: 5 }),
});
type Deed = typeof deed extends fc.Arbitrary<infer D> ? D : never;

const START = many(emptyDocument('Random'), [
  ...Array.from({ length: 6 }, (_, pick): Deed => ({ what: 'addNode', pick, value: 1 })),
  ...Array.from({ length: 6 }, (_, pick): Deed => ({ what: 'addPipe', pick: 7 * pick, value: 1 })),
]).document;

/** The operations of a deed on a document; none where there is nothing to do it to. */
function opsOf(document: NetworkDocument, { what, pick, value }: Deed): EditOp[] {
  const nodes = [...document.nodes.keys()];
  const pipes = [...document.pipes.keys()];
  const node = nodes[pick % nodes.length];
  const pipe = pipes[pick % pipes.length];
  switch (what) {
    case 'addNode': {
      const trap = { kind: 'trap', inletPressurePa: 5e5, loadKgS: 0.1 };
      const id = newElementId(document, 'N');
      const kind = pick % 2 === 0 ? trap : { kind: 'junction' };
      return [
        { op: 'add', in: 'nodes', ordinal: nextOrdinal(document, 'nodes'), value: { id, elevationM: value, ...kind } },
      ];
    }
    case 'addPipe': {
      const to = nodes[(pick + value) % nodes.length];
      if (node === undefined || to === undefined || to === node) return [];
      const id = newElementId(document, 'L');
      const ends = { from: node, to };
      return [
        {
          op: 'add',
          in: 'pipes',
          ordinal: nextOrdinal(document, 'pipes'),
          value: { id, ...ends, lengthM: value, insideDiameterM: 0.05 },
        },
      ];
    }
    case 'remove':
      return pick % 3 === 0 && pipe !== undefined
        ? removalOps(document, { pipes: [pipe] })
        : node === undefined
          ? []
          : removalOps(document, { nodes: [node] });
    case 'override': {
      if (node === undefined || document.nodes.get(node)?.value.kind !== 'trap') return [];
      const id = `C/${node}`;
      const aCase: EditOp[] = document.cases.has('C')
        ? []
        : [{ op: 'add', in: 'cases', ordinal: 0, value: { id: 'C', name: 'Case' } }];
      const key = pick % 2 === 0 ? 'loadKgS' : 'inletPressurePa';
      if (document.overrides.has(id)) return [setOp(document, 'overrides', id, key, value)];
      return [...aCase, { op: 'add', in: 'overrides', id, ordinal: 0, value: { node, [key]: value } }];
    }
    case 'limits':
      return [
        setNetworkOp(document, 'limits', {
          ...document.limits,
          velocity: { ...document.limits.velocity, [pick % 2 === 0 ? 'watchMS' : 'liquidMS']: value },
        }),
      ];
    default:
      if (pick % 2 === 0 && pipe !== undefined) return [setOp(document, 'pipes', pipe, 'lengthM', value)];
      return node === undefined ? [] : [setOp(document, 'nodes', node, 'elevationM', value)];
  }
}

function many(start: NetworkDocument, deeds: readonly Deed[]) {
  const batches: EditBatch[] = [];
  let document = start;
  for (const one of deeds) {
    const ops = opsOf(document, one);
    const applied = applyBatch(document, ops);
    if (ops.length === 0 || !applied.ok) continue;
    document = applied.document;
    batches.push({ batchId: crypto.randomUUID(), label: one.what, ops });
  }
  return { document, batches };
}

function meet(theirDeeds: readonly Deed[], myDeeds: readonly Deed[]) {
  const theirs = many(START, theirDeeds);
  const mine = many(START, myDeeds);
  const saved = theirs.batches.map((batch, index): SavedBatch => {
    const by = { personId: 'ada', personName: 'Ada', at: '2026-03-01T08:00:00.000Z' };
    return { ...batch, ...by, version: index + 2, solverHash: '' };
  });
  const touches = touchesOf(saved, ({ personName }) => personName);
  const replayed = replayOver({ before: START, after: theirs.document, pending: mine.batches, touches, others: 'Ada' });
  return { theirs: theirs.document, mine: mine.document, replayed };
}

/** Every property of every element of a document, and the limits. */
function* propertiesOf(document: NetworkDocument) {
  for (const collection of COLLECTION_NAMES) {
    for (const [id, { value }] of document[collection])
      for (const key of Object.keys(value)) yield { in: collection, id, key };
  }
}
const asked = (conflicts: readonly Conflict[], place: { in: string; id: string; key: string }) =>
  conflicts.some(
    ({ place: at }) => at.in === place.in && at.id === place.id && (at.key === undefined || at.key === place.key),
  );
const runs = { numRuns: 300 };

describe('whatever two people do at once', () => {
  const deeds = fc.array(deed, { maxLength: 12 });

  it('is merged, or asked about; nothing of either is lost', () => {
    fc.assert(
      fc.property(deeds, deeds, (theirDeeds, myDeeds) => {
        const { theirs, mine, replayed } = meet(theirDeeds, myDeeds);
        const { present, conflicts, renamed } = replayed;
        for (const place of propertiesOf(mine)) {
          const wanted = sideOf(mine, place);
          // an id that was renamed is followed by the next property; a pipe's ends may name renamed nodes
          if (renamed.size > 0 || jsonEqual(wanted, sideOf(START, place))) continue;
          const kept = jsonEqual(wanted, sideOf(present, place)) || asked(conflicts, place);
          expect(kept, JSON.stringify(place)).toBe(true);
        }
        for (const place of propertiesOf(theirs)) {
          const saved = sideOf(theirs, place);
          if (renamed.size > 0 || jsonEqual(saved, sideOf(START, place))) continue;
          expect(sideOf(present, place), JSON.stringify(place)).toEqual(saved);
        }
      }),
      runs,
    );
  });

  it('goes out as batches that lead from theirs to what is shown, each with its exact inverse', () => {
    fc.assert(
      fc.property(deeds, deeds, (theirDeeds, myDeeds) => {
        const { theirs, replayed } = meet(theirDeeds, myDeeds);
        const forward = replayed.pending.reduce((document, { ops }) => mustApply(document, ops), theirs);
        expect(forward).toEqual(replayed.present);
        const fates = [...replayed.fates.values()].flatMap((fate) => fate ?? []);
        expect(fates.map(({ batchId }) => batchId)).toEqual(replayed.pending.map(({ batchId }) => batchId));
        const back = fates.reduceRight((document, { inverse }) => mustApply(document, inverse), replayed.present);
        expect(back).toEqual(theirs);
      }),
      runs,
    );
  });

  it('lets me have mine: every choice fits, or says that it does not', () => {
    fc.assert(
      fc.property(deeds, deeds, (theirDeeds, myDeeds) => {
        const { present, conflicts } = meet(theirDeeds, myDeeds).replayed;
        const { ops, settled, unfit } = choiceOfMine(present, conflicts);
        const after = mustApply(present, ops);
        expect(settled.length + unfit.length).toBe(conflicts.length);
        for (const { place, mine } of settled) expect(sideOf(after, place).there).toBe(mine.there);
      }),
      runs,
    );
  });
});

function mustApply(document: NetworkDocument, ops: readonly EditOp[]): NetworkDocument {
  const applied = applyBatch(document, ops);
  if (!applied.ok) throw new Error(applied.errors.map(({ detail }) => detail).join('; '));
  return applied.document;
}
