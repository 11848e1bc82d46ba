import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { KeypadKey } from './typed-reading';

const DIGIT_ROWS: readonly (readonly KeypadKey[])[] = [
  ['1', '2', '3'],
  ['4', '5', '6'],
  ['7', '8', '9'],
  ['.', '0', 'minus'],
];

const SPOKEN: Partial<Record<KeypadKey, string>> = { '.': 'Point', minus: 'Minus' };

/** Keys large enough for a glove. They never take the focus from the field. */
@Component({
  selector: 'app-keypad',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { role: 'group', 'aria-label': 'Keypad' },
  template: `
    @for (row of rows; track $index) {
      @for (key of row; track key) {
        <button type="button" [disabled]="disabled()" [attr.aria-label]="spoken(key)" (click)="pressed.emit(key)">
          {{ key === 'minus' ? '−' : key }}
        </button>
      }
      @switch ($index) {
        @case (0) {
          <button type="button" class="word" [disabled]="disabled()" (click)="pressed.emit('delete')">Delete</button>
        }
        @case (1) {
          <button type="button" class="word" [disabled]="disabled()" (click)="noReading.emit()">No reading</button>
        }
        @case (2) {
          <button type="button" class="word" [disabled]="disabled()" (click)="noteWanted.emit()">Note, photo</button>
        }
        @case (3) {
          <button type="button" class="word" (click)="listWanted.emit()">All gauges</button>
        }
      }
    }
  `,
  styleUrl: './keypad.scss',
})
export class Keypad {
  readonly disabled = input(false);
  readonly pressed = output<KeypadKey>();
  readonly noReading = output();
  readonly noteWanted = output();
  readonly listWanted = output();

  protected readonly rows = DIGIT_ROWS;

  protected spoken(key: KeypadKey): string | null {
    return SPOKEN[key] ?? null;
  }
}
