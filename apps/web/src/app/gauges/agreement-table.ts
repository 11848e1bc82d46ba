import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { StatusMark } from '../shared/status-mark/status-mark';
import type { AgreementLine } from './agreement-lines';

/** What the chart shows, in numbers; a gauge's name opens its trend. */
@Component({
  selector: 'app-agreement-table',
  imports: [StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div class="scroll" tabindex="0" role="region" aria-label="Agreement by gauge">
      <table>
        <thead>
          <tr>
            <th scope="col">Gauge</th>
            <th scope="col" class="number">Expected, {{ unit() }}</th>
            <th scope="col" class="number">Read at the tap, {{ unit() }}</th>
            <th scope="col" class="number">Difference</th>
            <th scope="col" class="number">E</th>
            <th scope="col">Verdict</th>
          </tr>
        </thead>
        <tbody>
          @for (line of lines(); track line.gaugeId) {
            <tr [class.fail]="line.status === 'fail'" [class.chosen]="line.gaugeId === gaugeId()">
              <th scope="row">
                <button
                  type="button"
                  [attr.aria-pressed]="line.gaugeId === gaugeId()"
                  (click)="chosen.emit(line.gaugeId)"
                >
                  {{ line.name }}
                </button>
                <span>{{ places().get(line.gaugeId) }}</span>
              </th>
              <td class="number">
                {{ line.expected || '–' }} <span>{{ line.expectedWithin }}</span>
              </td>
              <td class="number">
                <strong>{{ line.read || '–' }}</strong> <span>{{ line.readWithin }}</span>
              </td>
              <td class="number">{{ line.difference || '–' }}</td>
              <td class="number">{{ line.e || '–' }}</td>
              <td>
                <app-status-mark [status]="line.status" [word]="line.word" [final]="true" />
                @if (line.why) {
                  <span class="why">{{ line.why }}</span>
                }
              </td>
            </tr>
          }
        </tbody>
      </table>
    </div>
    <p>
      E is the difference over both uncertainties together (ISO/IEC 17043, E number): within 1 both agree, from 1.5 they
      disagree. Readings are corrected to the tap: a filled leg and its height are taken off.
    </p>
  `,
  styleUrl: './agreement-table.scss',
})
export class AgreementTable {
  readonly lines = input.required<readonly AgreementLine[]>();
  /** Where each stands, by gauge. */
  readonly places = input.required<ReadonlyMap<string, string>>();
  readonly unit = input.required<string>();
  readonly gaugeId = input('');
  readonly chosen = output<string>();
}
