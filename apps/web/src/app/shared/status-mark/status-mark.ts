import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';

import { BANDS_TO_COME } from '../bands-to-come';

export type Status = 'fail' | 'watch' | 'pass' | 'none';

const WORDS: Readonly<Record<Status, string>> = { fail: 'Fail', watch: 'Watch', pass: 'Pass', none: 'Not checked' };

/**
 * A verdict as shape and word: solid diamond, open triangle, ring with tick, dashed ring. Colour only repeats them. While bands are to come
 * a pass and a watch are pale and say that they hold so far.
 */
@Component({
  selector: 'app-status-mark',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class]': 'status()', '[class.so-far]': 'soFar()' },
  template: `
    <svg viewBox="0 0 14 14" width="14" height="14" aria-hidden="true" focusable="false">
      @switch (status()) {
        @case ('fail') {
          <path class="solid" d="M7 0.8 13.2 7 7 13.2 0.8 7Z" />
          <path class="cut" d="M7 3.8v3.8M7 9v1.2" />
        }
        @case ('watch') {
          <path class="line" d="M7 1.6 13 12.4H1Z" />
          <path class="line" d="M7 5.4v3.4M7 10v1" />
        }
        @case ('pass') {
          <circle class="line" cx="7" cy="7" r="5.8" />
          <path class="line" d="m4.3 7.2 2 2 3.5-4.2" />
        }
        @case ('none') {
          <circle class="line dashed" cx="7" cy="7" r="5.8" />
        }
      }
    </svg>
    <span [class.rb-visually-hidden]="wordless()">{{ shownWord() }}</span>
  `,
  styleUrl: './status-mark.scss',
})
export class StatusMark {
  readonly status = input.required<Status>();
  /** Another word than the status's own, such as a count. */
  readonly word = input<string>();
  /** Leaves the word to the screen reader where a neighbour says it in print. */
  readonly wordless = input(false);

  /** Whether no band can change it. */
  readonly final = input(false);

  private readonly bandsToCome = inject(BANDS_TO_COME, { optional: true });
  protected readonly soFar = computed(
    () => this.bandsToCome?.() === true && !this.final() && (this.status() === 'pass' || this.status() === 'watch'),
  );
  protected readonly shownWord = computed(
    () => this.word() ?? (this.soFar() ? `${WORDS[this.status()]} so far` : WORDS[this.status()]),
  );
}
