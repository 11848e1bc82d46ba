import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  inject,
  Injector,
  afterNextRender,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogContent,
  MatDialogRef,
  MatDialogTitle,
} from '@angular/material/dialog';
import type { ColumnGroup } from '../columns/column';
import type { TableColumn } from '../list-table';
import { type ArrangedColumn, arrangeColumns, choiceOf, type ColumnChoice, moveColumn } from './column-choice';

export interface ColumnsDialogData {
  /** "Traps". */
  readonly list: string;
  readonly columns: readonly TableColumn[];
  readonly choice: ColumnChoice | null;
}

const GROUP_WORDS: Readonly<Record<ColumnGroup, string>> = { element: 'Name', inputs: 'Inputs', result: 'Result' };

/** Which columns show, and in which order; closes with the choice (null for the first one), or undefined when left. */
@Component({
  selector: 'app-columns-dialog',
  imports: [MatButton, MatDialogActions, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './columns-dialog.html',
  styleUrl: './columns-dialog.scss',
})
export class ColumnsDialog {
  protected readonly data = inject<ColumnsDialogData>(MAT_DIALOG_DATA);
  protected readonly reference = inject<MatDialogRef<ColumnsDialog, ColumnChoice | null>>(MatDialogRef);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly injector = inject(Injector);

  protected readonly columns = signal<readonly ArrangedColumn[]>(arrangeColumns(this.data.columns, this.data.choice));
  protected readonly told = signal('');
  private asAtFirst = this.data.choice === null;

  protected groupWord({ column }: ArrangedColumn, index: number): string {
    return this.columns()[index - 1]?.column.group === column.group ? '' : GROUP_WORDS[column.group];
  }

  protected show(key: string, shown: boolean): void {
    this.asAtFirst = false;
    this.columns.update((columns) => columns.map((each) => (each.column.key === key ? { ...each, shown } : each)));
  }

  protected showAll(): void {
    this.asAtFirst = false;
    this.columns.update((columns) => columns.map((each) => ({ ...each, shown: true })));
    this.told.set('All columns show');
  }

  protected reset(): void {
    this.asAtFirst = true;
    this.columns.set(arrangeColumns(this.data.columns, null));
    this.told.set('As at first');
  }

  /** The arrow keys with Alt move a column, so that its box keeps the focus. */
  protected moveByKey(event: KeyboardEvent, key: string): void {
    if (!event.altKey || (event.key !== 'ArrowUp' && event.key !== 'ArrowDown')) return;
    event.preventDefault();
    this.move(key, event.key === 'ArrowUp' ? -1 : 1);
  }

  protected move(key: string, by: -1 | 1): void {
    const before = this.columns();
    const focused = document.activeElement;
    this.columns.set(moveColumn(before, key, by));
    if (this.columns() === before) {
      this.told.set('It is at the end of its group');
      return;
    }
    this.asAtFirst = false;
    const place = this.columns().findIndex(({ column }) => column.key === key);
    this.told.set(`Now column ${String(place + 1)} of ${String(before.length)}`);
    // the browser drops the focus of a row that is moved
    afterNextRender(() => this.refocus(focused), { injector: this.injector });
  }

  protected set(event: Event): void {
    event.preventDefault();
    this.reference.close(this.asAtFirst ? null : choiceOf(this.columns()));
  }

  private refocus(element: Element | null): void {
    if (element instanceof HTMLElement && this.host.nativeElement.contains(element)) element.focus();
  }
}
