import { CdkConnectedOverlay, CdkOverlayOrigin, type ConnectedPosition } from '@angular/cdk/overlay';
import {
  CdkFixedSizeVirtualScroll,
  CdkVirtualForOf,
  CdkVirtualScrollableElement,
  CdkVirtualScrollViewport,
} from '@angular/cdk/scrolling';
import {
  ChangeDetectionStrategy,
  ChangeDetectorRef,
  Component,
  computed,
  effect,
  type ElementRef,
  inject,
  input,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { displayUnit, type DisplayUnits, formatQuantity } from '@riseback/units';
import { CompanyMark } from '../../networks/company-mark';
import { Staff } from '../../results/staff/staff';
import { BANDS_TO_COME } from '../../shared/bands-to-come';
import { StatusMark } from '../../shared/status-mark/status-mark';
import type { Sorting } from '../arrange-rows';
import type { ColumnChoice } from '../column-choice/column-choice';
import type { DialogName } from '../columns/column';
import type { CellView, ListTable, TableColumn } from '../list-table';
import { CellChoiceEditor } from './cell-choice-editor';
import { type CellEdit, CellEditing } from './cell-editing';
import { type CellPosition, cellAfterKey, HEAD_ROW } from './cell-navigation';
import { type AfterEdit, CellTextEditor } from './cell-text-editor';
import { pressedCell, ROW_HEIGHT_PX, rowsInSight, showCell } from './grid-region';
import { GridState } from './grid-state';
import { extendRows, NO_ROWS, type RowSelection, toggleAllRows, toggleRow } from './row-selection';

export interface GridInSight {
  readonly keys: readonly string[];
  readonly fromKey: string;
  readonly ids: readonly string[];
  readonly fromRow: number;
  readonly selected: readonly string[];
}

let gridCount = 0;

/**
 * A list as a grid by the WAI-ARIA pattern: one tab stop, which keeps the focus while `aria-activedescendant` names the active cell, so
 * that a row scrolled out of the window never takes the focus with it. Only the rows in sight are in the page.
 */
@Component({
  selector: 'app-list-grid',
  imports: [
    CdkConnectedOverlay,
    CdkFixedSizeVirtualScroll,
    CdkOverlayOrigin,
    CdkVirtualForOf,
    CdkVirtualScrollableElement,
    CdkVirtualScrollViewport,
    CellChoiceEditor,
    CellTextEditor,
    CompanyMark,
    Staff,
    StatusMark,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './list-grid.html',
  styleUrl: './list-grid.scss',
})
export class ListGrid {
  private readonly changeDetector = inject(ChangeDetectorRef);

  readonly table = input.required<ListTable>();
  readonly label = input.required<string>();
  /** What the rows are, over the first columns. */
  readonly elementWord = input.required<string>();
  readonly emptyWords = input.required<string>();
  readonly filter = input('');
  readonly choice = input<ColumnChoice | null>(null);
  readonly mayEdit = input(false);
  /** The results shown are those of an earlier state of the network. */
  readonly stale = input(false);
  readonly units = input.required<DisplayUnits>();
  readonly staffTopPa = input.required<number>();
  readonly limitPa = input<(id: string) => number | undefined>(() => undefined);
  /** Rows as spreadsheets take them from the clipboard. */
  readonly written = input<(keys: readonly string[], ids: readonly string[]) => string>(() => '');
  readonly edited = output<CellEdit>();
  readonly dialogWanted = output<{ id: string; dialog: DialogName }>();
  readonly drawingWanted = output<string>();
  /** The ticked rows in the order shown; again when the filter or a deletion takes some away. */
  readonly selectedChange = output<readonly string[]>();
  readonly activeChange = output<string>();
  /** The active column's key: what the first ticked row has there is wanted in all the others. */
  readonly fillDownWanted = output<string>();
  /** Cells from the clipboard, meant for the rows from the active one on. */
  readonly pasted = output<string>();
  /** For the page's live region. */
  readonly told = output<string>();

  private readonly region = viewChild.required<ElementRef<HTMLElement>>('region');

  protected readonly bandsToCome = inject(BANDS_TO_COME, { optional: true }) ?? (() => false);
  protected readonly gridId = `list-${String(++gridCount)}`;
  protected readonly ROW_HEIGHT_PX = ROW_HEIGHT_PX;
  protected readonly HEAD_ROW = HEAD_ROW;
  protected readonly trackId = (_: number, id: string): string => id;
  protected readonly besideCell: ConnectedPosition[] = [
    { originX: 'end', originY: 'bottom', overlayX: 'end', overlayY: 'top', offsetY: 4 },
    { originX: 'end', originY: 'top', overlayX: 'end', overlayY: 'bottom', offsetY: -4 },
  ];
  protected readonly state = new GridState(this);
  protected readonly editing = new CellEditing({
    table: this.table,
    mayEdit: this.mayEdit,
    activeId: this.state.activeId,
    activeCell: this.state.activeCell,
    edited: (edit) => this.edited.emit(edit),
    dialogWanted: (asked) => this.dialogWanted.emit(asked),
    told: (words) => this.told.emit(words),
    left: (then) => this.moveAfterEdit(then),
    // at once, so that the next key typed already falls into the box
    opened: () => this.changeDetector.detectChanges(),
  });
  protected readonly focused = signal(false);

  protected readonly activeCellId = computed(() => {
    const { row, column } = this.state.active();
    return row === HEAD_ROW || this.state.rowIds().length > 0 ? this.cellId(row, column) : null;
  });
  protected readonly staffScale = computed(() => {
    const { system, atmosphericPressurePa } = this.units();
    const [from, to] = [atmosphericPressurePa, this.staffTopPa()].map((pa) =>
      formatQuantity(pa, 'pressure', this.units(), { decimals: 0 }),
    );
    return `${from ?? ''} to ${to ?? ''} ${displayUnit('pressure', system)}`;
  });
  constructor() {
    effect(() => {
      const ids = this.state.selectedIds();
      untracked(() => {
        this.selectedChange.emit(ids);
      });
    });
  }

  /** Puts the active cell on a row, in sight; false when the list does not show it. */
  showRow(id: string): boolean {
    const row = this.state.rowIds().indexOf(id);
    if (row < 0) return false;
    this.moveTo({ row, column: this.state.active().column });
    this.focus();
    this.scrollToActiveSoon();
    return true;
  }

  /** The row that the person is on; null until they have moved. */
  shownRow(): string | null {
    return this.state.hasMoved() ? this.state.activeId() : null;
  }

  /** What is in sight, in its order, and where the person is in it. */
  inSight(): GridInSight {
    const { row } = this.state.active();
    const cell = this.state.activeCell();
    return {
      keys: this.state.columns().map(({ key }) => key),
      fromKey: cell?.kind === 'column' ? cell.column.key : '',
      ids: this.state.rowIds(),
      fromRow: Math.max(0, row),
      selected: this.state.selectedIds(),
    };
  }

  focus(): void {
    this.region().nativeElement.focus({ preventScroll: true });
  }

  clearSelection(): void {
    this.select(NO_ROWS);
  }

  protected cellId(row: number, column: number): string {
    return `${this.gridId}-${row === HEAD_ROW ? 'head' : String(row)}-${String(column)}`;
  }

  protected view(id: string, column: TableColumn): CellView {
    return this.table().cell(id, column.key);
  }

  protected sortDirection(column: TableColumn): Sorting['direction'] | null {
    const sorting = this.state.sorting();
    return sorting?.key === column.key ? sorting.direction : null;
  }

  protected sortBy(column: TableColumn): void {
    this.state.sortBy(column.key);
    const direction = this.sortDirection(column);
    this.told.emit(direction === null ? 'In the order of the file' : `Sorted by ${column.title}, ${direction}`);
  }

  /** The grid keeps the focus when a cell is pressed; an editor in it takes its own. */
  protected keepFocus(event: MouseEvent): void {
    if (pressedCell(event) !== null) event.preventDefault();
  }

  /** One listener for all cells: the grid is what has the focus and the keys. */
  protected press(event: MouseEvent): void {
    const place = pressedCell(event);
    if (place === null) return;
    const { row, column } = this.state.active();
    const again = place.row === row && place.column === column && this.focused();
    this.focus();
    this.moveTo(place);
    const cell = this.state.layout().cells[place.column];
    const id = this.state.rowIds()[place.row];
    if (place.row === HEAD_ROW) this.pressHead();
    else if (cell === undefined || id === undefined) return;
    else if (cell.kind === 'tick') this.tick(id, event.shiftKey);
    else if (cell.column.face === 'drawingLink') this.drawingWanted.emit(id);
    else if (again) this.editing.start(null);
  }

  protected onKey(event: KeyboardEvent): void {
    if (this.editing.open() !== null || event.altKey || event.isComposing) return;
    const ctrl = event.ctrlKey || event.metaKey;
    if (this.moveByKey(event, ctrl) || this.actByKey(event, ctrl)) {
      event.preventDefault();
      event.stopPropagation();
    }
  }

  /** A cell that is being edited takes the text itself. */
  protected paste(event: ClipboardEvent): void {
    const text = event.clipboardData?.getData('text/plain') ?? '';
    if (this.editing.open() !== null || !this.mayEdit() || text.trim() === '') return;
    event.preventDefault();
    this.pasted.emit(text);
  }

  /** The ticked rows with their headings, else the active cell. */
  protected copy(event: ClipboardEvent): void {
    if (this.editing.open() !== null || event.clipboardData === null) return;
    const { keys, selected } = this.inSight();
    const id = this.state.activeId();
    const cell = this.state.activeCell();
    const one = id === null || cell?.kind !== 'column' ? '' : this.view(id, cell.column).text;
    event.preventDefault();
    event.clipboardData.setData('text/plain', selected.length > 0 ? this.written()(keys, selected) : one);
    this.told.emit(selected.length > 0 ? `${String(selected.length)} rows copied with their headings` : 'Cell copied');
  }

  protected tickAll(): void {
    this.select(toggleAllRows(this.state.selection(), this.state.rowIds()));
  }

  private moveByKey(event: KeyboardEvent, ctrl: boolean): boolean {
    const page = rowsInSight(this.region().nativeElement);
    const extent = { rows: this.state.rowIds().length, columns: this.state.layout().cells.length, page };
    const to = cellAfterKey({ key: event.key, ctrl }, this.state.active(), extent);
    if (to === null) return false;
    const extends_ = event.shiftKey && this.mayEdit() && to.row !== this.state.active().row && to.row !== HEAD_ROW;
    const from = this.state.activeId();
    this.moveTo(to);
    if (extends_) {
      const start = this.state.selection().anchor ?? from;
      const order = this.state.rowIds();
      this.select(extendRows({ ids: this.state.selection().ids, anchor: start }, order, order[to.row] ?? ''));
    }
    return true;
  }

  private actByKey(event: KeyboardEvent, ctrl: boolean): boolean {
    const { key } = event;
    if (this.state.active().row === HEAD_ROW) return (key === 'Enter' || key === ' ') && this.pressHead();
    const id = this.state.activeId();
    if (id === null) return false;
    if (key === 'Enter' || key === 'F2') return this.pressCell(id);
    if (key === 'Escape') return this.escape(id);
    if (!this.mayEdit()) return false;
    if (key === ' ') return this.tick(id, event.shiftKey);
    if (ctrl) return this.actOnRows(key.toLowerCase());
    if (key === 'Delete' || key === 'Backspace') return this.editing.empty();
    return key.length === 1 && this.editing.start(key);
  }

  private pressHead(): boolean {
    const cell = this.state.activeCell();
    if (cell?.kind === 'tick') this.tickAll();
    else if (cell !== undefined && cell.column.face !== 'drawingLink') this.sortBy(cell.column);
    return true;
  }

  private pressCell(id: string): boolean {
    const cell = this.state.activeCell();
    if (cell?.kind === 'tick') return this.tick(id, false);
    if (cell?.column.face === 'drawingLink') {
      this.drawingWanted.emit(id);
      return true;
    }
    return this.editing.start(null);
  }

  private escape(id: string): boolean {
    if (this.editing.dropDraft(id)) return true;
    if (this.state.selection().ids.size > 0) this.clearSelection();
    else return false;
    return true;
  }

  private tick(id: string, extend: boolean): boolean {
    if (!this.mayEdit()) return false;
    this.select(
      extend ? extendRows(this.state.selection(), this.state.rowIds(), id) : toggleRow(this.state.selection(), id),
    );
    return true;
  }

  private actOnRows(key: string): boolean {
    if (key === 'a') return this.selectAllRows();
    const cell = this.state.activeCell();
    if (key !== 'd' || cell?.kind !== 'column' || this.state.selectedIds().length === 0) return false;
    this.fillDownWanted.emit(cell.column.key);
    return true;
  }

  private selectAllRows(): boolean {
    if (!this.state.allTicked()) this.tickAll();
    return true;
  }

  private select(selection: RowSelection): void {
    this.state.selection.set(selection);
    // the bulk bar comes and goes under the region
    this.scrollToActiveSoon();
    const count = selection.ids.size;
    this.told.emit(count === 0 ? 'No rows selected' : `${String(count)} ${count === 1 ? 'row' : 'rows'} selected`);
  }

  private moveAfterEdit(then: AfterEdit): void {
    const { row, column } = this.state.active();
    const down = then === 'down' ? 1 : then === 'up' ? -1 : 0;
    const right = then === 'right' ? 1 : then === 'left' ? -1 : 0;
    if (down !== 0 || right !== 0) this.moveTo({ row: Math.max(0, row + down), column: column + right });
    this.focus();
  }

  private moveTo(to: CellPosition): void {
    const before = this.state.activeId();
    this.state.moveTo(to);
    this.scrollToActive();
    const id = this.state.activeId();
    if (id !== null && id !== before) this.activeChange.emit(id);
  }

  private scrollToActive(): void {
    showCell(this.region().nativeElement, this.state.layout(), this.state.active());
  }

  /** Again when the page has been drawn: the region may have grown or shrunk by then. */
  private scrollToActiveSoon(): void {
    requestAnimationFrame(() => {
      this.scrollToActive();
    });
  }
}
