import { computed, inject, Injectable, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import type { Revision, RevisionSummary } from '@riseback/contracts';
import { Company } from '../networks/company';
import { NetworkStore } from '../networks/network-store';
import { type Load, LOADING } from '../shared/load';
import { rereading } from '../shared/rereading';
import { RevisionApi } from './revision-api';
import { newestFirst, WORKING } from './revision-choice';

/** What the Revisions view shows. */
export interface Shown {
  /** Null for the network as it is drawn now. */
  readonly revision: Revision | null;
  /** Id, WORKING, or null where there is nothing to compare with. */
  readonly comparedId: string | null;
}

/** The revisions of the network that is open, read anew whenever the server speaks of them. In the network page's `providers`. */
@Injectable()
export class RevisionHistory {
  private readonly api = inject(RevisionApi);
  private readonly store = inject(NetworkStore);
  private readonly company = inject(Company);

  private readonly asked = signal(0);
  /** Goes up when something about the revisions may have changed. */
  readonly count = computed(() => this.asked() + this.company.revisionsTold());
  readonly networkId = computed(() => this.store.network()?.id ?? '');
  readonly load = toSignal(
    rereading(
      computed(() => ({ key: this.networkId(), count: this.count() })),
      (networkId) => this.api.list(networkId),
    ),
    { initialValue: LOADING satisfies Load<RevisionSummary[]> },
  );
  /** The newest first. */
  readonly revisions = computed((): readonly RevisionSummary[] => {
    const load = this.load();
    return load.status === 'ready' ? newestFirst(load.value) : [];
  });
  readonly newest = computed(() => this.revisions()[0] ?? null);
  /** What the Revisions view shows; null in all other views. */
  readonly shown = signal<Shown | null>(null);

  /** What a revision is called beside others. */
  labelOf(id: string): string {
    return id === WORKING ? 'Working' : (this.revisions().find((revision) => revision.id === id)?.letter ?? '');
  }

  reload(): void {
    this.asked.update((count) => count + 1);
  }
}
