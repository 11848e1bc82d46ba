import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  effect,
  type ElementRef,
  inject,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { KeyHelp } from '../shell/keys/key-help';
import { DrawingState } from './drawing-state';

interface KeyGroup {
  readonly name: string;
  readonly keys: readonly (readonly [string, string])[];
}

/** Every key that the sheet knows (sheet-keys.ts), grouped by what a person is about. */
const GROUPS: readonly KeyGroup[] = [
  {
    name: 'Going about',
    keys: [
      ['Arrows', 'to the nearest element that way'],
      ['Page Down, Page Up', 'with the flow, against it'],
      ['Shift+Page Up', 'the next pipe entering'],
      ['End, Home', 'receiver, last trap'],
      ['/', 'find a tag'],
      ['Tab', 'leaves the drawing'],
    ],
  },
  {
    name: 'Selecting',
    keys: [
      ['Space', 'select this element alone, or none'],
      ['Ctrl+Space', 'this one too, or no longer'],
      ['Shift+arrow', 'this one and the next'],
      ['Ctrl+A', 'everything'],
      ['Escape', 'leave off, then clear the selection'],
    ],
  },
  {
    name: 'Placing and joining',
    keys: [
      ['T, J, R, V, U', 'a trap, junction, receiver, flash vessel, pumped inlet beside the focus'],
      ['Insert', 'the same as a menu'],
      ['G', 'a gauge on the element or pipe with the focus'],
      ['P', 'a pipe from here: arrows or a typed tag choose its end, Enter makes it'],
    ],
  },
  {
    name: 'Changing',
    keys: [
      ['Enter', 'the fields of the element; Escape comes back'],
      ['M', 'move: arrows one step, Shift ten, Enter sets down, Escape puts back'],
      ['M on a pipe', 'move a bend: comma and full stop choose which, Delete takes it out'],
      ['M on a gauge', 'move it along its pipe: arrows one step, Shift ten, Enter sets down'],
      ['B on a pipe', 'a new bend: arrows move what lies behind it aside'],
      ['Delete', 'delete, after saying what goes along'],
      ['Ctrl+C, Ctrl+X, Ctrl+V', 'copy, cut, paste, also in another network'],
      ['Ctrl+D', 'duplicate'],
      ['Ctrl+Z, Ctrl+Shift+Z', 'undo, redo; Ctrl+Y too'],
      ['Shift+F10, Menu', 'all that can be done here, aligning and distributing included'],
    ],
  },
  {
    name: 'Looking',
    keys: [
      ['+, −, 0', 'zoom in, out, fit'],
      ['Ctrl+arrow', 'move the view'],
      ['?', 'this list'],
    ],
  },
];

/** The keys of the drawing, opened with "?". */
@Component({
  selector: 'app-key-list',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <dialog #dialog aria-labelledby="key-list-title" (close)="closed()">
      <h2 id="key-list-title">Keys of the drawing</h2>
      <div class="groups">
        @for (group of groups; track group.name) {
          <table>
            <caption>
              {{
                group.name
              }}
            </caption>
            <tbody>
              @for (key of group.keys; track key[0]) {
                <tr>
                  <th scope="row">{{ key[0] }}</th>
                  <td>{{ key[1] }}</td>
                </tr>
              }
            </tbody>
          </table>
        }
      </div>
      <label
        ><input #act type="checkbox" [checked]="state.lettersAct()" (change)="state.lettersAct.set(act.checked)" />
        Single letters and signs act while the drawing has the focus</label
      >
      <button matButton="filled" type="button" (click)="dialog.close()">Close</button>
    </dialog>
  `,
  styles: `
    dialog {
      max-width: min(920px, calc(100vw - 32px));
      padding: 20px;
      border: 1px solid var(--rb-ink);
      border-radius: 4px;
      background: var(--rb-panel);
      color: var(--rb-ink);
      box-shadow: var(--rb-lift);
    }
    .groups {
      columns: 2 340px;
      column-gap: 32px;
      margin: 12px 0;
    }
    table {
      width: 100%;
      margin-bottom: 12px;
      border-collapse: collapse;
      break-inside: avoid;
    }
    caption {
      padding: 2px 0;
      color: var(--rb-ink-2);
      font-weight: 600;
      text-align: left;
    }
    th,
    td {
      padding: 3px 12px 3px 0;
      border-top: 1px solid var(--rb-rule);
      text-align: left;
      vertical-align: top;
    }
    th {
      width: 42%;
      font-weight: 600;
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
  protected readonly groups = GROUPS;

  constructor() {
    const withdraw = inject(KeyHelp).offer('own', () => {
      this.dialog().nativeElement.showModal();
    });
    inject(DestroyRef).onDestroy(withdraw);
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
