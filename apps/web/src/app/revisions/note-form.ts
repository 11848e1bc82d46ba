import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  effect,
  type ElementRef,
  inject,
  input,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { TextDrafts } from '../shared/text-drafts';

let formCount = 0;

/** A reason or a note that goes with what is done to a revision; kept for the tab until it was done. */
@Component({
  selector: 'app-note-form',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <label [attr.for]="id">{{ label() }}</label>
    <textarea
      #box
      rows="3"
      maxlength="2000"
      [id]="id"
      [value]="text()"
      [attr.aria-describedby]="id + '-note'"
      [attr.aria-invalid]="complaint() !== ''"
      (input)="typed(box.value)"
    ></textarea>
    <p class="note" [id]="id + '-note'">
      @if (complaint(); as words) {
        <span class="complaint" role="alert">{{ words }}</span>
      } @else {
        {{ hint() }}
      }
    </p>
    <p class="actions">
      <button matButton="filled" type="button" [disabled]="busy()" (click)="send()">{{ button() }}</button>
      <button matButton type="button" (click)="cancelled.emit()">Not now</button>
    </p>
  `,
  styleUrl: './note-form.scss',
})
export class NoteForm {
  private readonly drafts = inject(TextDrafts);

  readonly label = input.required<string>();
  readonly hint = input('');
  readonly button = input.required<string>();
  /** Under which the text is kept. */
  readonly about = input.required<string>();
  readonly required = input(false);
  readonly busy = input(false);
  readonly sent = output<string>();
  readonly cancelled = output();

  private readonly box = viewChild.required<ElementRef<HTMLTextAreaElement>>('box');
  protected readonly id = `revision-note-${String(++formCount)}`;
  protected readonly text = signal('');
  protected readonly complaint = signal('');

  constructor() {
    effect(() => {
      const about = this.about();
      untracked(() => this.text.set(this.drafts.read(about)));
    });
    afterNextRender(() => this.box().nativeElement.focus());
  }

  protected typed(text: string): void {
    this.text.set(text);
    this.complaint.set('');
    this.drafts.keep(this.about(), text);
  }

  protected send(): void {
    const note = this.text().trim();
    if (this.required() && note === '') {
      this.complaint.set('Say why: it is kept with the revision.');
      this.box().nativeElement.focus();
      return;
    }
    this.sent.emit(note);
  }
}
