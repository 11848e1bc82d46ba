import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { Term } from './term';
import { type TermKey, TERMS } from './terms';

/** The words of a picture, whose own labels cannot be pointed at, in one line under it. */
@Component({
  selector: 'app-term-row',
  imports: [Term],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <p>
      <span>The words:</span>
      @for (key of of(); track key) {
        <app-term [of]="key">{{ terms[key].word }}</app-term>
      }
    </p>
  `,
  styles: `
    p {
      display: flex;
      flex-wrap: wrap;
      gap: 4px 14px;
      color: var(--rb-ink-2);
      font:
        400 11px/14px Inter,
        sans-serif;
    }

    span,
    app-term {
      padding: 4px 0;
    }

    @media print {
      p {
        display: none;
      }
    }
  `,
})
export class TermRow {
  readonly of = input.required<readonly TermKey[]>();

  protected readonly terms = TERMS;
}
