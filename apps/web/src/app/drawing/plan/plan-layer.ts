import { ChangeDetectionStrategy, Component, effect, inject, untracked } from '@angular/core';
import { NetworkStore } from '../../networks/network-store';
import { PlanStore } from './plan-store';

/** The plan itself, under everything that is drawn and in the same coordinates. */
@Component({
  selector: '[appPlanLayer]',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (store.shown(); as plan) {
      <svg:image
        aria-hidden="true"
        preserveAspectRatio="none"
        [attr.href]="plan.url"
        [attr.x]="plan.x"
        [attr.y]="plan.y"
        [attr.width]="plan.width"
        [attr.height]="plan.height"
        [attr.opacity]="plan.opacity"
      />
    }
  `,
  styles: `
    image {
      filter: var(--rb-plan-filter);
      pointer-events: none;
    }
    @media print {
      image {
        display: none;
      }
    }
  `,
})
export class PlanLayer {
  protected readonly store = inject(PlanStore);

  constructor() {
    const network = inject(NetworkStore);
    effect(() => {
      const networkId = network.network()?.id;
      if (networkId !== undefined) untracked(() => this.store.open(networkId));
    });
  }
}
