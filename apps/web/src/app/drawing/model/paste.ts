import type { TaggedKind, TagPatterns } from '@riseback/contracts';
import {
  type EditOp,
  inOrder,
  newElementId,
  type NetworkDocument,
  nextOrdinal,
  type Position,
  type TrapModel,
} from '@riseback/network';
import type { Clip } from './clip';
import { copiedTag } from './copied-tag';
import { ID_PREFIXES } from './id-prefixes';

export interface Pasted {
  readonly ops: readonly EditOp[];
  /** The new ids, in the order of the piece. */
  readonly nodes: readonly string[];
  readonly pipes: readonly string[];
}

/** The edit that puts a piece into a network, shifted, under new ids and tags; its trap models are matched with those there or go along. */
export function pasteOps(
  document: NetworkDocument,
  { part, siteId, cut }: Clip,
  by: Position,
  here: string,
  patterns: TagPatterns = {},
): Pasted {
  const tags = new TakenTags(document, cut, patterns);
  const ids = new NewIds(document);
  const models = modelsFor(document, part, siteId === here, ids);
  const ops: EditOp[] = [...models.ops];
  const newId = new Map<string, string>();
  let ordinal = nextOrdinal(document, 'nodes');
  for (const [oldId, { value }] of inOrder(part.nodes)) {
    const id = ids.next(ID_PREFIXES[value.kind]);
    newId.set(oldId, id);
    const model = value.kind === 'trap' && value.trapModel !== undefined ? models.idOf.get(value.trapModel) : undefined;
    const changed = {
      ...value,
      id,
      ...tags.given(value.kind, value.tag),
      position: shifted(value.position ?? { x: 0, y: 0 }, by),
      ...(model === undefined ? {} : { trapModel: model }),
    };
    ops.push({ op: 'add', in: 'nodes', ordinal: ordinal++, value: changed });
  }
  const pipeIds: string[] = [];
  ordinal = nextOrdinal(document, 'pipes');
  for (const [, { value }] of inOrder(part.pipes)) {
    const [from, to] = [newId.get(value.from), newId.get(value.to)];
    if (from === undefined || to === undefined) continue;
    const id = ids.next(ID_PREFIXES.pipe);
    pipeIds.push(id);
    const bends = value.bends === undefined ? {} : { bends: value.bends.map((bend) => shifted(bend, by)) };
    const changed = { ...value, id, from, to, ...tags.given('pipe', value.tag), ...bends };
    ops.push({ op: 'add', in: 'pipes', ordinal: ordinal++, value: changed });
  }
  return { ops, nodes: [...newId.values()], pipes: pipeIds };
}

/** Which model of the network each of the piece's models is, with the operations that add the missing ones. */
function modelsFor(
  document: NetworkDocument,
  part: NetworkDocument,
  sameSite: boolean,
  ids: NewIds,
): { readonly idOf: ReadonlyMap<string, string>; readonly ops: readonly EditOp[] } {
  const there = new Map([...document.trapModels].map(([id, { value }]) => [sameness(value), id]));
  const idOf = new Map<string, string>();
  const ops: EditOp[] = [];
  let ordinal = nextOrdinal(document, 'trapModels');
  for (const [oldId, { value }] of inOrder(part.trapModels)) {
    const { libraryId: _id, libraryVersion: _version, ...untied } = value;
    const model = sameSite ? value : untied;
    const known = there.get(sameness(model));
    if (known === undefined) {
      const id = ids.next(ID_PREFIXES.trapModel);
      ops.push({ op: 'add', in: 'trapModels', ordinal: ordinal++, value: { ...model, id } });
      idOf.set(oldId, id);
    } else idOf.set(oldId, known);
  }
  return { idOf, ops };
}

/** Models are the same when all but their ids is. */
function sameness({ id: _, ...rest }: TrapModel): string {
  return JSON.stringify(Object.entries(rest).sort(([a], [b]) => (a < b ? -1 : 1)));
}

/** Counts on from the highest number of each prefix, which is looked up once: a piece may have thousands of elements. */
class NewIds {
  private readonly highest = new Map<string, number>();

  constructor(private readonly document: NetworkDocument) {}

  next(prefix: string): string {
    const last = this.highest.get(prefix) ?? Number(newElementId(this.document, prefix).slice(prefix.length)) - 1;
    this.highest.set(prefix, last + 1);
    return `${prefix}${String(last + 1)}`;
  }
}

class TakenTags {
  private readonly taken: Set<string>;

  constructor(
    document: NetworkDocument,
    private readonly keepFree: boolean,
    private readonly patterns: TagPatterns,
  ) {
    this.taken = new Set(
      [...document.nodes.values(), ...document.pipes.values()].flatMap(({ value: { tag } }) =>
        tag === undefined ? [] : [tag],
      ),
    );
  }

  given(kind: TaggedKind, tag: string | undefined): { readonly tag?: string } {
    if (tag === undefined) return {};
    const made = this.keepFree && !this.taken.has(tag) ? tag : copiedTag(tag, this.taken, this.patterns[kind]);
    this.taken.add(made);
    return { tag: made };
  }
}

function shifted({ x, y }: Position, by: Position): Position {
  return { x: x + by.x, y: y + by.y };
}
