import { compareIds, type NetworkFile } from '@riseback/network';
import { compareNetworks, countChanges, type NetworkComparison } from '@riseback/revisions';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { SEED, ternQuay } from './network-arbitraries';

/** One value set in the file itself, past everything that edits it otherwise: which element, which of these keys, and to what. */
const KEYS = {
  nodes: ['elevationM', 'tag', 'note', 'area', 'position'],
  pipes: ['lengthM', 'tag', 'lossCoefficient', 'route', 'bends', 'fittings'],
  trapModels: ['name', 'orificeDiameterM', 'capacity'],
  cases: ['name', 'loadFactor', 'inletPressureFactor'],
} as const;
const LISTS = Object.keys(KEYS) as (keyof typeof KEYS)[];
const DRAWING: readonly string[] = ['position', 'bends'];

const edit = fc.record({ list: fc.constantFrom(...LISTS), which: fc.nat(), key: fc.nat() });
const batch = fc.array(edit, { maxLength: 40 });

/** A copy of the file with a value in each place that no file had there before; and which places those are. */
function edited(file: NetworkFile, edits: readonly { list: keyof typeof KEYS; which: number; key: number }[]) {
  const after = structuredClone(file);
  const places = new Set<string>();
  edits.forEach(({ list, which, key }, n) => {
    const elements: object[] = after[list];
    const index = which % elements.length;
    const name = KEYS[list][key % KEYS[list].length] ?? '';
    Object.assign(elements[index] ?? {}, { [name]: { fresh: n } });
    places.add(`${list} ${String(index)} ${name}`);
  });
  return { after, places };
}

/** All that is told, in no order, so that it can be held against another telling. */
function told({ settings, elements }: NetworkComparison): string[] {
  return [
    ...settings.map(({ path, from, to }) => JSON.stringify([path, from ?? null, to ?? null])),
    ...elements.flatMap(({ in: list, id, kind, keys }) => [
      JSON.stringify([list, id, kind]),
      ...keys.map(({ key, from, to }) => JSON.stringify([list, id, key, from ?? null, to ?? null])),
    ]),
  ].sort(compareIds);
}

function turnedAbout({ settings, elements, reordered }: NetworkComparison): NetworkComparison {
  const KINDS = { added: 'removed', removed: 'added', changed: 'changed' } as const;
  return {
    settings: settings.map(({ path, from, to }) => ({ path, from: to, to: from })),
    elements: elements.map((change) => ({
      ...change,
      kind: KINDS[change.kind],
      before: change.after,
      after: change.before,
      keys: change.keys.map((key) => ({ ...key, from: key.to, to: key.from })),
    })),
    reordered,
  };
}

describe('a comparison of the demo plant with what random edits make of it', () => {
  const before = ternQuay();

  it('finds nothing between a file and its copy', () => {
    expect(compareNetworks(before, ternQuay())).toEqual({ settings: [], elements: [], reordered: [] });
  });

  it('counts exactly the keys that were set', () => {
    fc.assert(
      fc.property(batch, (edits) => {
        const { after, places } = edited(before, edits);
        const drawingOnly = [...places].filter((place) => DRAWING.includes(place.split(' ')[2] ?? '')).length;
        const comparison = compareNetworks(before, after);
        expect(countChanges(comparison)).toEqual({ inputs: places.size - drawingOnly, drawingOnly });
        expect(comparison.elements.every(({ kind }) => kind === 'changed')).toBe(true);
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('tells the same, turned about, from the other side; with elements left out of either too', () => {
    const half = fc.record({ edits: batch, left: fc.array(fc.nat(200), { maxLength: 12 }) });
    const made = ({ edits, left }: { edits: Parameters<typeof edited>[1]; left: readonly number[] }) => {
      const { after } = edited(before, edits);
      const without = <T>(list: T[]) => list.filter((_, i) => !left.includes(i));
      return {
        ...after,
        nodes: without(after.nodes),
        pipes: without(after.pipes),
        cases: without(after.cases).map((one) => ({ ...one, overrides: without(one.overrides) })),
      };
    };
    fc.assert(
      fc.property(half, half, (one, other) => {
        const [a, b] = [made(one), made(other)];
        expect(told(compareNetworks(b, a))).toEqual(told(turnedAbout(compareNetworks(a, b))));
      }),
      { seed: SEED, numRuns: 100 },
    );
  });

  it('counts each element that is added or removed once', () => {
    fc.assert(
      fc.property(fc.uniqueArray(fc.nat(before.pipes.length - 1)), (left) => {
        const after = { ...before, pipes: before.pipes.filter((_, i) => !left.includes(i)) };
        expect(countChanges(compareNetworks(before, after)).inputs).toBe(left.length);
        expect(countChanges(compareNetworks(after, before)).inputs).toBe(left.length);
      }),
      { seed: SEED, numRuns: 50 },
    );
  });

  it('sees another order in whatever is turned over', () => {
    const after = { ...before, nodes: before.nodes.toReversed(), gauges: before.gauges.toReversed() };
    expect(compareNetworks(before, after)).toEqual({
      settings: [],
      elements: [],
      reordered: before.gauges.length > 1 ? ['nodes', 'gauges'] : ['nodes'],
    });
  });
});
