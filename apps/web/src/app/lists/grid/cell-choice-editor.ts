import { afterNextRender, ChangeDetectionStrategy, Component, input, output, viewChild } from '@angular/core';
import { MatOption, MatSelect } from '@angular/material/select';
import type { Choice } from '../columns/column';

/** The choices of a cell, open at once; choosing accepts, Escape keeps what was. */
@Component({
  selector: 'app-cell-choice-editor',
  imports: [MatOption, MatSelect],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <mat-select
      [aria-label]="label()"
      [value]="chosen()"
      [panelWidth]="null"
      hideSingleSelectionIndicator
      (selectionChange)="picked.emit($event.value)"
      (closed)="closed.emit()"
      (keydown)="keepKeys($event)"
    >
      @for (choice of choices(); track choice.value) {
        <mat-option [value]="choice.value">{{ choice.word }}</mat-option>
      }
    </mat-select>
  `,
  styles: `
    :host {
      display: block;
      width: 100%;
      height: 100%;
      padding: 0 4px 0 7px;
      outline: 2px solid var(--rb-copper);
      outline-offset: -2px;
      background: var(--rb-well);
    }
    mat-select {
      height: 100%;
      --mat-select-trigger-text-size: 12.5px;
      --mat-select-trigger-text-line-height: 26px;
    }
    mat-option {
      min-height: 28px;
      padding: 0 12px;
      --mat-option-label-text-size: 12.5px;
      --mat-option-label-text-line-height: 17px;
    }
  `,
})
export class CellChoiceEditor {
  readonly label = input.required<string>();
  readonly choices = input.required<readonly Choice[]>();
  readonly chosen = input.required<string>();
  readonly picked = output<string>();
  readonly closed = output();

  private readonly select = viewChild.required(MatSelect);

  constructor() {
    afterNextRender(() => {
      this.select().focus({ preventScroll: true });
      this.select().open();
    });
  }

  /** The grid behind must not act on the key that chose. Escape goes on, since the overlay listens for it at the document. */
  protected keepKeys(event: KeyboardEvent): void {
    if (event.key !== 'Escape') event.stopPropagation();
  }
}
