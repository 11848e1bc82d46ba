import { describe, expect, it } from 'vitest';
import { pipeBore, pipeSizes } from './pipe-catalogue';

// The dimensions themselves are checked against print in tests/validation.
describe('pipeBore', () => {
  // ASME B36.10M: 1 in schedule 80, 33.4 mm less two walls of 4.55 mm.
  it('gives the bore as a round number of micrometres', () => {
    expect(pipeBore({ nps: '1', schedule: '80' })).toEqual({
      standard: 'ASME B36.10M',
      schedule: '80',
      nps: '1',
      dn: 25,
      outsideDiameterM: 0.0334,
      wallM: 0.00455,
      insideDiameterM: 0.0243,
    });
  });

  it.each([
    { nps: '1.5', schedule: '40' },
    { nps: '1 1/2', schedule: '40' },
    { nps: '1-1/2', schedule: 'Sch 40' },
    { nps: '1-1/2', schedule: '100' }, // made from 8 in up
    { nps: '8', schedule: 'EN 10255 medium' }, // made to 6 in
    { nps: 'constructor', schedule: 'toString' },
    { nps: '', schedule: '' },
  ])('does not know $nps in, schedule "$schedule"', (size) => {
    expect(pipeBore(size)).toBeUndefined();
  });
});

describe('pipeSizes', () => {
  it('lists each schedule once, sizes rising', () => {
    const names = pipeSizes().map(({ schedule }) => schedule);
    expect(new Set(names).size).toBe(names.length);
    for (const { schedule, sizes } of pipeSizes()) {
      const bores = sizes.map(({ insideDiameterM }) => insideDiameterM);
      expect(bores, schedule).toEqual([...bores].sort((a, b) => a - b));
      expect(bores[0], schedule).toBeGreaterThan(0);
    }
  });

  it('every size listed is found by its own name', () => {
    for (const { sizes } of pipeSizes()) for (const size of sizes) expect(pipeBore(size)).toBe(size);
  });
});
