import {
  ChangeDetectionStrategy,
  Component,
  effect,
  type ElementRef,
  inject,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { DrawingState } from './drawing-state';

const KEYS: readonly (readonly [string, string])[] = [
  ['Arrows', 'to the nearest element that way'],
  ['Page Down, Page Up', 'with the flow, against it'],
  ['Shift+Page Up', 'the next pipe entering'],
  ['End, Home', 'receiver, last trap'],
  ['Space', 'select; Shift+arrow selects more, Ctrl+A all'],
  ['Enter', 'the fields of the element; Escape comes back'],
  ['T, J, R, V, U', 'place a trap, junction, receiver, flash vessel, pumped inlet beside the focus'],
  ['Insert', 'the same as a menu'],
  ['P', 'a pipe from here: arrows or a typed tag choose its end'],
  [
    'M',
    'move: arrows one step, Shift ten, Enter sets down, Escape puts back; on a pipe a bend, comma and full stop choose which',
  ],
  ['Delete', 'delete, after saying what goes along'],
  ['Ctrl+Z, Ctrl+Shift+Z', 'undo, redo'],
  ['/', 'find a tag'],
  ['+, −, 0', 'zoom in, out, fit'],
  ['?', 'this list'],
];

/** The keys of the drawing, opened with "?". */
@Component({
  selector: 'app-key-list',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <dialog #dialog aria-labelledby="key-list-title" (close)="closed()">
      <h2 id="key-list-title">Keys of the drawing</h2>
      <table>
        <tbody>
          @for (key of keys; track key[0]) {
            <tr>
              <th scope="row">{{ key[0] }}</th>
              <td>{{ key[1] }}</td>
            </tr>
          }
        </tbody>
      </table>
      <label
        ><input #act type="checkbox" [checked]="state.lettersAct()" (change)="state.lettersAct.set(act.checked)" />
        Single letters and signs act while the drawing has the focus</label
      >
      <button matButton="filled" type="button" (click)="dialog.close()">Close</button>
    </dialog>
  `,
  styles: `
    dialog {
      max-width: min(620px, calc(100vw - 32px));
      padding: 20px;
      border: 1px solid var(--rb-ink);
      border-radius: 4px;
      background: var(--rb-panel);
      color: var(--rb-ink);
      box-shadow: var(--rb-lift);
    }
    table {
      margin: 12px 0;
      border-collapse: collapse;
    }
    th,
    td {
      padding: 3px 12px 3px 0;
      border-top: 1px solid var(--rb-rule);
      text-align: left;
      vertical-align: top;
    }
    th {
      font-weight: 600;
      white-space: nowrap;
    }
    label {
      display: flex;
      gap: 8px;
      margin-bottom: 12px;
    }
  `,
})
export class KeyList {
  protected readonly state = inject(DrawingState);

  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');
  protected readonly keys = KEYS;

  constructor() {
    effect(() => {
      if (this.state.keysAsked() > 0)
        untracked(() => {
          this.dialog().nativeElement.showModal();
        });
    });
  }

  protected closed(): void {
    this.state.focusOn(this.state.focusId());
  }
}
