import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogClose,
  MatDialogContent,
  MatDialogTitle,
} from '@angular/material/dialog';

export interface DeleteDialogData {
  readonly title: string;
  /** What goes along, a line each; empty when nothing does. */
  readonly along: readonly string[];
}

/** Says what a deletion takes along before it is made; closes with true to go on. */
@Component({
  selector: 'app-delete-dialog',
  imports: [MatButton, MatDialogActions, MatDialogClose, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 mat-dialog-title>{{ data.title }}</h2>
    <mat-dialog-content>
      @if (data.along.length > 0) {
        <p>This goes along:</p>
        <ul>
          @for (line of data.along; track $index) {
            <li>{{ line }}</li>
          }
        </ul>
      }
      <p>Undo brings all of it back.</p>
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton type="button" [mat-dialog-close]="false">Keep</button>
      <button matButton="filled" type="button" [mat-dialog-close]="true">Delete</button>
    </mat-dialog-actions>
  `,
  styles: `
    mat-dialog-content {
      display: grid;
      gap: 8px;
    }
    ul {
      padding-left: 20px;
      list-style: square;
    }
  `,
})
export class DeleteDialog {
  protected readonly data = inject<DeleteDialogData>(MAT_DIALOG_DATA);
}
