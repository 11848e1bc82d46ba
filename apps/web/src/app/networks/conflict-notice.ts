import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatDialog } from '@angular/material/dialog';
import { StatusMark } from '../shared/status-mark/status-mark';
import { ConflictDialog } from './conflict-dialog';
import { NetworkStore } from './network-store';

/** Says that two people changed the same thing, until the person has chosen. */
@Component({
  selector: 'app-conflict-notice',
  imports: [MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (store.conflicts().length > 0) {
      <div class="rb-notice watch" role="alert">
        <app-status-mark status="watch" word="Choose" />
        <p>{{ words() }}</p>
        <button matButton="outlined" type="button" (click)="choose()">Compare and choose</button>
      </div>
    }
  `,
  styleUrl: './notice.scss',
})
export class ConflictNotice {
  protected readonly store = inject(NetworkStore);
  private readonly dialog = inject(MatDialog);

  protected readonly words = computed(() => {
    const conflicts = this.store.conflicts();
    const who = [...new Set(conflicts.map((conflict) => conflict.who))].join(', ');
    const names = [...new Set(conflicts.map(({ name }) => name))];
    const shown =
      names.length > 3 ? `${names.slice(0, 3).join(', ')} and ${String(names.length - 3)} more` : names.join(', ');
    return `${who} changed what you changed: ${shown}. Yours is kept beside theirs.`;
  });

  protected choose(): void {
    this.dialog.open(ConflictDialog, { data: this.store, width: '640px', maxWidth: '96vw', autoFocus: 'input' });
  }
}
