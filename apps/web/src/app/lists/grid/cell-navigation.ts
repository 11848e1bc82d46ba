/** A place in the grid; row −1 is the heads. */
export interface CellPosition {
  readonly row: number;
  readonly column: number;
}

export interface GridExtent {
  readonly rows: number;
  readonly columns: number;
  /** Rows that Page Up and Page Down go. */
  readonly page: number;
}

export const HEAD_ROW = -1;

/** Where a key leads from a cell; null for keys that do not move. */
export function cellAfterKey(
  { key, ctrl }: { readonly key: string; readonly ctrl: boolean },
  from: CellPosition,
  extent: GridExtent,
): CellPosition | null {
  const { row, column } = from;
  switch (key) {
    case 'ArrowDown':
      return within({ row: ctrl ? Infinity : row + 1, column }, extent);
    case 'ArrowUp':
      return within({ row: ctrl ? HEAD_ROW : row - 1, column }, extent);
    case 'ArrowRight':
      return within({ row, column: ctrl ? Infinity : column + 1 }, extent);
    case 'ArrowLeft':
      return within({ row, column: ctrl ? 0 : column - 1 }, extent);
    case 'Home':
      return within({ row: ctrl ? 0 : row, column: 0 }, extent);
    case 'End':
      return within({ row: ctrl ? Infinity : row, column: Infinity }, extent);
    case 'PageDown':
      return within({ row: row + extent.page, column }, extent);
    case 'PageUp':
      return within({ row: Math.max(0, row - extent.page), column }, extent);
    default:
      return null;
  }
}

/** The nearest place that the grid has. */
export function within({ row, column }: CellPosition, { rows, columns }: Omit<GridExtent, 'page'>): CellPosition {
  return {
    row: Math.max(HEAD_ROW, Math.min(row, rows - 1)),
    column: Math.max(0, Math.min(column, columns - 1)),
  };
}

/** How far a region must scroll so that the span [start, end) lies between what covers its two edges. */
export function scrollToShow(
  span: { readonly start: number; readonly end: number },
  region: { readonly offset: number; readonly size: number; readonly coveredStart: number },
): number {
  const { offset, size, coveredStart } = region;
  if (span.start < offset + coveredStart) return Math.max(0, span.start - coveredStart);
  if (span.end > offset + size) return span.end - size;
  return offset;
}
