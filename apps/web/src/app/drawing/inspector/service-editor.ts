import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, output } from '@angular/core';
import type { Trap } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { QuantityField } from '../../shared/quantity-field/quantity-field';
import { ChoiceField } from '../../shared/fields/choice-field';

type Service = Trap['service'];
type Wanted = 'constant' | 'varyingInlet' | 'varyingFlow';

interface Temperatures {
  readonly inletK: number | undefined;
  readonly outletK: number | undefined;
}

/** How a trap's steam is controlled. Modulating service goes out once both temperatures of the heated side are given. */
@Component({
  selector: 'app-service-editor',
  imports: [ChoiceField, QuantityField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './service-editor.html',
  styleUrl: './property-fields.scss',
})
export class ServiceEditor {
  readonly service = input.required<Service>();
  readonly units = input.required<DisplayUnits>();
  readonly disabled = input(false);
  readonly refusal = input('');
  readonly accepted = output<Service>();

  protected readonly choices = [
    { value: 'constant', words: 'Constant steam pressure' },
    { value: 'varyingInlet', words: 'Modulated, product inlet varies' },
    { value: 'varyingFlow', words: 'Modulated, product flow varies' },
  ];
  protected readonly wanted = linkedSignal<Wanted>(() => {
    const service = this.service();
    return service.kind === 'constant' ? 'constant' : service.control;
  });
  private readonly temperatures = linkedSignal<Temperatures>(() => {
    const service = this.service();
    return service.kind === 'constant'
      ? { inletK: undefined, outletK: undefined }
      : { inletK: service.secondaryInletK, outletK: service.secondaryOutletK };
  });
  protected readonly inletK = computed(() => this.temperatures().inletK);
  protected readonly outletK = computed(() => this.temperatures().outletK);
  protected readonly waiting = computed(
    () => this.wanted() !== 'constant' && (this.inletK() === undefined || this.outletK() === undefined),
  );

  protected choose(value: string | undefined): void {
    this.wanted.set(value === 'varyingInlet' || value === 'varyingFlow' ? value : 'constant');
    this.accept();
  }

  protected setInlet(inletK: number | undefined): void {
    this.temperatures.update((before) => ({ ...before, inletK }));
    this.accept();
  }

  protected setOutlet(outletK: number | undefined): void {
    this.temperatures.update((before) => ({ ...before, outletK }));
    this.accept();
  }

  private accept(): void {
    const control = this.wanted();
    if (control === 'constant') {
      this.accepted.emit({ kind: 'constant' });
      return;
    }
    const { inletK, outletK } = this.temperatures();
    if (inletK !== undefined && outletK !== undefined) {
      this.accepted.emit({ kind: 'modulating', control, secondaryInletK: inletK, secondaryOutletK: outletK });
    }
  }
}
