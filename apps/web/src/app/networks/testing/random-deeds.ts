import {
  applyBatch,
  type EditBatch,
  type EditOp,
  emptyDocument,
  newElementId,
  nextOrdinal,
  type NetworkDocument,
  removalOps,
  setNetworkOp,
  setOp,
} from '@riseback/network';

/** What a person may do to a network; `pick` chooses among what the document then has. */
export interface Deed {
  readonly what: (typeof DEEDS)[number];
  readonly pick: number;
  readonly value: number;
}

/** Each as often as it stands here. */
export const DEEDS = ['set', 'set', 'set', 'addNode', 'addPipe', 'remove', 'override', 'limits'] as const;

/** Six nodes and some pipes between them. */
export const START = many(emptyDocument('Random'), [
  ...Array.from({ length: 6 }, (_, pick): Deed => ({ what: 'addNode', pick, value: 1 })),
  ...Array.from({ length: 6 }, (_, pick): Deed => ({ what: 'addPipe', pick: 7 * pick, value: 1 })),
]).document;

/** The operations of a deed on a document; none where there is nothing to do it to. */
export function opsOf(document: NetworkDocument, { what, pick, value }: Deed): EditOp[] {
  const nodes = [...document.nodes.keys()];
  const pipes = [...document.pipes.keys()];
  const node = nodes[pick % nodes.length];
  const pipe = pipes[pick % pipes.length];
  switch (what) {
    case 'addNode': {
      const trap = { kind: 'trap', inletPressurePa: 5e5, loadKgS: 0.1 };
      const id = newElementId(document, 'N');
      const kind = pick % 2 === 0 ? trap : { kind: 'junction' };
      return [
        { op: 'add', in: 'nodes', ordinal: nextOrdinal(document, 'nodes'), value: { id, elevationM: value, ...kind } },
      ];
    }
    case 'addPipe': {
      const to = nodes[(pick + Math.floor(value)) % nodes.length];
      if (node === undefined || to === undefined || to === node) return [];
      const id = newElementId(document, 'L');
      const ends = { from: node, to };
      return [
        {
          op: 'add',
          in: 'pipes',
          ordinal: nextOrdinal(document, 'pipes'),
          value: { id, ...ends, lengthM: value, insideDiameterM: 0.05 },
        },
      ];
    }
    case 'remove':
      return pick % 3 === 0 && pipe !== undefined
        ? removalOps(document, { pipes: [pipe] })
        : node === undefined
          ? []
          : removalOps(document, { nodes: [node] });
    case 'override': {
      if (node === undefined || document.nodes.get(node)?.value.kind !== 'trap') return [];
      const id = `C/${node}`;
      const aCase: EditOp[] = document.cases.has('C')
        ? []
        : [{ op: 'add', in: 'cases', ordinal: 0, value: { id: 'C', name: 'Case' } }];
      const key = pick % 2 === 0 ? 'loadKgS' : 'inletPressurePa';
      if (document.overrides.has(id)) return [setOp(document, 'overrides', id, key, value)];
      return [...aCase, { op: 'add', in: 'overrides', id, ordinal: 0, value: { node, [key]: value } }];
    }
    case 'limits':
      return [
        setNetworkOp(document, 'limits', {
          ...document.limits,
          velocity: { ...document.limits.velocity, [pick % 2 === 0 ? 'watchMS' : 'liquidMS']: value },
        }),
      ];
    default:
      if (pick % 2 === 0 && pipe !== undefined) return [setOp(document, 'pipes', pipe, 'lengthM', value)];
      return node === undefined ? [] : [setOp(document, 'nodes', node, 'elevationM', value)];
  }
}

/** One deed after the other; one that cannot be done is left out. */
export function many(
  start: NetworkDocument,
  deeds: readonly Deed[],
): { readonly document: NetworkDocument; readonly batches: readonly EditBatch[] } {
  const batches: EditBatch[] = [];
  let document = start;
  for (const one of deeds) {
    const ops = opsOf(document, one);
    const applied = applyBatch(document, ops);
    if (ops.length === 0 || !applied.ok) continue;
    document = applied.document;
    batches.push({ batchId: crypto.randomUUID(), label: one.what, ops });
  }
  return { document, batches };
}
