/** Steps that people count in. */
const MANTISSAS = [1, 2, 2.5, 5, 10] as const;

/** Share of a step by which the range may stick out: what cannot be seen is not worth another step. */
const HAIR = 2e-3;

/**
 * Round numbers that hold a range: the first at or below `low`, the last at or above `high`, but for a hair.
 * @param most so many steps at most
 * @returns at least two numbers, also for a range of nothing
 */
export function niceTicks(low: number, high: number, most: number): number[] {
  const span = Math.max(high - low, 1e-6 * Math.max(1, Math.abs(low), Math.abs(high)));
  for (let exponent = Math.floor(Math.log10(span / most)); ; exponent += 1) {
    for (const mantissa of MANTISSAS) {
      const step = mantissa * 10 ** exponent;
      const first = Math.floor(low / step + HAIR);
      const last = Math.max(first + 1, Math.ceil(high / step - HAIR));
      // counted in whole steps, so that a tick prints as 0.3 and not as 0.30000000000000004
      if (last - first <= most) {
        return Array.from({ length: last - first + 1 }, (_, i) => Number(((first + i) * step).toPrecision(12)));
      }
    }
  }
}
