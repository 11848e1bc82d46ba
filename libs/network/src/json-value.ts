/** Nothing in a network file is nested deeper than four; the bound keeps a hostile value from exhausting the stack. */
const MAXIMUM_DEPTH = 16;

/**
 * Whether a value is plain JSON no deeper than any element needs: finite numbers, strings, booleans, null, arrays and plain objects.
 * A key `__proto__` is refused, because copying it by assignment would change an object instead of filling it.
 */
export function isPlainJson(value: unknown): boolean {
  return isPlainJsonTo(value, MAXIMUM_DEPTH);
}

function isPlainJsonTo(value: unknown, depth: number): boolean {
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return true;
  if (typeof value === 'number') return Number.isFinite(value);
  if (typeof value !== 'object' || depth === 0) return false;
  if (Array.isArray(value)) return value.every((item) => isPlainJsonTo(item, depth - 1));
  return Object.entries(value).every(([key, item]) => key !== '__proto__' && isPlainJsonTo(item, depth - 1));
}

/** Deep equality of plain JSON values. A key that holds undefined counts as absent, and −0 equals 0, as both do in JSON text. */
export function jsonEqual(a: unknown, b: unknown): boolean {
  if (a === b) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) || Array.isArray(b)) {
    return Array.isArray(a) && Array.isArray(b) && a.length === b.length && a.every((item, i) => jsonEqual(item, b[i]));
  }
  const [left, right] = [a as Record<string, unknown>, b as Record<string, unknown>];
  const keys = presentKeys(left);
  if (keys.length !== presentKeys(right).length) return false;
  // a key such as "constructor" stands on every object, so it must be the object's own
  return keys.every((key) => Object.hasOwn(right, key) && right[key] !== undefined && jsonEqual(left[key], right[key]));
}

function presentKeys(value: Record<string, unknown>): string[] {
  return Object.keys(value).filter((key) => value[key] !== undefined);
}

/** A JSON object and nothing else: neither null nor an array. */
export function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
