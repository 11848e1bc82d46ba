import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { TrapResult } from '@riseback/contracts';
import type { DisplayUnits } from '@riseback/units';
import { BANDS_TO_COME } from '../../shared/bands-to-come';
import { FLAT, flatStaff, staffModel } from '@riseback/figures';
import { limitLines, TALL, tallStaff } from './tall-staff';

let staffCount = 0;

/**
 * A gauge staff: its tube reaches to the steam inlet and is filled with what makes the back pressure; the empty part is the
 * differential. Tall with numbers in the inspector, flat in tables and lists.
 */
@Component({
  selector: 'app-staff',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class]': 'orientation()', '[class.bands-to-come]': 'bandsToCome()' },
  templateUrl: './staff.html',
  styleUrl: './staff.scss',
})
export class Staff {
  readonly trap = input.required<TrapResult>();
  readonly inletPressurePa = input.required<number>();
  readonly units = input.required<DisplayUnits>();
  /** The back pressure above which a check would fail; see `backPressureLimit`. */
  readonly limitPa = input(undefined, { transform: given });
  /** What the limit comes from, a word or two under its number. */
  readonly limitWord = input('limit');
  readonly receiverName = input('Receiver');
  readonly orientation = input<'tall' | 'flat'>('tall');
  /** One scale for the staffs of a table. */
  readonly scaleMaximumPa = input(undefined, { transform: given });
  /** Width of a flat staff, px. */
  readonly width = input(112);

  protected readonly TALL = TALL;
  protected readonly FLAT = FLAT;
  private readonly id = `staff-${String(++staffCount)}`;
  protected readonly lines = `${this.id}-lines`;
  protected readonly hatch = `${this.id}-hatch`;
  protected readonly dots = `${this.id}-dots`;
  protected readonly fills = {
    receiver: null,
    lift: `url(#${this.lines})`,
    friction: `url(#${this.hatch})`,
    flash: `url(#${this.dots})`,
  } as const;

  protected readonly bandsToCome = inject(BANDS_TO_COME, { optional: true }) ?? (() => false);
  protected readonly model = computed(() =>
    staffModel(this.trap(), this.inletPressurePa(), this.units(), {
      receiverName: this.receiverName(),
      limitPa: this.limitPa(),
      bandsToCome: this.bandsToCome(),
    }),
  );
  protected readonly limitLines = computed(() => limitLines(this.limitWord()));
  protected readonly tall = computed(() =>
    this.orientation() === 'tall' ? tallStaff(this.model(), this.units(), this.scaleMaximumPa()) : null,
  );
  protected readonly flat = computed(() =>
    this.orientation() === 'flat' ? flatStaff(this.model(), this.width(), this.scaleMaximumPa()) : null,
  );
}

/** A template's `?.` gives null where TypeScript's gives undefined. */
function given(value: number | null | undefined): number | undefined {
  return value ?? undefined;
}
