import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { RouterLink } from '@angular/router';
import { checkName } from '@riseback/contracts';
import type { Limits } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { limitGroups } from '../../networks/limit-rows';
import { QuantityField } from '../quantity-field/quantity-field';

/** One limit set, or given back to its default. */
export interface LimitChange {
  readonly code: string;
  readonly key: string;
  readonly to: number | undefined;
}

/** Every limit that the checks judge by: empty is the default, which the field shows with where it comes from. */
@Component({
  selector: 'app-limit-form',
  imports: [QuantityField, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './limit-form.html',
  styleUrl: './limit-form.scss',
})
export class LimitForm {
  readonly limits = input.required<Limits>();
  readonly units = input.required<DisplayUnits>();
  readonly disabled = input(false);
  /** Why the last change was refused, beside the limit it was of. */
  readonly refusal = input<{ readonly code: string; readonly key: string; readonly reason: string } | null>(null);
  /** The Method view, where there is one to go to. */
  readonly method = input<string>();

  readonly changed = output<LimitChange>();

  protected readonly groups = computed(() => {
    const units = this.units();
    return limitGroups(this.limits()).map(({ code, rows }) => ({
      code,
      name: checkName(code),
      rows: rows.map((row) => ({
        ...row,
        placeholder: `${formatQuantity(row.defaultSi, row.kind, units)}, default`,
        hint:
          row.own === undefined
            ? row.source
            : `Default ${formatQuantity(row.defaultSi, row.kind, units, { withUnit: true })}: ${row.source}`,
      })),
    }));
  });

  protected refusalAt(code: string, key: string): string {
    const refusal = this.refusal();
    return refusal?.code === code && refusal.key === key ? refusal.reason : '';
  }
}
