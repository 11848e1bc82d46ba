import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { setNetworkOp } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { NetworkStore } from '../../networks/network-store';
import { checkName } from '../../results/finding-words';
import { QuantityField } from '../../shared/quantity-field/quantity-field';
import { limitGroups, withLimit } from '../../networks/limit-rows';

/** The limits that the checks judge by: empty is the default, which the field shows with where it comes from. */
@Component({
  selector: 'app-limit-fields',
  imports: [QuantityField, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './limit-fields.html',
  styleUrl: './limit-fields.scss',
})
export class LimitFields {
  protected readonly store = inject(NetworkStore);

  protected readonly fixed = computed(() => !this.store.mayDraw());
  protected readonly groups = computed(() => {
    const units = this.store.units();
    return limitGroups(this.store.document()?.limits ?? {}).map(({ code, rows }) => ({
      code,
      name: checkName(code),
      rows: rows.map((row) => ({
        ...row,
        id: `${code}.${row.key}`,
        placeholder: `${formatQuantity(row.defaultSi, row.kind, units)}, default`,
        hint:
          row.own === undefined
            ? row.source
            : `Default ${formatQuantity(row.defaultSi, row.kind, units, { withUnit: true })}: ${row.source}`,
      })),
    }));
  });
  protected readonly ownCount = computed(
    () => this.groups().flatMap(({ rows }) => rows.filter(({ own }) => own !== undefined)).length,
  );
  private readonly refusal = signal<{ readonly id: string; readonly reason: string } | null>(null);

  protected refusalAt(id: string): string {
    const refusal = this.refusal();
    return refusal?.id === id ? refusal.reason : '';
  }

  protected set(code: string, key: string, to: number | undefined): void {
    const document = this.store.document();
    if (document === null) return;
    const what = to === undefined ? 'default limit' : 'limit';
    const label = `${what} of ${checkName(code).toLowerCase()}`;
    const taken = this.store.edit(label, [setNetworkOp(document, 'limits', withLimit(document.limits, code, key, to))]);
    this.refusal.set(taken ? null : { id: `${code}.${key}`, reason: this.store.lastRefusal().join(' ') });
  }
}
