import type { Position } from '@riseback/network';
import { pieces } from '../../shared/geometry';
import { GRID } from '@riseback/figures';

/** What lies on the sheet, or is to be put on it. */
export interface Shape {
  readonly nodes: readonly Position[];
  readonly lines: readonly (readonly Position[])[];
}

/** Symbols stay four grid steps apart, so that their labels have room. */
const APART = 3;
const STRIDE = 2;
const FARTHEST_RING = 40;
const CELLS_A_ROW = 2 ** 22;

/**
 * The smallest shift, in grid steps outwards from a first wish, at which nothing of a shape meets anything that is there: no symbol
 * another symbol, no pipe a symbol, no pipe a pipe. Where there is no such place nearby the shape goes below everything.
 */
export function clearOffset(there: Shape, put: Shape, wish: Position): Position {
  const taken = new TakenCells(there);
  const cells = put.nodes.map(cellOf);
  const runs = put.lines.flatMap((line) => [...cellsAlong(line)]);
  const start = { column: Math.round(wish.x / GRID), row: Math.round(wish.y / GRID) };
  for (let ring = 0; ring <= FARTHEST_RING; ring++) {
    for (const [column, row] of around(ring)) {
      const by = { column: start.column + column * STRIDE, row: start.row + row * STRIDE };
      if (taken.leavesRoomFor(cells, runs, by)) return { x: by.column * GRID, y: by.row * GRID };
    }
  }
  return below(there, put, wish);
}

/** Everything that a shape has, for its bounds. */
function pointsOf({ nodes, lines }: Shape): Position[] {
  return [...nodes, ...lines.flat()];
}

function below(there: Shape, put: Shape, wish: Position): Position {
  const lowest = pointsOf(there).reduce((low, { y }) => Math.max(low, y), -Infinity);
  const highest = pointsOf(put).reduce((high, { y }) => Math.min(high, y), Infinity);
  const y = Math.ceil((lowest - highest) / GRID + 2 * APART) * GRID;
  return { x: Math.round(wish.x / GRID) * GRID, y };
}

/** Shifts of one ring: right and down first. */
function around(ring: number): [number, number][] {
  if (ring === 0) return [[0, 0]];
  const found: [number, number][] = [];
  for (let step = 0; step <= ring; step++) {
    for (const side of step === 0 ? [0] : [step, -step]) {
      found.push([ring, side], [side, ring], [-ring, side], [side, -ring]);
    }
  }
  return found;
}

interface Cell {
  readonly column: number;
  readonly row: number;
}

class TakenCells {
  private readonly nearNodes = new Set<number>();
  private readonly lines = new Set<number>();
  private readonly symbols = new Set<number>();

  constructor({ nodes, lines }: Shape) {
    for (const { column, row } of nodes.map(cellOf)) {
      for (let c = column - APART; c <= column + APART; c++) {
        for (let r = row - APART; r <= row + APART; r++) this.nearNodes.add(key(c, r));
      }
      for (let c = column - 1; c <= column + 1; c++) {
        for (let r = row - 1; r <= row + 1; r++) this.symbols.add(key(c, r));
      }
    }
    for (const line of lines) for (const { column, row } of cellsAlong(line)) this.lines.add(key(column, row));
  }

  leavesRoomFor(nodes: readonly Cell[], runs: readonly Cell[], by: Cell): boolean {
    for (const { column, row } of nodes) {
      const cell = key(column + by.column, row + by.row);
      if (this.nearNodes.has(cell) || this.lines.has(cell)) return false;
    }
    for (const { column, row } of runs) {
      const cell = key(column + by.column, row + by.row);
      if (this.lines.has(cell) || this.symbols.has(cell)) return false;
    }
    return true;
  }
}

function* cellsAlong(line: readonly Position[]): Generator<Cell> {
  for (const [a, b] of pieces(line)) {
    const [from, to] = [cellOf(a), cellOf(b)];
    const steps = Math.max(Math.abs(to.column - from.column), Math.abs(to.row - from.row));
    for (let i = 0; i <= steps; i++) {
      const share = steps === 0 ? 0 : i / steps;
      yield {
        column: Math.round(from.column + (to.column - from.column) * share),
        row: Math.round(from.row + (to.row - from.row) * share),
      };
    }
  }
}

function cellOf({ x, y }: Position): Cell {
  return { column: Math.round(x / GRID), row: Math.round(y / GRID) };
}

function key(column: number, row: number): number {
  return column * CELLS_A_ROW + row;
}
