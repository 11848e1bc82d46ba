import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import type { CommentSubject } from '@riseback/contracts';
import { type DisplayUnits, displayUnit } from '@riseback/units';
import { StatusMark } from '../../shared/status-mark/status-mark';
import { AXIS_WIDTH, effectAxis, effectMark } from './effect-axis';
import { type ComparedQuantity, type EffectRow, kindOf } from './effect-rows';
import { CommentButton } from './comment-button';

/** More rows than anybody reads at once; the rest come when asked for. */
const SHOWN_AT_FIRST = 100;

/** What a comparison did, trap by trap: before and after as numbers and on one axis, and the verdicts. */
@Component({
  selector: 'app-effect-list',
  imports: [CommentButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './effect-list.html',
  styleUrls: ['./compare-table.scss', './effect-list.scss'],
})
export class EffectList {
  readonly rows = input.required<readonly EffectRow[]>();
  /** Those of them that are shown; the axis holds them all, so that it stands still when the choice changes. */
  readonly shown = input.required<readonly EffectRow[]>();
  readonly quantity = input.required<ComparedQuantity>();
  readonly units = input.required<DisplayUnits>();
  readonly beforeLabel = input.required<string>();
  readonly afterLabel = input.required<string>();
  readonly mayComment = input(false);
  readonly elementChosen = output<string>();
  readonly commentOn = output<CommentSubject>();

  protected readonly width = AXIS_WIDTH;
  protected readonly all = signal(false);
  protected readonly unit = computed(() => displayUnit(kindOf(this.quantity()), this.units().system));
  protected readonly changeUnit = computed(() => displayUnit('pressureDifference', this.units().system));
  protected readonly axis = computed(() => effectAxis(this.rows(), this.quantity(), this.units()));
  protected readonly lines = computed(() => {
    const axis = this.axis();
    const some = this.all() ? this.shown() : this.shown().slice(0, SHOWN_AT_FIRST);
    return some.map((row) => ({
      ...row,
      mark: effectMark(row, axis),
      same: row.from === row.to && row.fromWord === row.toWord,
    }));
  });
  protected readonly hidden = computed(() => this.shown().length - this.lines().length);
}
