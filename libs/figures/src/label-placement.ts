/** A rectangle on the sheet in pixels of the present zoom. */
export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** A label with the places it may take, best first. */
export interface LabelRequest {
  readonly key: string;
  readonly candidates: readonly Box[];
}

/** Two labels side by side keep this far apart, px; nearer, two numbers read as one. */
const APART = 4;

/** Boxes are looked up by square cells of this size, px; about the width of a label, so that one lies in few. */
const CELL = 64;

/**
 * Lays labels one after another, in order of right, each at its first free candidate. A label that finds no place is left out.
 * @param kept the candidates taken in the frame before: tried first, so that labels do not hop while something is dragged
 * @param window what is seen of the sheet: a place that its edge cuts is taken only where there is no whole one
 * @returns the index of the candidate taken, by key
 */
export function placeLabels(
  requests: readonly LabelRequest[],
  obstacles: readonly Box[],
  kept: ReadonlyMap<string, number> = new Map(),
  window?: Box,
): Map<string, number> {
  const taken = new TakenBoxes();
  for (const obstacle of obstacles) taken.take(obstacle);
  const placed = new Map<string, number>();
  for (const { key, candidates } of requests) {
    const order = kept.has(key) ? [kept.get(key) ?? 0, ...candidates.keys()] : wholeFirst(candidates, window);
    const index = order.find((i) => {
      const box = candidates[i];
      return box !== undefined && taken.isFree(box);
    });
    const box = index === undefined ? undefined : candidates[index];
    if (index === undefined || box === undefined) continue;
    taken.take({ ...box, x: box.x - APART, width: box.width + 2 * APART });
    placed.set(key, index);
  }
  return placed;
}

function wholeFirst(candidates: readonly Box[], window: Box | undefined): number[] {
  const order = [...candidates.keys()];
  if (window === undefined) return order;
  const cut = (i: number) => {
    const box = candidates[i];
    return box !== undefined && overlap(box, window) && !within(box, window);
  };
  return [...order.filter((i) => !cut(i)), ...order.filter(cut)];
}

class TakenBoxes {
  private readonly cells = new Map<number, Box[]>();

  take(box: Box): void {
    for (const cell of cellsOf(box)) {
      const there = this.cells.get(cell);
      if (there === undefined) this.cells.set(cell, [box]);
      else there.push(box);
    }
  }

  isFree(box: Box): boolean {
    for (const cell of cellsOf(box)) {
      if (this.cells.get(cell)?.some((other) => overlap(box, other)) === true) return false;
    }
    return true;
  }
}

function overlap(a: Box, b: Box): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;
}

function within(inner: Box, outer: Box): boolean {
  return (
    inner.x >= outer.x &&
    inner.y >= outer.y &&
    inner.x + inner.width <= outer.x + outer.width &&
    inner.y + inner.height <= outer.y + outer.height
  );
}

function* cellsOf({ x, y, width, height }: Box): Generator<number> {
  const [left, right] = [Math.floor(x / CELL), Math.floor((x + width) / CELL)];
  const [top, bottom] = [Math.floor(y / CELL), Math.floor((y + height) / CELL)];
  for (let column = left; column <= right; column++) {
    for (let row = top; row <= bottom; row++) yield column * 0x100000 + row;
  }
}
