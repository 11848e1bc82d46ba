import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';

/** How many comments there are on something, and the way to them and to a new one. */
@Component({
  selector: 'app-comment-button',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (count() > 0 || mayComment()) {
      <button type="button" [class.some]="count() > 0" [attr.aria-label]="spoken()" (click)="asked.emit()">
        {{ count() > 0 ? words() : 'Comment' }}
      </button>
    }
  `,
  styles: `
    button {
      min-width: 24px;
      min-height: 24px;
      padding: 0 2px;
      border: 0;
      background: none;
      color: var(--rb-ink-2);
      font: inherit;
      cursor: pointer;

      &:hover {
        text-decoration: underline;
      }
    }

    .some {
      color: var(--rb-copper);
      font-weight: 600;
    }
  `,
})
export class CommentButton {
  readonly count = input(0);
  /** What it is about: the element's tag. */
  readonly about = input.required<string>();
  readonly mayComment = input(false);
  readonly asked = output();

  protected readonly words = computed(() => `${String(this.count())} ${this.count() === 1 ? 'comment' : 'comments'}`);
  protected readonly spoken = computed(() =>
    this.count() > 0 ? `${this.words()} on ${this.about()}` : `Comment on ${this.about()}`,
  );
}
