import { type FilePart, keysOf } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { ELEMENT_LISTS, type ListId } from './list-definitions';
import { trialContext, trialDocument } from './testing/trial-document';

/** Not for a table: what names the element, and where it lies on the drawing. */
const ELSEWHERE = new Set(['id', 'kind', 'position', 'bends']);
/** The key's own column has another name where two keys share a cell or one key fills two. */
const COLUMNS_OF: Readonly<Record<string, readonly string[]>> = {
  size: ['nps', 'schedule'],
  node: ['place'],
  pipe: ['place', 'distanceM'],
};

describe('the lists', () => {
  it.each<[ListId, FilePart]>([
    ['traps', 'trap'],
    ['pipes', 'pipe'],
    ['junctions', 'junction'],
    ['vessels', 'receiver'],
    ['vessels', 'flashVessel'],
    ['pumped-inlets', 'pumpedInlet'],
    ['gauges', 'gauge'],
    ['trap-models', 'trapModel'],
  ])('%s: every key of a %s that is not of the drawing can be edited', (id, part) => {
    const columns = ELEMENT_LISTS.find((list) => list.id === id)?.table(trialContext()).columns ?? [];
    const editable = new Set(columns.filter(({ editable }) => editable).map(({ key }) => key));
    const missing = keysOf(part)
      .map(({ key }) => key)
      .filter((key) => !ELSEWHERE.has(key))
      .flatMap((key) => COLUMNS_OF[key] ?? [key])
      .filter((key) => !editable.has(key));
    expect(missing).toEqual([]);
  });

  it('hold every element once', () => {
    const document = trialDocument();
    expect(ELEMENT_LISTS.map(({ count }) => count(document))).toEqual([2, 2, 1, 2, 1, 1, 1]);
    for (const id of document.nodes.keys()) {
      expect(ELEMENT_LISTS.filter(({ holds }) => holds(document, id))).toHaveLength(1);
    }
  });

  it('have column keys of their own', () => {
    for (const list of ELEMENT_LISTS) {
      const keys = list.table(trialContext()).columns.map(({ key }) => key);
      expect(new Set(keys).size).toBe(keys.length);
    }
  });
});
