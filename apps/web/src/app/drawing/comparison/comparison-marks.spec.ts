import { type Box, drawnNetwork } from '@riseback/figures';
import { fromFile, NetworkFileShape } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { comparisonMarks, ghosts } from './comparison-marks';
import type { ElementChangeAt } from './changes-at';

const earlier = drawnNetwork(
  fromFile(
    NetworkFileShape.parse({
      format: 'riseback-network',
      version: 1,
      name: 'Small',
      nodes: [
        {
          id: 'T1',
          kind: 'trap',
          tag: 'TR-1',
          elevationM: 0,
          inletPressurePa: 6e5,
          loadKgS: 0.05,
          position: { x: 100, y: 100 },
        },
        { id: 'R1', kind: 'receiver', elevationM: 0, vented: true, position: { x: 500, y: 300 } },
      ],
      pipes: [{ id: 'L1', tag: 'CR-1', from: 'T1', to: 'R1', lengthM: 6, insideDiameterM: 0.03 }],
    }),
  ),
);
const change: ElementChangeAt = { kind: 'changed', words: 'load', change: '+2.2', way: 'up', spoken: '' };
const gone = [
  { id: 'T1', name: 'TR-1', kind: 'node' as const },
  { id: 'L1', name: 'CR-1', kind: 'pipe' as const },
];
/** Nothing stands on the sheet any more but what is remembered of it. */
const empty = { nodes: new Map(), pipes: new Map(), earlier };

function overlap(a: Box, b: Box): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;
}

describe('marks of a comparison', () => {
  it('name what is gone, clear of each other and of what stands there', () => {
    const label = { x: 116, y: 60, width: 60, height: 60 };
    const marks = comparisonMarks({ ...empty, changes: new Map(), gone }, 1, [label]);
    expect(marks.map(({ text, kind }) => [text, kind])).toEqual([
      ['TR-1 removed', 'removed'],
      ['CR-1 removed', 'removed'],
    ]);
    const boxes = [label, ...marks.map(({ box }) => box)];
    expect(boxes.some((a, i) => boxes.some((b, j) => i < j && overlap(a, b)))).toBe(false);
  });

  it('keep their signs alone where there is no room for words, and from far away', () => {
    const wall = { x: -2_000, y: -2_000, width: 4_000, height: 4_000 };
    const gap = (marks: ReturnType<typeof comparisonMarks>) => marks.map(({ text }) => text);
    expect(gap(comparisonMarks({ ...empty, changes: new Map(), gone }, 1, [wall]))).toEqual(['', '']);
    expect(gap(comparisonMarks({ ...empty, changes: new Map(), gone }, 0.2, []))).toEqual(['', '']);
  });

  it('stay within what is seen where they can', () => {
    const seen = { x: 84, y: 0, width: 600, height: 400 };
    const [mark] = comparisonMarks({ ...empty, changes: new Map(), gone: gone.slice(0, 1) }, 1, [], seen);
    expect(mark?.box.x).toBeGreaterThanOrEqual(seen.x);
  });

  it('have none for an element that is not drawn', () => {
    expect(comparisonMarks({ ...empty, changes: new Map([['X9', change]]), gone: [] }, 1, [])).toEqual([]);
  });

  it('draw a ring where a node stood and a line where a pipe ran', () => {
    const [node, pipe] = ghosts({ gone, earlier }, 2);
    expect(node?.d).toMatch(/^M[\d.]+ 200\.0a/);
    expect(pipe?.d).toMatch(/^M200\.0 200\.0L.*L?1000\.0 600\.0$/);
  });
});
