import canonicalize from 'canonicalize';
import { compareIds } from './network-document';
import type { NetworkFile } from './network-file';

/**
 * The RFC 8785 text of a JSON value: one text for one meaning, made to be hashed.
 * @throws TypeError for what JSON cannot say (undefined, a function); Error for NaN, ∞ and circles
 */
export function canonicalText(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('canonicalText: the value has no JSON text');
  return text;
}

/** The canonical text of a whole file, its lists sorted by id: the text behind `file_hash`. */
export function fileCanonicalText(file: NetworkFile): string {
  return canonicalText({
    ...file,
    nodes: sortedBy(file.nodes, 'id'),
    pipes: sortedBy(file.pipes, 'id'),
    trapModels: sortedBy(file.trapModels, 'id'),
    cases: sortedBy(file.cases, 'id').map((operatingCase) => ({
      ...operatingCase,
      overrides: sortedBy(operatingCase.overrides, 'node'),
    })),
    gauges: sortedBy(file.gauges, 'id'),
  });
}

/** A copy sorted by an id. */
export function sortedBy<K extends string, T extends { readonly [key in K]: string }>(list: readonly T[], key: K): T[] {
  return [...list].sort((a, b) => compareIds(a[key], b[key]));
}
