/** How far a scale over powers of ten reaches, and where its lines stand. */
export interface LogScale {
  readonly low: number;
  readonly high: number;
  /** 1, 2 and 5 of each power of ten. */
  readonly ticks: readonly number[];
}

const MANTISSAS = [1, 2, 5] as const;
/** A hair, so that 10 made of 9.999999999 ends at 10. */
const HAIR = 1e-6;

/**
 * The shortest logarithmic scale that holds positive numbers and ends at a 1, a 2 or a 5 on either side.
 * @throws RangeError unless 0 < low ≤ high
 */
export function logScale(low: number, high: number): LogScale {
  if (!(low > 0 && high >= low)) throw new RangeError(`logScale: ${String(low)} to ${String(high)}`);
  const first = Math.floor(Math.log10(low)) - 1;
  const last = Math.ceil(Math.log10(high)) + 1;
  const all = Array.from({ length: last - first + 1 }, (_, i) => first + i).flatMap((exponent) =>
    // through text, so that a tick prints as 0.002 and not as 0.0020000000000000005
    MANTISSAS.map((mantissa) => Number(`${String(mantissa)}e${String(exponent)}`)),
  );
  const from = all.findLastIndex((tick) => tick <= low * (1 + HAIR));
  const to = all.findIndex((tick) => tick >= high * (1 - HAIR));
  const ticks = all.slice(from, Math.max(to, from + 1) + 1);
  return { low: ticks[0] ?? low, high: ticks.at(-1) ?? high, ticks };
}
