import { isObject, jsonEqual } from '@riseback/network';

/**
 * Settings are stored whole but changed key by key: one person's limit and another's are merged.
 * @returns undefined where both changed one key, each in another way
 */
export function mergedSettings(from: unknown, mine: unknown, theirs: unknown): { readonly value: unknown } | undefined {
  if (jsonEqual(from, theirs)) return { value: mine };
  if (jsonEqual(from, mine) || jsonEqual(mine, theirs)) return { value: theirs };
  if (!isObject(mine) || !isObject(theirs)) return undefined;
  const old = isObject(from) ? from : {};
  const merged = new Map<string, unknown>();
  for (const key of new Set([...Object.keys(theirs), ...Object.keys(mine)])) {
    const one = mergedSettings(old[key], mine[key], theirs[key]);
    if (one === undefined) return undefined;
    if (one.value !== undefined) merged.set(key, one.value);
  }
  return { value: Object.fromEntries(merged) };
}
