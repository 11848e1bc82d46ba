import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatDialog } from '@angular/material/dialog';
import { NetworkStore } from './network-store';

/** A step that was taken back or done again, or why it could not be. */
export interface UndoneStep {
  /** Ids that it touched; empty when nothing was changed. */
  readonly touched: readonly string[];
  readonly words: string;
}

/** Steps that are taken back and done again apart from the network's own. */
export interface StepHistory {
  readonly undoLabel: () => string | null;
  readonly redoLabel: () => string | null;
  undo(): void;
  redo(): void;
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
      [title]="'Undo ' + (undoLabel() ?? '')"
      [disabled]="undoLabel() === null"
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
      [title]="'Redo ' + (redoLabel() ?? '')"
      [disabled]="redoLabel() === null"
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

  /** Steps that come before the network's while there are any. */
  readonly before = input<StepHistory | null>(null);

  readonly stepped = output<UndoneStep>();

  private readonly first = computed(() => {
    const before = this.before();
    return before === null || (before.undoLabel() === null && before.redoLabel() === null) ? null : before;
  });
  protected readonly undoLabel = computed(() => (this.first() ?? this.store).undoLabel());
  protected readonly redoLabel = computed(() => (this.first() ?? this.store).redoLabel());

  protected undo(): void {
    const label = this.undoLabel();
    const first = this.first();
    first?.undo();
    this.tell(first === null ? this.store.undo() : [], `Undone: ${label ?? ''}`);
  }

  protected redo(): void {
    const label = this.redoLabel();
    const first = this.first();
    first?.redo();
    this.tell(first === null ? this.store.redo() : [], `Done again: ${label ?? ''}`);
  }

  /** Not while a text is typed, where the browser's own undo belongs, nor behind a dialog. */
  protected stepByKey(event: KeyboardEvent): void {
    if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
    if (this.first() === null && !this.store.mayDraw()) return;
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
