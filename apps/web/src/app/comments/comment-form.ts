import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
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
import type { NamedPerson, Problem } from '@riseback/contracts';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { TextDrafts } from '../shared/text-drafts';
import { type CommentPlace, CommentStore } from './comment-store';
import { subjectKey } from './comment-subjects';
import { mentionAt, type MentionStart, namesFor, withMention } from './mentions';

let formCount = 0;

/** A comment being written. Names are offered behind an @; what is typed is kept until it has arrived. */
@Component({
  selector: 'app-comment-form',
  imports: [MatButton, ProblemBanner],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './comment-form.html',
  styleUrl: './comment-form.scss',
})
export class CommentForm {
  private readonly store = inject(CommentStore);
  private readonly drafts = inject(TextDrafts);

  readonly label = input.required<string>();
  readonly place = input.required<CommentPlace>();
  readonly button = input('Comment');
  /** Can be left again without a comment. */
  readonly cancellable = input(false);
  /** The keyboard goes to it when it appears. */
  readonly takesFocus = input(false);
  readonly done = output();

  private readonly box = viewChild.required<ElementRef<HTMLTextAreaElement>>('box');
  protected readonly id = `comment-${String(++formCount)}`;
  protected readonly text = signal('');
  private readonly caret = signal(0);
  private readonly shut = signal(true);
  protected readonly active = signal(0);
  protected readonly busy = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly complaint = signal('');

  private readonly about = computed(() => {
    const place = this.place();
    return 'threadId' in place ? `thread/${place.threadId}` : `${place.revisionId ?? ''}/${subjectKey(place.subject)}`;
  });
  private readonly mention = computed((): MentionStart | null =>
    this.shut() ? null : mentionAt(this.text(), this.caret()),
  );
  protected readonly offered = computed((): readonly NamedPerson[] => {
    const mention = this.mention();
    return mention === null ? [] : namesFor(mention.typed, this.store.people());
  });
  protected readonly offeredWords = computed(() => {
    const count = this.offered().length;
    if (count === 0) return '';
    return count === 1 ? '1 name, Enter takes it' : `${String(count)} names, arrows choose, Enter takes one`;
  });

  constructor() {
    effect(() => {
      const about = this.about();
      untracked(() => {
        this.text.set(this.drafts.read(about));
        this.problem.set(null);
      });
    });
    afterNextRender(() => {
      if (this.takesFocus()) this.focus();
    });
  }

  focus(): void {
    this.box().nativeElement.focus();
  }

  protected beginToWrite(): void {
    this.store.askForNames();
  }

  protected typed(): void {
    const { value, selectionStart } = this.box().nativeElement;
    this.text.set(value);
    this.caret.set(selectionStart);
    this.shut.set(false);
    this.active.set(0);
    this.complaint.set('');
    this.drafts.keep(this.about(), value);
  }

  protected shutNames(): void {
    this.shut.set(true);
  }

  protected keyDown(event: KeyboardEvent): void {
    if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) {
      event.preventDefault();
      void this.send();
      return;
    }
    const count = this.offered().length;
    if (count === 0) {
      // of the form alone: what is around it, such as the inspector, has an Escape of its own
      if (event.key === 'Escape' && this.cancellable() && this.text().trim() === '') {
        event.stopPropagation();
        this.done.emit();
      }
      return;
    }
    switch (event.key) {
      case 'ArrowDown':
        this.active.update((at) => (at + 1) % count);
        break;
      case 'ArrowUp':
        this.active.update((at) => (at + count - 1) % count);
        break;
      case 'Enter':
      case 'Tab':
        this.take(this.offered()[this.active()]);
        break;
      case 'Escape':
        this.shutNames();
        break;
      default:
        return;
    }
    event.preventDefault();
    event.stopPropagation();
  }

  protected take(person: NamedPerson | undefined): void {
    const mention = this.mention();
    if (person === undefined || mention === null) return;
    const put = withMention(this.text(), this.caret(), mention, person.name);
    const box = this.box().nativeElement;
    box.value = put.text;
    box.setSelectionRange(put.caret, put.caret);
    box.focus();
    this.text.set(put.text);
    this.drafts.keep(this.about(), put.text);
    this.shutNames();
  }

  protected async send(): Promise<void> {
    const [about, body] = [this.about(), this.text().trim()];
    if (this.busy()) return;
    if (body === '') {
      this.complaint.set('Write something first.');
      this.focus();
      return;
    }
    this.busy.set(true);
    const problem = await this.store.add(this.place(), body);
    this.busy.set(false);
    this.problem.set(problem);
    if (problem !== null) return;
    this.drafts.keep(about, '');
    // another subject may be written about by now
    if (about === this.about()) this.text.set('');
    this.done.emit();
  }

  protected cancel(): void {
    this.done.emit();
  }
}
