import { describe, expect, it } from 'vitest';
import { pressureRamp } from './pressure-ramp';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const SI = { ...US, system: 'si' } as const;
/** 1 psi = 6,894.757 Pa (NIST SP 811). */
const psig = (value: number) => 101_325 + value * 6_894.757293168;

describe('pressureRamp', () => {
  it('lays even classes over pressures that lie evenly', () => {
    const { limits, unit } = pressureRamp([0, 10, 20, 30, 40, 50, 60, 70].map(psig), US);
    expect(limits).toEqual([0, 10, 20, 30, 40, 50, 60, 70]);
    expect(unit).toBe('psig');
  });

  it('follows a narrow network with narrow classes that need not begin at zero', () => {
    // 2.9 psi in seven parts of 0.414, to the tenth
    expect(pressureRamp([psig(30.2), psig(33.1)], US).limits).toEqual([30.2, 30.6, 31, 31.4, 31.9, 32.3, 32.7, 33.1]);
  });

  it('gives the pressures that crowd together the narrow classes', () => {
    // of 12 pressures 11 stand in the last tenth of the span. With v/140 + i/22 as the share below the i-th, of pressure v, the sevenths
    // fall at 18.1, 36.2 and 54.2, then within the crowd; on a grid of 5 the crowd takes the last four classes
    const { limits } = pressureRamp([0, 60, 61, 62, 63, 64, 65, 66, 67, 68, 69, 70].map(psig), US);
    expect(limits).toEqual([0, 20, 35, 50, 55, 60, 65, 70]);
  });

  it('lets no class be wider than two sevenths of the span, but for the rounding', () => {
    let seed = 11;
    const random = () => (seed = (seed * 16_807) % 2_147_483_647) / 2_147_483_647;
    for (let trial = 0; trial < 200; trial += 1) {
      const crowd = 40 * random();
      const values = Array.from({ length: 40 }, (_, i) => (i < 30 ? crowd + random() : 60 * random()));
      const { limits } = pressureRamp(values.map(psig), US);
      const span = Math.max(...values) - Math.min(...values);
      const widest = Math.max(...limits.slice(1).map((limit, i) => limit - (limits[i] ?? NaN)));
      // the grid is at most a fifteenth of the span, and each end is rounded to it
      expect(widest).toBeLessThanOrEqual((2 / 7 + 2 / 15) * span);
    }
  });

  it('puts a pressure on a limit into the class above, and both ends of the scale into its end classes', () => {
    const { classOf } = pressureRamp([psig(0), psig(70)], US);
    expect([-3, 0, 9.99, 10, 69.9, 70, 80].map((value) => classOf(psig(value)))).toEqual([1, 1, 1, 2, 7, 7, 7]);
  });

  it.each([[[]], [[psig(0)]], [[psig(15), psig(15)]], [[NaN, Infinity]]])('stands for %j too', (pressures) => {
    const { limits, classOf } = pressureRamp(pressures, US);
    expect(limits).toHaveLength(8);
    expect(limits.every((limit, i) => i === 0 || limit > (limits[i - 1] ?? Infinity))).toBe(true);
    expect(classOf(pressures[0] ?? psig(0))).toBeGreaterThanOrEqual(1);
  });

  it.each([US, SI])(
    'holds every pressure it was made from in its scale and spreads it over at least three of the classes ($system)',
    (units) => {
      let seed = 7;
      const random = () => (seed = (seed * 16_807) % 2_147_483_647) / 2_147_483_647;
      for (let trial = 0; trial < 500; trial += 1) {
        const low = psig(-5 + 100 * random());
        const high = low + 10 ** (4 + 2 * random());
        const { limits } = pressureRamp([low, high], units);
        const [first = NaN, last = NaN] = [limits[0], limits[7]];
        const shown = (pa: number) =>
          units.system === 'us' ? (pa - 101_325) / 6_894.757293168 : (pa - 101_325) / 1_000;
        expect(first).toBeLessThanOrEqual(shown(low) + 1e-6);
        expect(last).toBeGreaterThanOrEqual(shown(high) - 1e-6);
        expect(last - first).toBeLessThan((7 / 3) * (shown(high) - shown(low)));
      }
    },
  );
});
