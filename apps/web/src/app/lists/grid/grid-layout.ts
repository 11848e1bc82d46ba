import { COLUMN_GROUPS, type ColumnGroup } from '../columns/column';
import type { TableColumn } from '../list-table';

interface CellBox {
  readonly widthPx: number;
  readonly leftPx: number;
  /** Set for cells that stay in sight while the rest scrolls sideways. */
  readonly stickyLeftPx: number | null;
}
export type GridCell = CellBox &
  ({ readonly kind: 'tick' } | { readonly kind: 'column'; readonly column: TableColumn; readonly opensGroup: boolean });

export interface GridLayout {
  readonly cells: readonly GridCell[];
  readonly groups: readonly { readonly group: ColumnGroup; readonly span: number; readonly first: number }[];
  /** grid-template-columns of every row. */
  readonly template: string;
  readonly widthPx: number;
  readonly stickyWidthPx: number;
}

const TICK_WIDTH_PX = 34;

/** Where each cell of a row stands. The name and what comes before it stay in sight; the last column takes the room that is left. */
export function gridLayout(columns: readonly TableColumn[], ticks: boolean): GridLayout {
  const stickyColumns = columns.findIndex(({ face }) => face === 'drawingLink') + 1 || 1;
  let left = 0;
  const boxOf = (widthPx: number, sticky: boolean): CellBox => {
    const box = { widthPx, leftPx: left, stickyLeftPx: sticky ? left : null };
    left += widthPx;
    return box;
  };
  const cells: GridCell[] = ticks ? [{ kind: 'tick', ...boxOf(TICK_WIDTH_PX, true) }] : [];
  columns.forEach((column, index) => {
    const opensGroup = index > 0 && columns[index - 1]?.group !== column.group;
    cells.push({ kind: 'column', column, opensGroup, ...boxOf(column.widthPx, index < stickyColumns) });
  });
  const widths = cells.map(({ widthPx }, index) =>
    index === cells.length - 1 ? `minmax(${String(widthPx)}px, 1fr)` : `${String(widthPx)}px`,
  );
  return {
    cells,
    groups: groupsOf(cells),
    template: widths.join(' '),
    widthPx: left,
    stickyWidthPx: cells.reduce((sum, { stickyLeftPx, widthPx }) => sum + (stickyLeftPx === null ? 0 : widthPx), 0),
  };
}

function groupsOf(cells: readonly GridCell[]): GridLayout['groups'] {
  return COLUMN_GROUPS.flatMap((group) => {
    const members = cells.flatMap((cell, index) => (groupOf(cell) === group ? [index] : []));
    const [first] = members;
    return first === undefined ? [] : [{ group, span: members.length, first }];
  });
}

function groupOf(cell: GridCell): ColumnGroup {
  return cell.kind === 'tick' ? 'element' : cell.column.group;
}
