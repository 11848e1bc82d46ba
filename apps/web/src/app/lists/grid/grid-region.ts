import { type CellPosition, HEAD_ROW, scrollToShow } from './cell-navigation';
import type { GridLayout } from './grid-layout';

export const ROW_HEIGHT_PX = 26;
/** Group heads and column heads, which cover the top of the region. */
const HEAD_HEIGHT_PX = 52;

/** Rows that a page key goes: one less than are in sight. */
export function rowsInSight(region: HTMLElement): number {
  return Math.max(1, Math.floor((region.clientHeight - HEAD_HEIGHT_PX) / ROW_HEIGHT_PX) - 1);
}

/** Scrolls the region no more than it takes to bring a cell into sight. */
export function showCell(region: HTMLElement, layout: GridLayout, { row, column }: CellPosition): void {
  if (row !== HEAD_ROW) {
    const start = HEAD_HEIGHT_PX + row * ROW_HEIGHT_PX;
    region.scrollTop = scrollToShow(
      { start, end: start + ROW_HEIGHT_PX },
      { offset: region.scrollTop, size: region.clientHeight, coveredStart: HEAD_HEIGHT_PX },
    );
  }
  const cell = layout.cells[column];
  if (cell === undefined || cell.stickyLeftPx !== null) return;
  region.scrollLeft = scrollToShow(
    { start: cell.leftPx, end: cell.leftPx + cell.widthPx },
    { offset: region.scrollLeft, size: region.clientWidth, coveredStart: layout.stickyWidthPx },
  );
}

/** The cell that was pressed; null for what is inside an editor or between cells. */
export function pressedCell({ target }: MouseEvent): CellPosition | null {
  if (!(target instanceof Element) || target.closest('app-cell-text-editor, app-cell-choice-editor') !== null) {
    return null;
  }
  const cell = target.closest<HTMLElement>('[data-row]');
  return cell === null ? null : { row: Number(cell.dataset['row']), column: Number(cell.dataset['column']) };
}
