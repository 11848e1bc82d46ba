import type { SavedBatch } from '@riseback/contracts';
import { applyBatch, COLLECTION_NAMES, type EditOp, jsonEqual, type NetworkDocument } from '@riseback/network';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { choiceOfMine } from './conflict-choice';
import { type Conflict, replayOver } from './conflicts';
import { sideOf } from './place';
import { type Deed, DEEDS, many, START } from './testing/random-deeds';
import { touchesOf } from './touches';

const deed = fc.record({
  what: fc.constantFrom(...DEEDS),
  pick: fc.nat(),
  value: fc.integer({ min: 1, max: 5 }),
});

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

describe('whatever two people do at once', { timeout: 60_000 }, () => {
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
        // a removal that is chosen takes along what the other hung on it
        const removed = new Set(ops.flatMap((op) => (op.op === 'remove' ? [op.id] : [])));
        for (const { place, mine } of settled) {
          const kept = sideOf(after, place).there;
          expect(kept || !mine.there || removed.has(place.id)).toBe(true);
          expect(kept && !mine.there).toBe(false);
        }
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
