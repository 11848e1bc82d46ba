import type { TagPatterns } from '@riseback/contracts';
import { inOrder, type NetworkDocument, type NetworkNode, type NodeKind, type PipeRun } from '@riseback/network';
import { nameOf } from '../../shared/element-words';
import { nextTag } from '../../shared/next-tag';

/** What a new element's fields are filled with, and where from: nothing is assumed silently. */
export interface DraftDefaults {
  readonly values: Readonly<Record<string, unknown>>;
  readonly hints: Readonly<Record<string, string>>;
}

/** Keys of the last element of a kind that the next one probably shares. */
const SHARED_KEYS: Readonly<Record<NodeKind, readonly string[]>> = {
  trap: ['elevationM', 'inletPressurePa', 'loadKgS', 'trapType'],
  junction: ['elevationM'],
  receiver: [],
  flashVessel: [],
  pumpedInlet: [],
};

/** The next tag, and what the last node of the kind has. */
export function nodeDefaults(kind: NodeKind, document: NetworkDocument, patterns: TagPatterns = {}): DraftDefaults {
  const nodes = inOrder(document.nodes).map(([, { value }]) => value);
  const alike = nodes.filter((node) => node.kind === kind);
  const tag = nextTag(kind, tagsOf(alike), takenTags(document), patterns[kind]);
  return filled(tag, alike.at(-1), SHARED_KEYS[kind]);
}

/** The next tag, and the length and size of the last pipe. */
export function pipeDefaults(document: NetworkDocument, patterns: TagPatterns = {}): DraftDefaults {
  const pipes = inOrder(document.pipes).map(([, { value }]) => value);
  const tag = nextTag('pipe', tagsOf(pipes), takenTags(document), patterns.pipe);
  return filled(tag, pipes.at(-1), ['lengthM', 'size', 'insideDiameterM']);
}

function filled(tag: string, last: NetworkNode | PipeRun | undefined, keys: readonly string[]): DraftDefaults {
  const known = new Map<string, unknown>(last === undefined ? [] : Object.entries(last));
  const values: Record<string, unknown> = tag === '' ? {} : { tag };
  const hints: Record<string, string> = {};
  for (const key of keys) {
    const value = known.get(key);
    if (value === undefined || last === undefined) continue;
    values[key] = value;
    hints[key] = `As ${nameOf(last)}`;
  }
  return { values, hints };
}

function tagsOf(elements: readonly { readonly tag?: string | undefined }[]): string[] {
  return elements.flatMap(({ tag }) => (tag === undefined ? [] : [tag]));
}

function takenTags(document: NetworkDocument): Set<string> {
  return new Set(tagsOf([...document.nodes.values(), ...document.pipes.values()].map(({ value }) => value)));
}
