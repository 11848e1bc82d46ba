import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { LibraryModel } from '@riseback/contracts';
import { timeWords } from '../account/time-words';
import { newestFirst, typeRows } from './library-summary';

const SHOWN_OF_NEWEST = 5;

/** The library at a glance, where no model is chosen: what it holds, what it lacks, and what was saved last. */
@Component({
  selector: 'app-library-overview',
  imports: [RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <p class="hint">Choose a model to see its ratings, its capacity and its versions.</p>
    <table>
      <caption>
        In use, by trap type
      </caption>
      <thead>
        <tr>
          <th scope="col">Trap type</th>
          <th scope="col" class="rb-number">Models</th>
          <th scope="col" class="rb-number">Without capacities</th>
        </tr>
      </thead>
      <tbody>
        @for (row of types(); track row.words) {
          <tr>
            <th scope="row">{{ row.words }}</th>
            <td class="rb-number">{{ row.models }}</td>
            <td class="rb-number">{{ row.without }}</td>
          </tr>
        }
      </tbody>
    </table>
    <p class="hint">A trap whose model has no capacities is not checked for what it can drain.</p>
    <h2>Saved last</h2>
    <ul>
      @for (row of newest(); track row.id) {
        <li>
          <a [routerLink]="[]" [queryParams]="{ model: row.id }">{{ row.name }}</a>
          <span class="hint">version {{ row.version }}, {{ row.when }}</span>
        </li>
      }
    </ul>
  `,
  styleUrl: './library-overview.scss',
})
export class LibraryOverview {
  readonly models = input.required<readonly LibraryModel[]>();
  readonly timeZone = input.required<string>();

  protected readonly types = computed(() => typeRows(this.models()));
  protected readonly newest = computed(() =>
    newestFirst(this.models())
      .slice(0, SHOWN_OF_NEWEST)
      .map(({ id, name, version, createdAt }) => ({ id, name, version, when: timeWords(createdAt, this.timeZone()) })),
  );
}
