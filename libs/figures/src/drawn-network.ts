import {
  inOrder,
  type NetworkDocument,
  type NetworkNode,
  type NodeKind,
  type PipeRun,
  type Position,
} from '@riseback/network';
import { type Axis, pointAt, rightAngled } from './geometry';
import { laneShift, laneShifts, setOff } from './parallel-lanes';

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
  /** How far it is set off from an earlier pipe on the same line, drawing units. */
  readonly lane: number;
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

/** The network as it lies on the sheet. */
export function drawnNetwork(document: NetworkDocument): DrawnNetwork {
  const nodes = new Map<string, DrawnNode>();
  for (const [id, { value }] of inOrder(document.nodes)) {
    nodes.set(id, { id, node: value, at: value.position ?? { x: 0, y: 0 } });
  }
  const pipes = new Map<string, DrawnPipe>();
  const leaving = new Map<string, string[]>();
  const entering = new Map<string, string[]>();
  for (const [, { value }] of inOrder(document.pipes)) {
    const drawn = drawnPipe(value, nodes, value.bends ?? [], 0);
    if (drawn === undefined) continue;
    pipes.set(value.id, drawn);
    push(leaving, value.from, value.id);
    push(entering, value.to, value.id);
  }
  const lines = [...pipes.values()].map(({ id, pipe: { from, to }, points }) => ({ id, from, to, points }));
  for (const [id, lane] of laneShifts(lines)) {
    const pipe = document.pipes.get(id)?.value;
    const drawn = pipe && drawnPipe(pipe, nodes, pipe.bends ?? [], lane);
    if (drawn !== undefined) pipes.set(id, drawn);
  }
  return { nodes, pipes, leaving, entering };
}

/** The same with some of it in another place. What is not touched stays the very same object, so that it is not drawn anew. */
export function withDisplaced(network: DrawnNetwork, displaced: Displaced): DrawnNetwork {
  const nodes = new Map(network.nodes);
  const touched = new Set(displaced.bends.keys());
  for (const [id, at] of displaced.nodes) {
    const drawn = nodes.get(id);
    if (drawn !== undefined) nodes.set(id, { ...drawn, at });
    for (const pipe of pipesAt(network, id)) touched.add(pipe);
  }
  const pipes = new Map(network.pipes);
  for (const id of touched) {
    const before = pipes.get(id);
    if (before === undefined) continue;
    const bends = displaced.bends.get(id);
    const lane = bends === undefined ? before.lane : 0;
    const drawn = drawnPipe(before.pipe, nodes, bends ?? before.pipe.bends ?? [], lane);
    if (drawn !== undefined) pipes.set(id, drawn);
  }
  return { ...network, nodes, pipes };
}

/** The bends that keep a new pipe clear of those that join the same nodes already; none where the way between them is free. */
export function bendsBeside(network: DrawnNetwork, fromId: string, toId: string): Position[] {
  const [from, to] = [network.nodes.get(fromId), network.nodes.get(toId)];
  if (from === undefined || to === undefined) return [];
  const there = pipesAt(network, fromId).flatMap((id) => {
    const pipe = network.pipes.get(id);
    return pipe === undefined || (pipe.pipe.from !== toId && pipe.pipe.to !== toId) ? [] : [pipe.points];
  });
  const line = rightAngled([from.at, to.at], leavingAxis(from.node.kind));
  for (let n = 0; n <= there.length; n++) {
    const candidate = n === 0 ? line : setOff(line, laneShift(n));
    if (!there.some((points) => sameLine(points, candidate))) return n === 0 ? [] : candidate.slice(1, -1);
  }
  return [];
}

/** The pipes that leave or enter a node. */
export function pipesAt({ leaving, entering }: DrawnNetwork, nodeId: string): string[] {
  return [...(leaving.get(nodeId) ?? []), ...(entering.get(nodeId) ?? [])];
}

/** The corners a pipe shows, its elbows included: what moving a bend starts from. */
export function shownBends({ points }: DrawnPipe): Position[] {
  return points.slice(1, -1);
}

/** Traps and vessels drain downwards or upwards; headers run level. */
export function leavingAxis(kind: NodeKind): Axis {
  return kind === 'junction' || kind === 'receiver' ? 'level' : 'upright';
}

function drawnPipe(
  pipe: PipeRun,
  nodes: ReadonlyMap<string, DrawnNode>,
  bends: readonly Position[],
  lane: number,
): DrawnPipe | undefined {
  const [from, to] = [nodes.get(pipe.from), nodes.get(pipe.to)];
  if (from === undefined || to === undefined) return undefined;
  const line = rightAngled([from.at, ...bends, to.at], leavingAxis(from.node.kind));
  const points = lane === 0 ? line : setOff(line, lane);
  const { x, y } = pointAt(points, 0.5);
  return { id: pipe.id, pipe, points, at: { x, y }, lane };
}

function sameLine(a: readonly Position[], b: readonly Position[]): boolean {
  const same = (c: readonly Position[]) => a.every(({ x, y }, i) => c[i]?.x === x && c[i].y === y);
  return a.length === b.length && (same(b) || same(b.toReversed()));
}

function push(lists: Map<string, string[]>, key: string, value: string): void {
  const list = lists.get(key);
  if (list === undefined) lists.set(key, [value]);
  else list.push(value);
}
