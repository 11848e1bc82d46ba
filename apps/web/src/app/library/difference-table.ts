import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { ModelDifference } from './model-facts';

/** What differs between two versions of a trap model, a row each. */
@Component({
  selector: 'app-difference-table',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (differences().length === 0) {
      <p>Nothing differs.</p>
    } @else {
      <table>
        <caption class="rb-visually-hidden">
          What differs
        </caption>
        <thead>
          <tr>
            <th scope="col">What</th>
            <th scope="col">{{ before() }}</th>
            <th scope="col">{{ after() }}</th>
          </tr>
        </thead>
        <tbody>
          @for (row of differences(); track row.word) {
            <tr>
              <th scope="row">{{ row.word }}</th>
              <td>{{ row.before }}</td>
              <td>{{ row.after }}</td>
            </tr>
          }
        </tbody>
      </table>
    }
  `,
  styles: `
    :host {
      display: block;
      overflow-x: auto;
    }
    table {
      width: 100%;
      border-collapse: collapse;
      font:
        400 12.5px/17px Inter,
        sans-serif;
    }
    th {
      padding: 2px 8px 2px 0;
      color: var(--rb-ink-2);
      font:
        500 11px/14px Inter,
        sans-serif;
      text-align: left;
    }
    th[scope='row'] {
      font:
        400 12.5px/17px Inter,
        sans-serif;
    }
    tbody :is(th, td) {
      padding: 3px 8px 3px 0;
      border-top: 1px solid var(--rb-rule);
    }
    td {
      font-variant-numeric: tabular-nums;
    }
    td:last-child {
      font-weight: 600;
    }
  `,
})
export class DifferenceTable {
  readonly differences = input.required<readonly ModelDifference[]>();
  /** Heads of the two columns. */
  readonly before = input('Before');
  readonly after = input('After');
}
