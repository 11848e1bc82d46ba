import { describe, expect, it } from 'vitest';
import { ACCURACY_GRADES, limitAt, widestLimit } from './accuracy-grades';

function grade(id: string): (typeof ACCURACY_GRADES)[number] {
  const found = ACCURACY_GRADES.find((candidate) => candidate.id === id);
  if (found === undefined) throw new Error(`no grade ${id}`);
  return found;
}

describe('accuracy grades', () => {
  it('gives grade A two per cent in the outer quarters and one in the middle half', () => {
    const a = grade('asme-A');
    expect([0, 0.2, 0.25, 0.26, 0.5, 0.75, 0.8, 1, 1.2].map((share) => limitAt(a, share))).toEqual([
      0.02, 0.02, 0.02, 0.01, 0.01, 0.01, 0.02, 0.02, 0.02,
    ]);
    expect(widestLimit(a)).toBe(0.02);
  });

  it('gives a class its per cent on the whole scale', () => {
    for (const { standard, grade: name, parts } of ACCURACY_GRADES)
      if (standard === 'EN 837-1') expect(parts).toEqual([{ upTo: 1, limit: Number(name) / 100 }]);
  });
});
