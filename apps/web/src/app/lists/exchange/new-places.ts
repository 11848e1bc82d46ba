import {
  type EditOp,
  GRID,
  inOrder,
  missingPositions,
  type NetworkDocument,
  type NetworkNode,
  type PipeRun,
  type Position,
  setOp,
} from '@riseback/network';

/** Room for a symbol with its label on each side. */
const STEP: Position = { x: 8 * GRID, y: 6 * GRID };
/** Rows are longer than columns are high, as a sheet is. */
const WIDTH_OVER_HEIGHT = 1.6;

/** Places for new elements that nothing leads to yet: rows under all that is drawn. */
export function placesBelow(document: NetworkDocument, count: number): Position[] {
  const drawn = [
    ...Array.from(document.nodes.values(), ({ value }) => value.position ?? []).flat(),
    ...Array.from(document.pipes.values(), ({ value }) => value.bends ?? []).flat(),
  ];
  const left = drawn.reduce((least, { x }) => Math.min(least, x), Infinity);
  const lowest = drawn.reduce((most, { y }) => Math.max(most, y), -Infinity);
  const start = drawn.length === 0 ? { x: 0, y: 0 } : { x: onGrid(left), y: onGrid(lowest) + 2 * STEP.y };
  const perRow = Math.ceil(Math.sqrt(count * WIDTH_OVER_HEIGHT));
  return Array.from({ length: count }, (_, index) => ({
    x: start.x + (index % perRow) * STEP.x,
    y: start.y + Math.floor(index / perRow) * STEP.y,
  }));
}

/** The nodes that no pipe leads to or from before, and that new pipes join. */
export function newlyJoined(document: NetworkDocument, newPipes: readonly PipeRun[]): NetworkNode[] {
  const joined = new Set(Array.from(document.pipes.values(), ({ value }) => [value.from, value.to]).flat());
  const ends = new Set(newPipes.flatMap(({ from, to }) => [from, to]));
  return inOrder(document.nodes).flatMap(([id, { value }]) => (ends.has(id) && !joined.has(id) ? [value] : []));
}

/** Lays those nodes out along the pipes, as a file without positions is laid out; no other node moves. */
export function arrangingOps(document: NetworkDocument, newPipes: readonly PipeRun[]): EditOp[] {
  const moving = new Set(newlyJoined(document, newPipes).map(({ id }) => id));
  const nodes = inOrder(document.nodes).map(([id, { value }]) => (moving.has(id) ? unplaced(value) : value));
  const pipes = [...inOrder(document.pipes).map(([, { value }]) => value), ...newPipes];
  return [...missingPositions(nodes, pipes)].map(([id, position]) =>
    setOp(document, 'nodes', id, 'position', position),
  );
}

function unplaced({ position: _, ...node }: NetworkNode): NetworkNode {
  return node;
}

function onGrid(coordinate: number): number {
  return Math.ceil(coordinate / GRID) * GRID;
}
