import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogClose,
  MatDialogContent,
  MatDialogRef,
  MatDialogTitle,
} from '@angular/material/dialog';
import { conflictRows } from './conflict-rows';
import type { NetworkStore } from './network-store';

type Choice = 'mine' | 'theirs';

/** What it was, what the other made of it, what I wanted: one choice for each, and nothing is lost before it is made. */
@Component({
  selector: 'app-conflict-dialog',
  imports: [MatButton, MatDialogActions, MatDialogClose, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './conflict-dialog.html',
  styleUrl: './conflict-dialog.scss',
})
export class ConflictDialog {
  private readonly store = inject<NetworkStore>(MAT_DIALOG_DATA);
  private readonly dialog = inject<MatDialogRef<ConflictDialog>>(MatDialogRef);

  private readonly choices = signal<ReadonlyMap<string, Choice>>(new Map());
  protected readonly complaint = signal('');

  protected readonly rows = computed(() => {
    const document = this.store.document();
    if (document === null) return [];
    const choices = this.choices();
    return conflictRows(this.store.conflicts(), document, this.store.units()).map((row) => ({
      ...row,
      chosen: choices.get(row.key) ?? null,
    }));
  });
  protected readonly chosenCount = computed(() => this.rows().filter(({ chosen }) => chosen !== null).length);

  protected choose(key: string, choice: Choice): void {
    this.choices.update((before) => new Map(before).set(key, choice));
  }

  protected chooseAll(choice: Choice): void {
    this.choices.set(new Map(this.rows().map(({ key }) => [key, choice])));
  }

  protected apply(): void {
    const of = (choice: Choice) => this.rows().flatMap((row) => (row.chosen === choice ? [row.conflict] : []));
    const unfit = this.store.settle(of('mine'), of('theirs'));
    if (unfit.length === 0 && this.store.conflicts().length === 0) this.dialog.close();
    const names = unfit.map(({ name }) => name).join(', ');
    this.complaint.set(
      unfit.length === 0
        ? ''
        : `Your value at ${names} no longer fits what is there now: ${this.store.lastRefusal().join(' ') || 'choose theirs, or change it by hand.'}`,
    );
  }
}
