import { ChangeDetectionStrategy, Component, computed, input, model } from '@angular/core';
import { type DisplayUnits, displayUnit, formatQuantity } from '@riseback/units';
import { COLOURED_BY, type ColouredBy, type ColourScale } from '@riseback/figures';

const WORDS: Readonly<Record<ColouredBy, string>> = {
  pressure: 'Back pressure',
  flash: 'Flash share',
  velocity: 'Velocity',
};

/** What the colours mean, with the unit that stands nowhere else on the sheet; also the chooser of what is coloured. */
@Component({
  selector: 'app-colour-legend',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './colour-legend.html',
  styleUrl: './colour-legend.scss',
})
export class ColourLegend {
  readonly scale = input.required<ColourScale>();
  readonly units = input.required<DisplayUnits>();
  readonly caseName = input('');
  /** The tag of the trap whose way is shown. */
  readonly wayOf = input<string | null>(null);
  readonly by = model.required<ColouredBy>();

  protected readonly choices = COLOURED_BY.map((by) => ({ by, words: WORDS[by] }));
  protected readonly classes = [1, 2, 3, 4, 5, 6, 7] as const;
  protected readonly unit = computed(() => displayUnit(this.scale().kind, this.units().system));
  protected readonly limits = computed(() => {
    const { limits, kind, decimals } = this.scale();
    return limits.map((limit) => formatQuantity(limit, kind, this.units(), { decimals }));
  });

  protected choose(value: string): void {
    const chosen = COLOURED_BY.find((by) => by === value);
    if (chosen !== undefined) this.by.set(chosen);
  }
}
