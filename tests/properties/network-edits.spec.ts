import {
  applyBatch,
  canonicalText,
  COLLECTION_NAMES,
  compareIds,
  emptyDocument,
  fileCanonicalText,
  fromFile,
  readNetworkFile,
  toFile,
  type EditOp,
  type NetworkDocument,
} from '@riseback/network';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { move, opsOf, SEED, ternQuay, type Move } from './network-arbitraries';

/** Everything of a document, ordinals included, in one text. */
function wholeText(document: NetworkDocument): string {
  const { name, site, method, limits } = document;
  const collections = COLLECTION_NAMES.map((collection) =>
    [...document[collection]].sort(([a], [b]) => compareIds(a, b)).map(([id, placed]) => [id, placed]),
  );
  return canonicalText([{ name, site, method, limits }, collections]);
}

function apply(document: NetworkDocument, ops: readonly EditOp[]): { document: NetworkDocument; inverse: EditOp[] } {
  const applied = applyBatch(document, ops);
  if (!applied.ok) throw new Error(`refused: ${JSON.stringify({ errors: applied.errors, ops })}`);
  return applied;
}

/**
 * Plays moves one by one; gives the operations of all of them and where they lead. Defaults are filled in when a batch ends, so a move
 * that starts from a default filled in by an earlier one cannot stand in the same batch, and is left out.
 */
function play(start: NetworkDocument, moves: readonly Move[]): { ops: EditOp[]; document: NetworkDocument } {
  let ops: EditOp[] = [];
  let document = start;
  for (const made of moves) {
    const longer = [...ops, ...opsOf(document, made)];
    if (!applyBatch(start, longer).ok) continue;
    document = apply(document, longer.slice(ops.length)).document;
    ops = longer;
  }
  return { ops, document };
}

const starts = fc.constantFrom(emptyDocument('Empty'), fromFile(ternQuay()));
const moves = fc.array(move, { minLength: 1, maxLength: 25 });

it('most random moves are accepted, so that the properties below are about something', () => {
  const document = fromFile(ternQuay());
  const made = fc.sample(move, { seed: SEED, numRuns: 100 });
  expect(
    made.filter((one) => opsOf(document, one).length > 0 && applyBatch(document, opsOf(document, one)).ok).length,
  ).toBeGreaterThan(80);
});

describe('random edits', () => {
  it('their inverses, last first, give back the first document to the letter', () => {
    fc.assert(
      fc.property(starts, fc.array(moves, { minLength: 1, maxLength: 5 }), (start, batches) => {
        const before = wholeText(start);
        const inverses: EditOp[][] = [];
        let document = start;
        for (const batch of batches) {
          const applied = apply(document, play(document, batch).ops);
          inverses.unshift(applied.inverse);
          document = applied.document;
        }
        for (const inverse of inverses) document = apply(document, inverse).document;
        expect(wholeText(document)).toBe(before);
        expect(fileCanonicalText(toFile(document))).toBe(fileCanonicalText(toFile(start)));
        expect(wholeText(start)).toBe(before);
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('the inverse of an inverse leads on again', () => {
    fc.assert(
      fc.property(starts, moves, (start, batch) => {
        const there = apply(start, play(start, batch).ops);
        const back = apply(there.document, there.inverse);
        expect(wholeText(apply(back.document, back.inverse).document)).toBe(wholeText(there.document));
      }),
      { seed: SEED, numRuns: 100 },
    );
  });

  it('as one batch they lead where they lead one by one', () => {
    fc.assert(
      fc.property(starts, moves, (start, batch) => {
        const { ops, document } = play(start, batch);
        expect(wholeText(apply(start, ops).document)).toBe(wholeText(document));
      }),
      { seed: SEED, numRuns: 100 },
    );
  });

  it('leave a network whose file is read again as it is', () => {
    fc.assert(
      fc.property(starts, moves, (start, batch) => {
        const file = toFile(play(start, batch).document);
        const read = readNetworkFile(JSON.parse(JSON.stringify(file)));
        expect(read).toEqual({ ok: true, file });
      }),
      { seed: SEED, numRuns: 100 },
    );
  });
});
