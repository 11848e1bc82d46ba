import { inOrder, type NetworkDocument, type Placed } from './network-document';
import type { NetworkFile, NetworkNode, PipeRun, Position } from './network-file';
import { drawTrees } from './tree-drawing';
import { spanningTrees } from './spanning-trees';

/** Positions stand on this grid, in drawing units. */
export const GRID = 20;

/** Beyond this the drawing would leave the range of coordinates, and nobody would see it whole either. */
const LARGEST_EXTENT = 5e6;

/**
 * Gives every node without a position one, the same for the same network: receivers at the right, the return walked upstream to the
 * left, traps above and below it in turn. Positions that are given stay; no two nodes share a spot.
 */
export function layoutMissingPositions<T extends NetworkFile | NetworkDocument>(network: T): T {
  // the result differs from T only in the positions, which the compiler cannot see
  return (isDocument(network) ? positionedDocument(network) : positionedFile(network)) as T;
}

function isDocument(network: NetworkFile | NetworkDocument): network is NetworkDocument {
  return network.nodes instanceof Map;
}

function positionedFile(file: NetworkFile): NetworkFile {
  const positions = missingPositions(file.nodes, file.pipes);
  if (positions.size === 0) return file;
  return { ...file, nodes: file.nodes.map((node) => withPosition(node, positions)) };
}

function positionedDocument(document: NetworkDocument): NetworkDocument {
  const nodes = inOrder(document.nodes).map(([, { value }]) => value);
  const positions = missingPositions(
    nodes,
    inOrder(document.pipes).map(([, { value }]) => value),
  );
  if (positions.size === 0) return document;
  const placed = new Map<string, Placed<NetworkNode>>();
  for (const [id, { ordinal, value }] of document.nodes)
    placed.set(id, { ordinal, value: withPosition(value, positions) });
  return { ...document, nodes: placed };
}

function withPosition(node: NetworkNode, positions: ReadonlyMap<string, Position>): NetworkNode {
  const position = positions.get(node.id);
  return position === undefined ? node : { ...node, position };
}

/** Positions for the nodes that have none. */
export function missingPositions(nodes: readonly NetworkNode[], pipes: readonly PipeRun[]): Map<string, Position> {
  const positions = new Map<string, Position>();
  if (nodes.every((node) => node.position !== undefined)) return positions;

  const trees = spanningTrees(nodes, pipes);
  const drawn = asDrawn(nodes, drawTrees(trees));
  const given = new Map(nodes.flatMap(({ id, position }) => (position === undefined ? [] : [[id, position] as const])));
  const taken = new Set(Array.from(given.values(), spot));
  const isNewDrawing = given.size === 0;
  for (const tree of trees) {
    // a tree that is partly drawn is carried on from what stands there: first the whole of it is moved, then each node hangs on its parent
    const anchor = tree.order.find((id) => given.has(id));
    const shift = anchor === undefined ? below(given, isNewDrawing) : difference(given.get(anchor), drawn.get(anchor));
    for (const id of tree.order) {
      if (given.has(id)) continue;
      const parent = tree.parents.get(id);
      const parentAt = parent === undefined ? undefined : (given.get(parent) ?? positions.get(parent));
      const offset = parent === undefined ? shift : difference(parentAt, drawn.get(parent));
      positions.set(id, freeSpot(add(drawn.get(id), offset), taken));
    }
  }
  return positions;
}

/** The drawing as computed, or a plain square of rows when it would be too large. */
function asDrawn(nodes: readonly NetworkNode[], drawn: ReadonlyMap<string, Position>): ReadonlyMap<string, Position> {
  let extent = 0;
  for (const { x, y } of drawn.values()) extent = Math.max(extent, Math.abs(x), Math.abs(y));
  if (extent <= LARGEST_EXTENT) return drawn;
  const perRow = Math.ceil(Math.sqrt(nodes.length));
  return new Map(
    nodes.map(({ id }, i) => [id, { x: (i % perRow) * 4 * GRID, y: Math.floor(i / perRow) * 4 * GRID }] as const),
  );
}

/** Where a tree goes that has no node drawn yet: under all that is. */
function below(given: ReadonlyMap<string, Position>, isNewDrawing: boolean): Position {
  if (isNewDrawing) return { x: 0, y: 0 };
  let lowest = -Infinity;
  for (const { y } of given.values()) lowest = Math.max(lowest, y);
  return { x: 0, y: Math.min(lowest, LARGEST_EXTENT) + 8 * GRID };
}

const ORIGIN: Position = { x: 0, y: 0 };

function difference(a: Position = ORIGIN, b: Position = ORIGIN): Position {
  return { x: a.x - b.x, y: a.y - b.y };
}

function add(a: Position = ORIGIN, b: Position = ORIGIN): Position {
  return { x: a.x + b.x, y: a.y + b.y };
}

/** The nearest free grid spot down from the one wished for (up, once the range of coordinates ends). */
function freeSpot(wished: Position, taken: Set<string>): Position {
  const x = onGrid(wished.x);
  let y = onGrid(wished.y);
  const step = y > 0.9 * COORDINATE_RANGE ? -GRID : GRID;
  while (taken.has(spot({ x, y }))) y += step;
  taken.add(spot({ x, y }));
  return { x, y };
}

const COORDINATE_RANGE = 1e7;

function onGrid(coordinate: number): number {
  const inRange = Math.max(-COORDINATE_RANGE, Math.min(COORDINATE_RANGE, coordinate));
  // + 0 turns −0 into 0, which JSON cannot tell apart
  return Math.round(inRange / GRID) * GRID + 0;
}

function spot({ x, y }: Position): string {
  return `${Math.round(x / GRID)},${Math.round(y / GRID)}`;
}
