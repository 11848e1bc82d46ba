import {
  inOrder,
  type NetworkDocument,
  type NetworkNode,
  type NodeKind,
  type PipeRun,
  type Position,
} from '@riseback/network';
import { type Axis, pointAt, rightAngled } from '../../shared/geometry';

/** A node with its place on the sheet. */
export interface DrawnNode {
  readonly id: string;
  readonly node: NetworkNode;
  readonly at: Position;
}

/** A pipe as the sheet shows it: its ends, its bends and the elbows between them. */
export interface DrawnPipe {
  readonly id: string;
  readonly pipe: PipeRun;
  readonly points: readonly Position[];
  /** Half-way along, where the pipe is pointed at and focused. */
  readonly at: Position;
}

export interface DrawnNetwork {
  readonly nodes: ReadonlyMap<string, DrawnNode>;
  readonly pipes: ReadonlyMap<string, DrawnPipe>;
  /** Pipe ids by the node they leave and enter, in the file's order. */
  readonly leaving: ReadonlyMap<string, readonly string[]>;
  readonly entering: ReadonlyMap<string, readonly string[]>;
}

export const EMPTY_DRAWING: DrawnNetwork = {
  nodes: new Map(),
  pipes: new Map(),
  leaving: new Map(),
  entering: new Map(),
};

/** What is being dragged or moved by keys, before it is set down. */
export interface Displaced {
  readonly nodes: ReadonlyMap<string, Position>;
  readonly bends: ReadonlyMap<string, readonly Position[]>;
}
export const NOTHING_DISPLACED: Displaced = { nodes: new Map(), bends: new Map() };

/** The network as it lies on the sheet, with what is being moved already in its new place. */
export function drawnNetwork(document: NetworkDocument, displaced: Displaced = NOTHING_DISPLACED): DrawnNetwork {
  const nodes = new Map<string, DrawnNode>();
  for (const [id, { value }] of inOrder(document.nodes)) {
    nodes.set(id, { id, node: value, at: displaced.nodes.get(id) ?? value.position ?? { x: 0, y: 0 } });
  }
  const pipes = new Map<string, DrawnPipe>();
  const leaving = new Map<string, string[]>();
  const entering = new Map<string, string[]>();
  for (const [id, { value }] of inOrder(document.pipes)) {
    const from = nodes.get(value.from);
    const to = nodes.get(value.to);
    if (from === undefined || to === undefined) continue;
    const bends = displaced.bends.get(id) ?? value.bends ?? [];
    const points = rightAngled([from.at, ...bends, to.at], leavingAxis(from.node.kind));
    const { x, y } = pointAt(points, 0.5);
    pipes.set(id, { id, pipe: value, points, at: { x, y } });
    push(leaving, value.from, id);
    push(entering, value.to, id);
  }
  return { nodes, pipes, leaving, entering };
}

/** The bends a pipe shows, its elbows included: what moving a bend starts from. */
export function shownBends({ points }: DrawnPipe): Position[] {
  return points.slice(1, -1);
}

/** Traps and vessels drain downwards or upwards; headers run level. */
export function leavingAxis(kind: NodeKind): Axis {
  return kind === 'junction' || kind === 'receiver' ? 'level' : 'upright';
}

function push(lists: Map<string, string[]>, key: string, value: string): void {
  const list = lists.get(key);
  if (list === undefined) lists.set(key, [value]);
  else list.push(value);
}
