import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, output } from '@angular/core';
import { pipeBore, pipeSizes } from '@riseback/hydraulics';
import type { PipeSize } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { QuantityField } from '../../shared/quantity-field/quantity-field';
import { ChoiceField } from '../../shared/fields/choice-field';

/** A pipe's nominal size and schedule, or its bore. Exactly one of the two keys is set. */
export interface ChosenSize {
  readonly size: PipeSize | undefined;
  readonly insideDiameterM: number | undefined;
}

const OWN_BORE = 'own';

/** Chooses a pipe's size by standard, schedule and nominal size, or takes a bore; goes out when it is complete. */
@Component({
  selector: 'app-pipe-size-field',
  imports: [ChoiceField, QuantityField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './pipe-size-field.html',
  styleUrl: './property-fields.scss',
})
export class PipeSizeField {
  readonly size = input<PipeSize>();
  readonly insideDiameterM = input<number>();
  readonly units = input.required<DisplayUnits>();
  readonly disabled = input(false);
  readonly hint = input('');
  readonly refusal = input('');
  readonly accepted = output<ChosenSize>();

  /** The schedule chosen here, before a size that it has is chosen too. */
  protected readonly schedule = linkedSignal<string | undefined>(
    () => this.size()?.schedule ?? (this.insideDiameterM() === undefined ? undefined : OWN_BORE),
  );
  protected readonly ownBore = computed(() => this.schedule() === OWN_BORE);
  protected readonly schedules = [
    ...pipeSizes().map(({ standard, schedule }) => ({
      value: schedule,
      words: schedule.startsWith(standard) ? schedule : `${standard}, ${schedule}`,
    })),
    { value: OWN_BORE, words: 'Bore of its own' },
  ];
  protected readonly sizes = computed(() => {
    const chosen = pipeSizes().find(({ schedule }) => schedule === this.schedule());
    return (chosen?.sizes ?? []).map(({ nps, dn }) => ({ value: nps, words: `${nps} in (DN ${String(dn)})` }));
  });
  protected readonly nps = computed(() => {
    const nps = this.size()?.nps;
    return this.sizes().some(({ value }) => value === nps) ? nps : undefined;
  });
  protected readonly boreWords = computed(() => {
    const size = this.size();
    const bore = size === undefined ? undefined : pipeBore(size);
    return bore === undefined
      ? this.hint()
      : `Bore ${formatQuantity(bore.insideDiameterM, 'diameter', this.units(), { withUnit: true })}`;
  });

  protected chooseSchedule(schedule: string | undefined): void {
    this.schedule.set(schedule);
    const nps = this.nps();
    if (schedule !== undefined && schedule !== OWN_BORE && nps !== undefined) this.accept({ nps, schedule });
  }

  protected chooseSize(nps: string | undefined): void {
    const schedule = this.schedule();
    if (nps !== undefined && schedule !== undefined) this.accept({ nps, schedule });
  }

  protected chooseBore(boreM: number | undefined): void {
    if (boreM !== undefined) this.accepted.emit({ size: undefined, insideDiameterM: boreM });
  }

  private accept(size: PipeSize): void {
    this.accepted.emit({ size, insideDiameterM: undefined });
  }
}
