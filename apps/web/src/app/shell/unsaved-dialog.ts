import { ChangeDetectionStrategy, Component, inject, type Injector } from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialog,
  MatDialogActions,
  MatDialogClose,
  MatDialogContent,
  MatDialogTitle,
} from '@angular/material/dialog';
import { firstValueFrom } from 'rxjs';

type Choice = 'stay' | 'keep' | 'discard';

/** What becomes of unsaved work when its author signs out. */
@Component({
  selector: 'app-unsaved-dialog',
  imports: [MatButton, MatDialogActions, MatDialogClose, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 mat-dialog-title>Work that is not saved</h2>
    <mat-dialog-content>
      <p>
        Changes of yours to {{ networks === 1 ? 'one network' : networks + ' networks' }} lie on this device and not on
        the server yet.
      </p>
      <p>
        Kept here, they are offered to you when you open the network on this device again. Others who use the device
        could get at them. Discarded, they are gone.
      </p>
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton type="button" mat-dialog-close="stay">Stay signed in</button>
      <button matButton="outlined" type="button" mat-dialog-close="discard">Discard and sign out</button>
      <button matButton="filled" type="button" mat-dialog-close="keep">Keep here and sign out</button>
    </mat-dialog-actions>
  `,
  styles: `
    mat-dialog-content {
      display: grid;
      gap: 8px;
    }
    mat-dialog-actions {
      flex-wrap: wrap;
      gap: 8px 0;
    }
  `,
})
export class UnsavedDialog {
  protected readonly networks = inject<number>(MAT_DIALOG_DATA);
}

/** Closing it without a choice stays. */
export async function askAboutUnsaved(injector: Injector, networks: number): Promise<Choice> {
  const opened = injector
    .get(MatDialog)
    .open<UnsavedDialog, number, Choice>(UnsavedDialog, { data: networks, width: '480px' });
  return (await firstValueFrom(opened.afterClosed())) ?? 'stay';
}
