import { ChangeDetectionStrategy, Component, inject, signal, viewChild } from '@angular/core';
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

export interface FieldsDialogData {
  readonly title: string;
  readonly note?: string;
  readonly fields: readonly Field[];
  readonly values: FieldValues;
  readonly units: DisplayUnits;
  readonly submitWord: string;
  readonly leaveWord: string;
  /** Why these values cannot be taken; '' when they can. */
  readonly judge: (values: FieldValues) => string;
}

/** Asks for a few values at once; closes with them, or with undefined when it was left. */
@Component({
  selector: 'app-fields-dialog',
  imports: [FieldRow, MatButton, MatDialogActions, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 mat-dialog-title>{{ data.title }}</h2>
    <form novalidate (submit)="submit($event)">
      <mat-dialog-content>
        @if (data.note) {
          <p>{{ data.note }}</p>
        }
        <app-field-row [fields]="data.fields" [values]="values()" [units]="data.units" (changed)="set($event)" />
        <p class="complaint" role="alert">{{ complaint() }}</p>
      </mat-dialog-content>
      <mat-dialog-actions align="end">
        <button matButton type="button" (click)="reference.close()">{{ data.leaveWord }}</button>
        <button matButton="filled" type="submit">{{ data.submitWord }}</button>
      </mat-dialog-actions>
    </form>
  `,
  styles: `
    mat-dialog-content {
      display: grid;
      gap: 8px;
    }
    .complaint {
      min-height: 18px;
      color: var(--rb-fail);
    }
  `,
})
export class FieldsDialog {
  protected readonly data = inject<FieldsDialogData>(MAT_DIALOG_DATA);
  protected readonly reference = inject<MatDialogRef<FieldsDialog, FieldValues>>(MatDialogRef);

  private readonly row = viewChild.required(FieldRow);

  protected readonly values = signal(this.data.values);
  protected readonly complaint = signal('');

  protected set({ key, value }: { key: string; value: FieldValue }): void {
    this.values.update((values) => ({ ...values, [key]: value }));
    this.complaint.set('');
  }

  protected submit(event: Event): void {
    event.preventDefault();
    if (!this.row().commit()) return;
    const missing = this.missing();
    this.complaint.set(missing === undefined ? this.data.judge(this.values()) : `${missing.title} is missing.`);
    if (this.complaint() === '') this.reference.close(this.values());
  }

  private missing(): Field | undefined {
    const values = this.values();
    return this.data.fields.find((field) => {
      if (field.by === 'choice' || field.optional === true || !(field.when?.(values) ?? true)) return false;
      const value = values[field.key];
      return value === undefined || (typeof value === 'string' && value.trim() === '');
    });
  }
}
