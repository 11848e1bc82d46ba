import fc from 'fast-check';
import type { Position } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { aligned, ALIGNMENTS, distributed, stackedBy } from './arrange';
import { drawnNetwork } from './drawn-network';
import { documentOf, sampleTrap } from './sample-network';

const networkAt = (...places: readonly (readonly [number, number])[]) =>
  drawnNetwork(documentOf(places.map(([x, y], i) => sampleTrap(`T${String(i)}`, { x, y }))));
const IDS = ['T0', 'T1', 'T2'];

describe('aligning', () => {
  it('brings the middles onto one line, each by one coordinate', () => {
    const network = networkAt([0, 0], [30, 100], [70, 200]);
    expect([...aligned(network, IDS, 'left')]).toEqual([
      ['T1', { x: 0, y: 100 }],
      ['T2', { x: 0, y: 200 }],
    ]);
    expect([...aligned(network, IDS, 'centre').values()].map(({ x }) => x)).toEqual([40, 40, 40]);
    expect([...aligned(network, IDS, 'bottom').values()].map(({ y }) => y)).toEqual([200, 200]);
  });

  it('changes nothing the second time', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.integer({ min: -500, max: 500 }), fc.integer({ min: -500, max: 500 })), { minLength: 2 }),
        fc.constantFrom(...ALIGNMENTS),
        (places, alignment) => {
          const ids = places.map((_, i) => `T${String(i)}`);
          const network = networkAt(...places);
          const moved = aligned(network, ids, alignment);
          const after = networkAt(
            ...ids.map((id): [number, number] => placeOf(moved.get(id) ?? network.nodes.get(id)?.at)),
          );
          const across = new Set(['left', 'centre', 'right'].includes(alignment) ? xs(after) : ys(after));
          expect(across.size).toBe(1);
          if (alignment !== 'centre' && alignment !== 'middle') expect(aligned(after, ids, alignment).size).toBe(0);
        },
      ),
      { numRuns: 50 },
    );
  });
});

describe('distributing', () => {
  it('makes distances equal and leaves the outermost where they are', () => {
    const moved = distributed(networkAt([0, 0], [300, 50], [40, 100]), IDS, 'horizontally');
    expect([...moved]).toEqual([['T2', { x: 150, y: 100 }]]);
  });
});

describe('stacking', () => {
  it('is noticed with what moves and with what stands', () => {
    const network = networkAt([0, 0], [100, 0], [300, 0]);
    expect(stackedBy(network, aligned(network, ['T0', 'T1'], 'left'))).toEqual(['T1', 'T0']);
    expect(stackedBy(network, new Map([['T0', { x: 310, y: 0 }]]))).toEqual(['T0', 'T2']);
    expect(stackedBy(network, new Map([['T0', { x: 0, y: 200 }]]))).toBeUndefined();
  });
});

function placeOf(at: Position | undefined): [number, number] {
  return at === undefined ? [0, 0] : [at.x, at.y];
}
function xs(network: ReturnType<typeof networkAt>): number[] {
  return [...network.nodes.values()].map(({ at }) => at.x);
}
function ys(network: ReturnType<typeof networkAt>): number[] {
  return [...network.nodes.values()].map(({ at }) => at.y);
}
