import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { TrapModel } from '@riseback/network';
import { displayUnit, formatQuantity, type QuantityKind } from '@riseback/units';
import { NetworkStore } from '../../networks/network-store';

/** The chosen model of a trap: its ratings and its capacities, as the network holds them. */
@Component({
  selector: 'app-model-tab',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h3>{{ model().name }}</h3>
    <dl>
      @for (row of rows(); track row.name) {
        <dt>{{ row.name }}</dt>
        <dd>{{ row.value }}</dd>
      }
    </dl>
    @if (capacity().length > 0) {
      <table class="table">
        <caption class="rb-visually-hidden">
          Capacity by differential
        </caption>
        <thead>
          <tr>
            <th scope="col">Differential, {{ differentialUnit() }}</th>
            <th scope="col">Capacity, {{ flowUnit() }}</th>
          </tr>
        </thead>
        <tbody>
          @for (point of capacity(); track point.differential) {
            <tr>
              <td>{{ point.differential }}</td>
              <td>{{ point.flow }}</td>
            </tr>
          }
        </tbody>
      </table>
    }
  `,
  styleUrl: './inspector-tabs.scss',
})
export class ModelTab {
  private readonly store = inject(NetworkStore);

  readonly model = input.required<TrapModel>();

  protected readonly differentialUnit = computed(() => displayUnit('pressureDifference', this.store.units().system));
  protected readonly flowUnit = computed(() => displayUnit('massFlow', this.store.units().system));
  protected readonly rows = computed(() => {
    const { orificeDiameterM, maximumDifferentialPa, bodyPressurePa, bodyTemperatureK, maximumBackPressureFraction } =
      this.model();
    return [
      this.row('Orifice', orificeDiameterM, 'diameter'),
      this.row('Largest differential', maximumDifferentialPa, 'pressureDifference'),
      this.row('Body pressure', bodyPressurePa, 'pressure'),
      this.row('at', bodyTemperatureK, 'temperature'),
      this.row('Largest back-pressure fraction', maximumBackPressureFraction, 'fraction'),
    ].flat();
  });
  protected readonly capacity = computed(() =>
    (this.model().capacity ?? []).map(({ differentialPa, flowKgS }) => ({
      differential: formatQuantity(differentialPa, 'pressureDifference', this.store.units()),
      flow: formatQuantity(flowKgS, 'massFlow', this.store.units()),
    })),
  );

  private row(name: string, si: number | undefined, kind: QuantityKind): { name: string; value: string }[] {
    return si === undefined ? [] : [{ name, value: formatQuantity(si, kind, this.store.units(), { withUnit: true }) }];
  }
}
