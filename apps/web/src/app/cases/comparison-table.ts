import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { displayUnit, type DisplayUnits } from '@riseback/units';
import { BANDS_TO_COME } from '../shared/bands-to-come';
import { StatusMark } from '../shared/status-mark/status-mark';
import { TermRow } from '../shared/term/term-row';
import { type Comparison, type ComparisonOrder, ordered } from './case-comparison';

/** All cases side by side: back pressure and verdict of every trap in each of them, and its worst. */
@Component({
  selector: 'app-comparison-table',
  imports: [RouterLink, StatusMark, TermRow],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './comparison-table.html',
  styleUrl: './comparison-table.scss',
})
export class ComparisonTable {
  readonly comparison = input.required<Comparison>();
  readonly units = input.required<DisplayUnits>();
  readonly stale = input(false);

  protected readonly bandsToCome = inject(BANDS_TO_COME, { optional: true }) ?? (() => false);
  protected readonly order = signal<ComparisonOrder>('worst');
  protected readonly traps = computed(() => ordered(this.comparison().traps, this.order()));
  protected readonly several = computed(() => this.comparison().heads.length > 1);
  /** Nothing to compare yet. Rows in an order that the first result overturns would jump under the pointer. */
  protected readonly awaited = computed(() =>
    this.comparison().heads.every(({ counts, refusal }) => counts === null && refusal === ''),
  );
  protected readonly unit = computed(() => displayUnit('pressure', this.units().system));
}
