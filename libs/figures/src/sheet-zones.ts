import type { Position } from '@riseback/network';

/** A field of the drawing sheet's reference grid, in drawing units; whole steps of the drawing's grid. */
export const FIELD = { width: 160, height: 120 } as const;
const MARGIN = 40;
const LEAST = { columns: 8, rows: 6 } as const;
/** I and O are left out, as ISO 5457 says, since they read as numbers. */
const LETTERS = 'ABCDEFGHJKLMNPQRSTUVWXYZ';

/** The sheet under the network: its top left corner and its fields. It grows by whole fields, so zones stay put while one draws inside it. */
export interface Sheet {
  readonly left: number;
  readonly top: number;
  readonly columns: number;
  readonly rows: number;
}

export function sheetAround(points: Iterable<Position>): Sheet {
  let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const { x, y } of points) {
    [left, right, top, bottom] = [Math.min(left, x), Math.max(right, x), Math.min(top, y), Math.max(bottom, y)];
  }
  if (left === Infinity) return { left: 0, top: 0, ...LEAST };
  const [firstColumn, firstRow] = [
    Math.floor((left - MARGIN) / FIELD.width),
    Math.floor((top - MARGIN) / FIELD.height),
  ];
  return {
    left: firstColumn * FIELD.width,
    top: firstRow * FIELD.height,
    columns: Math.max(LEAST.columns, Math.ceil((right + MARGIN) / FIELD.width) - firstColumn),
    rows: Math.max(LEAST.rows, Math.ceil((bottom + MARGIN) / FIELD.height) - firstRow),
  };
}

/** The zone of a place, such as C2: the letter of its row and the number of its column. */
export function zoneOf(position: Position, sheet: Sheet): string {
  const column = Math.floor((position.x - sheet.left) / FIELD.width);
  const row = Math.floor((position.y - sheet.top) / FIELD.height);
  return `${rowLetter(within(row, sheet.rows))}${String(within(column, sheet.columns) + 1)}`;
}

/** A, B, … Z, AA, AB, … without I and O. */
export function rowLetter(row: number): string {
  const letter = LETTERS.charAt(row % LETTERS.length);
  return row < LETTERS.length ? letter : rowLetter(Math.floor(row / LETTERS.length) - 1) + letter;
}

function within(index: number, count: number): number {
  return Math.min(count - 1, Math.max(0, index));
}
