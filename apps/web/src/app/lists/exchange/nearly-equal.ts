/** Of what was written out in one unit and read in another; far below what any gauge or drawing tells apart. */
const RELATIVE_ERROR = 1e-9;
/** In whatever SI unit: no length, pressure, flow or share of a plant is that small without being nothing. */
const ABSOLUTE_ERROR = 1e-12;

/** Whether two values of an element say the same, so that reading back what was written out changes nothing. */
export function nearlyEqual(a: unknown, b: unknown): boolean {
  if (typeof a === 'number' && typeof b === 'number') {
    return a === b || Math.abs(a - b) <= Math.max(ABSOLUTE_ERROR, RELATIVE_ERROR * Math.max(Math.abs(a), Math.abs(b)));
  }
  if (Array.isArray(a) && Array.isArray(b))
    return a.length === b.length && a.every((each, i) => nearlyEqual(each, b[i]));
  if (
    typeof a !== 'object' ||
    typeof b !== 'object' ||
    a === null ||
    b === null ||
    Array.isArray(a) ||
    Array.isArray(b)
  )
    return a === b;
  const [left, right] = [entries(a), entries(b)];
  return left.size === right.size && [...left].every(([key, value]) => nearlyEqual(value, right.get(key)));
}

function entries(value: object): Map<string, unknown> {
  return new Map(Object.entries(value).filter(([, each]) => each !== undefined));
}
