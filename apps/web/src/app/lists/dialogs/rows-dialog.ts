import { ChangeDetectionStrategy, Component, inject, signal, viewChildren } from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogContent,
  MatDialogRef,
  MatDialogTitle,
} from '@angular/material/dialog';
import type { DisplayUnits } from '@riseback/units';
import type { Field, FieldValue, FieldValues } from './field';
import { FieldRow } from './field-row';

export interface RowsDialogData {
  readonly title: string;
  readonly note: string;
  readonly fields: readonly Field[];
  readonly rows: readonly FieldValues[];
  /** What a new row begins with. */
  readonly fresh: FieldValues;
  readonly addWord: string;
  readonly units: DisplayUnits;
  /** Why these rows cannot be taken; '' when they can. */
  readonly judge: (rows: readonly FieldValues[]) => string;
}

interface NumberedRow {
  readonly number: number;
  readonly values: FieldValues;
}

/** Edits a short list of alike rows (fittings, capacity points, pieces of a route); closes with all of them. */
@Component({
  selector: 'app-rows-dialog',
  imports: [FieldRow, MatButton, MatDialogActions, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './rows-dialog.html',
  styles: `
    mat-dialog-content,
    ol {
      display: grid;
      gap: 8px;
    }
    li {
      display: grid;
      grid-template-columns: minmax(0, 1fr) auto;
      gap: 8px;
      align-items: start;
    }
    li button {
      margin-top: 16px;
    }
    .complaint {
      min-height: 18px;
      color: var(--rb-fail);
    }
  `,
})
export class RowsDialog {
  protected readonly data = inject<RowsDialogData>(MAT_DIALOG_DATA);
  protected readonly reference = inject<MatDialogRef<RowsDialog, readonly FieldValues[]>>(MatDialogRef);

  private readonly fieldRows = viewChildren(FieldRow);

  private count = 0;
  protected readonly rows = signal<readonly NumberedRow[]>(this.data.rows.map((values) => this.numbered(values)));
  protected readonly complaint = signal('');

  protected set(number: number, { key, value }: { key: string; value: FieldValue }): void {
    this.rows.update((rows) =>
      rows.map((row) => (row.number === number ? { ...row, values: { ...row.values, [key]: value } } : row)),
    );
    this.complaint.set('');
  }

  protected add(): void {
    this.rows.update((rows) => [...rows, this.numbered(this.data.fresh)]);
  }

  protected remove(number: number): void {
    this.rows.update((rows) => rows.filter((row) => row.number !== number));
    this.complaint.set('');
  }

  protected submit(event: Event): void {
    event.preventDefault();
    const understood = this.fieldRows().map((row) => row.commit());
    if (!understood.every(Boolean)) return;
    const rows = this.rows().map(({ values }) => values);
    this.complaint.set(this.data.judge(rows));
    if (this.complaint() === '') this.reference.close(rows);
  }

  private numbered(values: FieldValues): NumberedRow {
    return { number: ++this.count, values };
  }
}
