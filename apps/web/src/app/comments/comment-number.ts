import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** The number of a thread in its mark: a drop that points to what it is about, as on the drawing. A resolved one is dashed. */
@Component({
  selector: 'app-comment-number',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.resolved]': 'resolved()' },
  template: `{{ number() }}`,
  styles: `
    :host {
      display: grid;
      place-items: center;
      min-width: 22px;
      height: 22px;
      padding: 0 4px;
      border: 1.5px solid var(--rb-copper);
      border-radius: 11px 11px 11px 0;
      background: var(--rb-sheet);
      color: var(--rb-copper);
      font:
        600 11px/14px Inter,
        sans-serif;
    }
    :host(.resolved) {
      border: 1px dashed var(--rb-rule-strong);
      color: var(--rb-ink-2);
    }
  `,
})
export class CommentNumber {
  readonly number = input.required<number>();
  readonly resolved = input(false);
}
