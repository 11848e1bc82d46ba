import { describe, expect, it } from 'vitest';
import { sameOnCanvas } from './same-on-canvas';

const drawing = (x = 0, bend = 40, to = 'B') => ({
  nodes: [
    { id: 'A', at: { x, y: 0 } },
    { id: 'B', at: { x: 80, y: 0 } },
  ],
  links: [
    {
      id: 'P',
      from: 'A',
      to,
      points: [
        { x, y: 0 },
        { x: bend, y: 0 },
        { x: 80, y: 0 },
      ],
    },
  ],
});

describe('sameOnCanvas', () => {
  it('is true of a drawing that was made anew without anything in another place', () => {
    expect(sameOnCanvas(drawing(), drawing())).toBe(true);
  });

  it.each([
    ['a node has moved', drawing(40)],
    ['a bend has moved', drawing(0, 60)],
    ['a pipe leads elsewhere', drawing(0, 40, 'A')],
    ['an element has gone', { ...drawing(), links: [] }],
    ['elements changed places', { ...drawing(), nodes: [...drawing().nodes].reverse() }],
  ])('is false when %s', (_, other) => {
    expect(sameOnCanvas(drawing(), other)).toBe(false);
  });
});
