import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { jsonEqual, type Limits, setNetworkOp } from '@riseback/network';
import { limitGroups, withLimit } from '../../networks/limit-rows';
import { NetworkStore } from '../../networks/network-store';
import { checkName } from '../../results/finding-words';
import { type LimitChange, LimitForm } from '../../shared/limit-form/limit-form';
import { HeldSiteSettings } from '../../sites/held-site-settings';

/** The limits that this network is judged by. A new network begins with its site's; from then on it has its own. */
@Component({
  selector: 'app-limit-fields',
  imports: [LimitForm, MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './limit-fields.html',
  styleUrl: './limit-fields.scss',
})
export class LimitFields {
  private readonly siteSettings = inject(HeldSiteSettings);
  protected readonly store = inject(NetworkStore);

  protected readonly fixed = computed(() => !this.store.mayDraw());
  protected readonly ownCount = computed(
    () =>
      limitGroups(this.store.document()?.limits ?? {}).flatMap(({ rows }) =>
        rows.filter(({ own }) => own !== undefined),
      ).length,
  );
  private readonly siteLimits = computed((): Limits | null => {
    const load = this.siteSettings.of(this.store.network()?.siteId ?? '')();
    return load.status === 'ready' ? load.value.limits : null;
  });
  protected readonly siteDiffers = computed(() => {
    const [ofSite, own] = [this.siteLimits(), this.store.document()?.limits];
    return ofSite !== null && own !== undefined && !jsonEqual(ofSite, own);
  });
  protected readonly refusal = signal<{ code: string; key: string; reason: string } | null>(null);

  protected set({ code, key, to }: LimitChange): void {
    const document = this.store.document();
    if (document === null) return;
    const what = to === undefined ? 'default limit' : 'limit';
    const label = `${what} of ${checkName(code).toLowerCase()}`;
    const taken = this.store.edit(label, [setNetworkOp(document, 'limits', withLimit(document.limits, code, key, to))]);
    this.refusal.set(taken ? null : { code, key, reason: this.store.lastRefusal().join(' ') });
  }

  protected takeFromSite(): void {
    const [document, limits] = [this.store.document(), this.siteLimits()];
    if (document !== null && limits !== null)
      this.store.edit('limits of the site', [setNetworkOp(document, 'limits', limits)]);
  }
}
