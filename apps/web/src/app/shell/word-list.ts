import { ChangeDetectionStrategy, Component, type ElementRef, signal, viewChild } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { type TermText, TERMS } from '../shared/term/terms';

/** The words of the trade that screens use, with what they mean here, in the order of the alphabet. */
@Component({
  selector: 'app-word-list',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <dialog #dialog aria-labelledby="word-list-title">
      <h2 id="word-list-title">Words</h2>
      <dl>
        @for (term of terms(); track term.word) {
          <dt>{{ term.word }}</dt>
          <dd>{{ term.meaning }}</dd>
        }
      </dl>
      <button matButton="filled" type="button" (click)="dialog.close()">Close</button>
    </dialog>
  `,
  styleUrls: ['./keys/general-key-list.scss', './word-list.scss'],
})
export class WordList {
  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');
  protected readonly terms = signal<readonly TermText[]>([]);

  open(): void {
    this.terms.set(Object.values<TermText>(TERMS).sort((a, b) => a.word.localeCompare(b.word)));
    this.dialog().nativeElement.showModal();
  }
}
