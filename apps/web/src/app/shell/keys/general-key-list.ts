import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  type ElementRef,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router } from '@angular/router';
import { type KeySection, keySectionsOf } from './general-keys';
import { asksForKeys, KeyHelp } from './key-help';

/** The keys of the open view and of every page, on "?" or from the help menu. */
@Component({
  selector: 'app-general-key-list',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(document:keydown)': 'openOnQuestionMark($event)' },
  template: `
    <dialog #dialog aria-labelledby="general-keys-title">
      <h2 id="general-keys-title">Keys</h2>
      @for (section of sections(); track section.title) {
        <h3 [id]="'keys-' + $index">{{ section.title }}</h3>
        <table [attr.aria-labelledby]="'keys-' + $index">
          <tbody>
            @for (key of section.keys; track $index) {
              <tr>
                <th scope="row">{{ key[0] }}</th>
                <td>{{ key[1] }}</td>
              </tr>
            }
          </tbody>
        </table>
      }
      <button matButton="filled" type="button" (click)="dialog.close()">Close</button>
    </dialog>
  `,
  styleUrl: './general-key-list.scss',
})
export class GeneralKeyList {
  private readonly help = inject(KeyHelp);
  private readonly router = inject(Router);

  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');
  protected readonly sections = signal<readonly KeySection[]>([]);

  constructor() {
    const withdraw = this.help.offer('general', () => {
      this.sections.set(keySectionsOf(this.router.url));
      this.dialog().nativeElement.showModal();
    });
    inject(DestroyRef).onDestroy(withdraw);
  }

  protected openOnQuestionMark(event: KeyboardEvent): void {
    if (!asksForKeys(event)) return;
    event.preventDefault();
    this.help.open();
  }
}
