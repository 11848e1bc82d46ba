import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { ListTable } from '../list-table';
import { printedList } from './printed-list';

/** A list on paper: all of its rows, the heads repeated on each page. On the screen it is not there. */
@Component({
  selector: 'app-list-print',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <table>
      <caption>
        {{
          title()
        }}
      </caption>
      <thead>
        <tr>
          @for (column of list().columns; track column.key) {
            <th scope="col" [class.number]="column.numeric" [class.results]="column.opensResults">{{ column.head }}</th>
          }
        </tr>
      </thead>
      <tbody>
        @for (row of list().rows; track row.id) {
          <tr>
            @for (cell of row.cells; track $index) {
              <td
                [class.number]="list().columns[$index]?.numeric"
                [class.results]="list().columns[$index]?.opensResults"
              >
                {{ cell }}
              </td>
            }
          </tr>
        }
      </tbody>
    </table>
    <p>
      Steam and hot condensate burn and kill; water hammer breaks pipes. Nobody opens a line, a trap or a gauge
      connection on the word of a calculation.
    </p>
  `,
  styleUrl: './list-print.scss',
})
export class ListPrint {
  readonly table = input.required<ListTable>();
  readonly title = input.required<string>();
  /** Columns and rows in the order shown. */
  readonly keys = input.required<readonly string[]>();
  readonly ids = input.required<readonly string[]>();

  protected readonly list = computed(() => printedList(this.table(), this.keys(), this.ids()));
}
