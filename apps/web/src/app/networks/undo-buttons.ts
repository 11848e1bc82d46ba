import { ChangeDetectionStrategy, Component, inject, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatDialog } from '@angular/material/dialog';
import { NetworkStore } from './network-store';

/** A step that was taken back or done again, or why it could not be. */
export interface UndoneStep {
  /** Ids that it touched; empty when nothing was changed. */
  readonly touched: readonly string[];
  readonly words: string;
}

/** Undo and redo as buttons and by their keys, for pages of forms and tables. */
@Component({
  selector: 'app-undo-buttons',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(document:keydown)': 'stepByKey($event)' },
  template: `
    <button
      matButton="outlined"
      type="button"
      aria-label="Undo"
      [title]="'Undo ' + (store.undoLabel() ?? '')"
      [disabled]="store.undoLabel() === null"
      (click)="undo()"
    >
      <svg viewBox="0 0 16 16" width="16" height="16" aria-hidden="true">
        <path d="M5.5 3 2.5 6l3 3M3 6h6.5a3.5 3.5 0 0 1 0 7H6" />
      </svg>
    </button>
    <button
      matButton="outlined"
      type="button"
      aria-label="Redo"
      [title]="'Redo ' + (store.redoLabel() ?? '')"
      [disabled]="store.redoLabel() === null"
      (click)="redo()"
    >
      <svg viewBox="0 0 16 16" width="16" height="16" aria-hidden="true">
        <path d="m10.5 3 3 3-3 3M13 6H6.5a3.5 3.5 0 0 0 0 7H10" />
      </svg>
    </button>
  `,
  styles: `
    :host {
      display: flex;
      gap: 8px;
    }

    button {
      min-width: 36px;
    }

    svg {
      display: block;
      fill: none;
      stroke: currentcolor;
      stroke-width: 1.5;
    }
  `,
})
export class UndoButtons {
  protected readonly store = inject(NetworkStore);
  private readonly dialog = inject(MatDialog);

  readonly stepped = output<UndoneStep>();

  protected undo(): void {
    const label = this.store.undoLabel();
    this.tell(this.store.undo(), `Undone: ${label ?? ''}`);
  }

  protected redo(): void {
    const label = this.store.redoLabel();
    this.tell(this.store.redo(), `Done again: ${label ?? ''}`);
  }

  /** Not while a text is typed, where the browser's own undo belongs, nor behind a dialog. */
  protected stepByKey(event: KeyboardEvent): void {
    if (!(event.ctrlKey || event.metaKey) || event.altKey || !this.store.mayDraw()) return;
    if (this.dialog.openDialogs.length > 0 || isTextBox(event.target)) return;
    const key = event.key.toLowerCase();
    if (key === 'z' && !event.shiftKey) this.undo();
    else if (key === 'y' || (key === 'z' && event.shiftKey)) this.redo();
    else return;
    event.preventDefault();
  }

  private tell(touched: readonly string[] | null, words: string): void {
    const failed = this.store.lastRefusal().join(' ') || 'Nothing to undo';
    this.stepped.emit({ touched: touched ?? [], words: touched === null ? failed : words });
  }
}

function isTextBox(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLInputElement || target instanceof HTMLTextAreaElement || target instanceof HTMLSelectElement
  );
}
