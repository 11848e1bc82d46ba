import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';

/** The numbers of the open comments on something, and the way to them and to a new one. */
@Component({
  selector: 'app-comment-button',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (numbers().length > 0 || mayComment()) {
      <button type="button" [class.some]="numbers().length > 0" [attr.aria-label]="spoken()" (click)="asked.emit()">
        {{ words() }}
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
  readonly numbers = input<readonly number[]>([]);
  /** What it is about: the element's tag. */
  readonly about = input.required<string>();
  readonly mayComment = input(false);
  readonly asked = output();

  protected readonly words = computed(() => {
    const numbers = this.numbers();
    return `${numbers.length > 1 ? 'Comments' : 'Comment'} ${numbers.join(', ')}`.trim();
  });
  protected readonly spoken = computed(() => `${this.words()} on ${this.about()}`);
}
