import { isObject, jsonEqual } from '@riseback/network';

export interface MergedSettings {
  /** Both persons' changes; where both changed one key, each in another way, it has theirs. */
  readonly value: unknown;
  /** Where that is so, as keys from the outside in. */
  readonly clashes: readonly SettingPath[];
}
export type SettingPath = readonly string[];

/** Settings are stored whole but changed key by key: one person's limit and another's are merged. */
export function mergedSettings(from: unknown, mine: unknown, theirs: unknown): MergedSettings {
  if (jsonEqual(from, theirs)) return { value: mine, clashes: [] };
  if (jsonEqual(from, mine) || jsonEqual(mine, theirs)) return { value: theirs, clashes: [] };
  if (!isObject(mine) || !isObject(theirs)) return { value: theirs, clashes: [[]] };
  const old = isObject(from) ? from : {};
  const merged = new Map<string, unknown>();
  const clashes: SettingPath[] = [];
  for (const key of new Set([...Object.keys(theirs), ...Object.keys(mine)])) {
    const one = mergedSettings(old[key], mine[key], theirs[key]);
    if (one.value !== undefined) merged.set(key, one.value);
    clashes.push(...one.clashes.map((path) => [key, ...path]));
  }
  return { value: Object.fromEntries(merged), clashes };
}

export function settingAt(settings: unknown, path: SettingPath): unknown {
  return path.reduce<unknown>((held, key) => (isObject(held) ? held[key] : undefined), settings);
}

/** The settings with one of them set; without a value its key is absent, and a group that it leaves empty too. */
export function withSetting(settings: unknown, [key, ...rest]: SettingPath, to: unknown): unknown {
  if (key === undefined) return to;
  const held: Readonly<Record<string, unknown>> = isObject(settings) ? settings : {};
  const inner = withSetting(held[key], rest, to);
  const absent = inner === undefined || (rest.length > 0 && isObject(inner) && Object.keys(inner).length === 0);
  const others = Object.entries(held).filter(([name]) => name !== key);
  return Object.fromEntries(absent ? others : [...others, [key, inner]]);
}
