import { describe, expect, it } from 'vitest';
import type { NodeView, PipeView } from '../model/element-views';
import { commentMarks } from './comment-marks';

const trap = { node: { kind: 'trap' }, at: { x: 100, y: 50 } } as NodeView;
const pipe = {
  drawn: {
    points: [
      { x: 0, y: 0 },
      { x: 100, y: 0 },
    ],
  },
} as unknown as PipeView;
const views = { nodes: new Map([['T1', trap]]), pipes: new Map([['L1', pipe]]) };

describe('commentMarks', () => {
  it('shows the first number and how many more there are', () => {
    const marks = commentMarks(
      new Map([
        ['T1', [3]],
        ['L1', [4, 9, 12]],
      ]),
      views,
      1,
    );
    expect(marks.map(({ elementId, words }) => [elementId, words])).toEqual([
      ['T1', '3'],
      ['L1', '4 +2'],
    ]);
  });

  it('keeps clear of the symbol at every zoom, above it and right of it', () => {
    for (const zoom of [0.3, 1, 2.5]) {
      const [mark] = commentMarks(new Map([['T1', [1]]]), views, zoom);
      expect(mark?.box.x).toBeGreaterThan(100 * zoom);
      expect((mark?.box.y ?? Infinity) + (mark?.box.height ?? 0)).toBeLessThan(50 * zoom);
    }
  });

  it('leaves out what is not drawn any more', () => {
    expect(
      commentMarks(
        new Map([
          ['gone', [1]],
          ['T1', []],
        ]),
        views,
        1,
      ),
    ).toEqual([]);
  });
});
