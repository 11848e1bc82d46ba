import { computed, linkedSignal, type Signal, signal, untracked } from '@angular/core';
import { arrangeRows, nextSorting, type Sorting } from '../arrange-rows';
import { arrangeColumns, type ColumnChoice } from '../column-choice/column-choice';
import type { ListTable } from '../list-table';
import { type CellPosition, HEAD_ROW, within } from './cell-navigation';
import { gridLayout } from './grid-layout';
import { keepShown, NO_ROWS, type RowSelection } from './row-selection';

interface GridSource {
  readonly table: Signal<ListTable>;
  readonly filter: Signal<string>;
  readonly choice: Signal<ColumnChoice | null>;
  readonly mayEdit: Signal<boolean>;
}

/** Which rows and columns a grid shows, in which order, which rows are ticked, and where the person is. Knows nothing of the page. */
export class GridState {
  readonly sorting = signal<Sorting | null>(null);

  private readonly tableIds = computed(() => this.source.table().ids, { equal: sameItems });
  /** Values that change leave rows where they are: a row that jumps away under the hand is worse than an order a moment old. */
  readonly rowIds = computed(() => {
    this.tableIds();
    const [filter, sorting] = [this.source.filter(), this.sorting()];
    return untracked(() => arrangeRows(this.source.table(), filter, sorting));
  });
  readonly columns = computed(() =>
    arrangeColumns(this.source.table().columns, this.source.choice()).flatMap(({ column, shown }) =>
      shown ? [column] : [],
    ),
  );
  readonly layout = computed(() => gridLayout(this.columns(), this.source.mayEdit()));

  readonly selection = linkedSignal<readonly string[], RowSelection>({
    source: this.rowIds,
    computation: (order, previous) => keepShown(previous?.value ?? NO_ROWS, order),
  });
  readonly selectedIds = computed(() => this.rowIds().filter((id) => this.selection().ids.has(id)), {
    equal: sameItems,
  });
  readonly allTicked = computed(() => this.rowIds().length > 0 && this.selection().ids.size === this.rowIds().length);

  /** Null until the person has moved: the first row's tag. */
  private readonly position = signal<CellPosition | null>(null);
  readonly hasMoved = computed(() => this.position() !== null);
  readonly active = computed(() => this.bounded(this.position() ?? { row: 0, column: this.source.mayEdit() ? 1 : 0 }));
  readonly activeId = computed(() => this.rowIds()[this.active().row] ?? null);
  readonly activeCell = computed(() => this.layout().cells[this.active().column]);

  constructor(private readonly source: GridSource) {}

  moveTo(place: CellPosition): void {
    this.position.set(this.bounded(place));
  }

  /** The active row stays the same element in the new order. */
  sortBy(key: string): void {
    const [id, { row, column }] = [this.activeId(), this.active()];
    this.sorting.update((sorting) => nextSorting(sorting, key));
    if (id !== null && row !== HEAD_ROW) this.moveTo({ row: this.rowIds().indexOf(id), column });
  }

  private bounded(place: CellPosition): CellPosition {
    return within(place, { rows: this.rowIds().length, columns: this.layout().cells.length });
  }
}

function sameItems(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every((item, index) => item === b[index]);
}
