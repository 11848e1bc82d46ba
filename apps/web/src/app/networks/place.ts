import type { CollectionName, NetworkDocument } from '@riseback/network';
import { settingAt, type SettingPath } from './merged-settings';

/** One property of one element; without `key` the element as a whole. `id` is '' for the network's own settings. */
export interface Place {
  readonly in: CollectionName | 'network';
  readonly id: string;
  readonly key?: string;
  /** Within a setting of the network that is made of parts: which part. */
  readonly path?: SettingPath;
}

/** What stands at a place: nothing, as a removed element, or a value; an absent key is there with the value undefined. */
export type Side = { readonly there: false } | { readonly there: true; readonly value?: unknown };

export function placeKey({ in: collection, id, key, path = [] }: Place): string {
  return JSON.stringify(key === undefined ? [collection, id] : [collection, id, key, ...path]);
}

/** What stands at a place in a document. */
export function sideOf(document: NetworkDocument, place: Place): Side {
  if (place.in === 'network') {
    const setting = new Map<string, unknown>(Object.entries(document)).get(place.key ?? '');
    return { there: true, value: settingAt(setting, place.path ?? []) };
  }
  const element = document[place.in].get(place.id)?.value;
  if (element === undefined) return { there: false };
  if (place.key === undefined) return { there: true, value: element };
  return { there: true, value: new Map<string, unknown>(Object.entries(element)).get(place.key) };
}
