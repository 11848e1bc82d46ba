import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogClose,
  MatDialogContent,
  MatDialogTitle,
} from '@angular/material/dialog';

export interface DeleteQuestion {
  readonly names: readonly string[];
  /** What hangs on them and goes along, in words. */
  readonly goingAlong: readonly string[];
}

const MOST_NAMED = 8;

@Component({
  selector: 'app-delete-dialog',
  imports: [MatButton, MatDialogActions, MatDialogClose, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 mat-dialog-title>Delete {{ title }}?</h2>
    <mat-dialog-content>
      @if (question.goingAlong.length > 0) {
        <p>These go along:</p>
        <ul>
          @for (name of shown(); track name) {
            <li>{{ name }}</li>
          }
        </ul>
        @if (more() > 0) {
          <p>and {{ more() }} more.</p>
        }
      } @else {
        <p>Nothing else goes along.</p>
      }
      <p>Undo brings all of it back.</p>
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton="outlined" type="button" [mat-dialog-close]="false">Keep</button>
      <button matButton="filled" type="button" cdkFocusInitial [mat-dialog-close]="true">Delete</button>
    </mat-dialog-actions>
  `,
  styles: `
    ul {
      margin: 4px 0 8px;
      padding-left: 16px;
      list-style: disc;
    }
    p {
      margin: 4px 0;
    }
  `,
})
export class DeleteDialog {
  protected readonly question = inject<DeleteQuestion>(MAT_DIALOG_DATA);

  protected readonly title =
    this.question.names.length === 1
      ? (this.question.names[0] ?? '')
      : `${String(this.question.names.length)} elements`;
  protected readonly shown = computed(() => this.question.goingAlong.slice(0, MOST_NAMED));
  protected readonly more = computed(() => this.question.goingAlong.length - this.shown().length);
}
