import { describe, expect, it } from 'vitest';
import { pressureRamp } from './pressure-ramp';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const SI = { ...US, system: 'si' } as const;
/** 1 psi = 6,894.757 Pa (NIST SP 811). */
const psig = (value: number) => 101_325 + value * 6_894.757293168;

describe('pressureRamp', () => {
  it('lays seven classes of one round width over the network', () => {
    const { limits, unit } = pressureRamp([psig(0), psig(15), psig(30.5)], US);
    expect(limits).toEqual([0, 5, 10, 15, 20, 25, 30, 35]);
    expect(unit).toBe('psig');
  });

  it('follows a narrow network with narrow classes that need not begin at zero', () => {
    expect(pressureRamp([psig(30.2), psig(33.1)], US).limits).toEqual([30, 30.5, 31, 31.5, 32, 32.5, 33, 33.5]);
  });

  it('puts a pressure on a limit into the class above, and both ends of the scale into its end classes', () => {
    const { classOf } = pressureRamp([psig(0), psig(35)], US);
    expect([-3, 0, 4.99, 5, 34.9, 35, 80].map((value) => classOf(psig(value)))).toEqual([1, 1, 1, 2, 7, 7, 7]);
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
