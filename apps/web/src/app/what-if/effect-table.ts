import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { UNCHANGED_PA } from '@riseback/revisions';
import { type DisplayUnits, displayUnit } from '@riseback/units';
import { changeWords, pressureWords } from '../results/pressure-change';
import { StatusMark } from '../shared/status-mark/status-mark';
import type { Effect } from './effects';

/** What a trial does, trap by trap: the verdict and the back pressure now and with it. */
@Component({
  selector: 'app-effect-table',
  imports: [RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './effect-table.html',
  styleUrl: './effect-table.scss',
})
export class EffectTable {
  readonly effects = input.required<readonly Effect[]>();
  readonly units = input.required<DisplayUnits>();
  /** Of an earlier state of the network or of the trial. */
  readonly stale = input(false);

  protected readonly titles = computed(() => ({
    pressure: displayUnit('pressure', this.units().system),
    difference: displayUnit('pressureDifference', this.units().system),
  }));
  protected readonly rows = computed(() => {
    const units = this.units();
    const largestPa = Math.max(UNCHANGED_PA, ...this.effects().map(({ changePa }) => Math.abs(changePa ?? 0)));
    return this.effects().map((effect) => ({
      ...effect,
      afterWord: effect.afterPa === undefined && effect.beforePa !== undefined ? 'No result' : undefined,
      beforeWords: pressureWords(effect.beforePa, units),
      afterWords: pressureWords(effect.afterPa, units),
      changeWords: changeWords(effect.changePa, units),
      bar: (effect.changePa ?? 0) / largestPa,
    }));
  });

  protected abs(value: number): number {
    return Math.abs(value);
  }
}
