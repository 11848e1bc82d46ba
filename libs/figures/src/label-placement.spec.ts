import { describe, expect, it } from 'vitest';
import { type Box, placeLabels } from './label-placement';

const at = (x: number, y: number): Box => ({ x, y, width: 40, height: 14 });
const label = (key: string, ...candidates: Box[]) => ({ key, candidates });

describe('placeLabels', () => {
  it('takes the first free candidate, in order of right', () => {
    const placed = placeLabels([label('first', at(0, 0), at(100, 0)), label('second', at(10, 0), at(100, 0))], []);
    expect([...placed]).toEqual([
      ['first', 0],
      ['second', 1],
    ]);
  });

  it('leaves out a label that finds no place', () => {
    expect(placeLabels([label('first', at(0, 0)), label('second', at(39, 13))], []).has('second')).toBe(false);
  });

  it('lets labels touch one under the other, and side by side with a gap', () => {
    expect(
      placeLabels([label('first', at(0, 0)), label('second', at(44, 0)), label('third', at(0, 14))], []).size,
    ).toBe(3);
  });

  it('keeps clear of symbols and washes, also far from the origin', () => {
    const obstacle = { x: -1000, y: 500, width: 3000, height: 10 };
    expect(placeLabels([label('over it', at(-700, 495), at(-700, 470))], [obstacle]).get('over it')).toBe(1);
  });

  it('keeps the candidate of the frame before while it is free, so that labels do not hop', () => {
    const requests = [label('one', at(0, 0), at(100, 0))];
    expect(placeLabels(requests, [], new Map([['one', 1]])).get('one')).toBe(1);
    expect(placeLabels(requests, [at(100, 0)], new Map([['one', 1]])).get('one')).toBe(0);
  });

  it('never lays two labels over each other, whatever it is given', () => {
    const boxes = Array.from({ length: 400 }, (_, i) => at((i * 37) % 600, (i * 53) % 300));
    const requests = boxes.map((box, i) => label(String(i), box, { ...box, y: box.y + 15 }));
    const placed = placeLabels(requests, []);
    const laid = requests.flatMap(({ key, candidates }) => candidates[placed.get(key) ?? -1] ?? []);
    const clash = laid.some((a, i) =>
      laid
        .slice(i + 1)
        .some((b) => a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height),
    );
    expect(laid.length).toBeGreaterThan(50);
    expect(clash).toBe(false);
  });

  it('takes a place that the window cuts only where there is no whole one', () => {
    const window = { x: 0, y: 0, width: 100, height: 100 };
    const [cut, whole] = [
      { x: 90, y: 10, width: 20, height: 10 },
      { x: 50, y: 10, width: 20, height: 10 },
    ];
    expect(placeLabels([{ key: 'a', candidates: [cut, whole] }], [], undefined, window).get('a')).toBe(1);
    expect(placeLabels([{ key: 'a', candidates: [cut, whole] }], [whole], undefined, window).get('a')).toBe(0);
  });

  it('keeps numbers side by side apart', () => {
    const left = { x: 0, y: 0, width: 20, height: 10 };
    const touching = { x: 21, y: 0, width: 20, height: 10 };
    const placed = placeLabels(
      [
        { key: 'a', candidates: [left] },
        { key: 'b', candidates: [touching] },
      ],
      [],
    );
    expect([...placed.keys()]).toEqual(['a']);
  });
});
