import { inject, Injectable, signal } from '@angular/core';
import { Router } from '@angular/router';
import type { NetworkSummary } from '@riseback/contracts';
import { firstValueFrom } from 'rxjs';
import { NetworkApi } from '../networks/network-api';
import { SessionStore } from '../session/session-store';
import { SiteApi } from '../sites/site-api';
import { toProblem } from '../shared/problem';
import { GuideMemory } from './guide-memory';

/** Whether a person is being shown round, and how far they have come. The strip in the network's page does the showing. */
@Injectable({ providedIn: 'root' })
export class Guide {
  private readonly router = inject(Router);
  private readonly sites = inject(SiteApi);
  private readonly networks = inject(NetworkApi);
  private readonly session = inject(SessionStore);
  private readonly memory = inject(GuideMemory);

  readonly running = signal(false);
  readonly stepIndex = signal(0);
  /** Why it could not begin; '' when it could. */
  readonly refusal = signal('');

  /** In the open network, or from elsewhere in one that has something to show. */
  async begin(): Promise<void> {
    this.remember();
    this.refusal.set('');
    try {
      if (!/\/networks\/[^/?#]/.test(this.router.url)) {
        const path = await this.pathToShow();
        if (path === null) {
          this.refusal.set('There is no network to show yet. Make one, or ask for a role at a site that has one.');
          return;
        }
        await this.router.navigateByUrl(path);
      }
      this.stepIndex.set(0);
      this.running.set(true);
    } catch (error) {
      this.refusal.set(toProblem(error).title);
    }
  }

  end(): void {
    this.running.set(false);
  }

  /** Offered once: on this device this person is not asked again. */
  remember(): void {
    const person = this.session.person();
    if (person !== null) this.memory.remember(person.id);
  }

  offersItself(): boolean {
    const person = this.session.person();
    return person !== null && !this.memory.wasOffered(person.id);
  }

  private async pathToShow(): Promise<string | null> {
    const sites = (await firstValueFrom(this.sites.list())).filter(({ networkCount }) => networkCount > 0);
    const lists = await Promise.all(sites.map(({ id }) => firstValueFrom(this.networks.list(id))));
    const all = sites.flatMap(({ id }, i) => (lists[i] ?? []).map((network) => ({ siteId: id, network })));
    const best = all.sort((a, b) => tells(b.network) - tells(a.network))[0];
    return best === undefined ? null : `/sites/${best.siteId}/networks/${best.network.id}/drawing`;
  }
}

/** A network with something wrong in it tells most; one that is not solved, least. */
function tells({ solve }: NetworkSummary): number {
  return solve.state === 'solved' ? (solve.fail > 0 ? 1e6 : 1) + solve.traps : 0;
}
