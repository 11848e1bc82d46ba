import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { CapacityPoint } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { CAPACITY, type CapacityNeed, capacityFigure } from './capacity-figure';

/** What a trap model passes over the differential: the curve that the solver judges by, its points, and where a trap stands. */
@Component({
  selector: 'app-capacity-chart',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './capacity-chart.html',
  styleUrl: './capacity-chart.scss',
})
export class CapacityChart {
  readonly points = input.required<readonly CapacityPoint[]>();
  readonly units = input.required<DisplayUnits>();
  readonly need = input<CapacityNeed | null>(null);
  /** Leaves the table out where the numbers stand beside the chart already. */
  readonly withTable = input(true);

  protected readonly CAPACITY = CAPACITY;
  protected readonly figure = computed(() => capacityFigure(this.points(), this.units(), this.need()));
}
