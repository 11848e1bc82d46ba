type Fields = Readonly<Record<string, unknown>>;

/** RFC 7396: what the patch names is replaced, what it sets to null goes, objects are merged; an object with nothing left in it goes too. */
export function mergePatched<T extends object>(target: T, patch: Fields): T {
  const merged = new Map<string, unknown>(Object.entries(target));
  for (const [key, value] of Object.entries(patch)) {
    if (value === null || value === undefined) merged.delete(key);
    else if (isFields(value)) {
      const there = merged.get(key);
      const inside = mergePatched(isFields(there) ? there : {}, value);
      if (Object.keys(inside).length === 0) merged.delete(key);
      else merged.set(key, inside);
    } else merged.set(key, value);
  }
  return Object.fromEntries(merged) as T;
}

function isFields(value: unknown): value is Fields {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
