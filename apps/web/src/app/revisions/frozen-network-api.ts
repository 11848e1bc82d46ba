import { inject, Injectable } from '@angular/core';
import type { EditAccepted, Network, NetworkResults, Revision } from '@riseback/contracts';
import { fromFile, type NetworkDocument, type NetworkFile } from '@riseback/network';
import { forkJoin, map, type Observable, of, shareReplay, throwError } from 'rxjs';
import { NetworkApi } from '../networks/network-api';
import { RevisionApi } from './revision-api';

/**
 * Answers as if a frozen revision were the network, so that the same views show it: nothing can be drawn, and its results are those that
 * were frozen. In the frozen page's `providers` in place of the network's own.
 */
@Injectable()
export class FrozenNetworkApi implements Pick<
  NetworkApi,
  'get' | 'file' | 'edit' | 'editsSince' | 'present' | 'results'
> {
  private readonly networks = inject(NetworkApi, { skipSelf: true });
  private readonly revisions = inject(RevisionApi);
  private asked: { readonly id: string; readonly revision: Observable<Revision> } | undefined;

  /** Set by the page before anything is opened. */
  revisionId = '';

  get(networkId: string): Observable<Network> {
    return forkJoin([this.networks.get(networkId), this.revision(networkId)]).pipe(
      map(([network, revision]) => ({
        ...network,
        name: revision.file.name,
        version: revision.networkVersion,
        solverHash: revision.solverHash,
        permissions: network.permissions.filter((permission) => permission === 'view' || permission === 'comment'),
        document: stored(fromFile(revision.file)),
      })),
    );
  }

  file(networkId: string): Observable<NetworkFile> {
    return this.revision(networkId).pipe(map(({ file }) => file));
  }

  results(networkId: string): Observable<NetworkResults> {
    return this.revisions.results(networkId, this.revisionId);
  }

  edit(): Observable<EditAccepted> {
    return throwError(() => new Error('A frozen revision cannot be edited.'));
  }

  editsSince(): Observable<never[]> {
    return of([]);
  }

  present(): Observable<unknown> {
    return of(null);
  }

  /** Read once however many ask. */
  revision(networkId: string): Observable<Revision> {
    if (this.asked?.id !== this.revisionId) {
      const revision = this.revisions.get(networkId, this.revisionId).pipe(shareReplay(1));
      this.asked = { id: this.revisionId, revision };
    }
    return this.asked.revision;
  }
}

function stored(document: NetworkDocument): Network['document'] {
  const { name, site, method, limits, nodes, pipes, trapModels, cases, overrides, gauges } = document;
  return {
    name,
    site,
    method,
    limits,
    nodes: [...nodes.values()],
    pipes: [...pipes.values()],
    trapModels: [...trapModels.values()],
    cases: [...cases.values()],
    overrides: [...overrides].map(([id, { ordinal, value }]) => ({
      caseId: id.slice(0, id.length - value.node.length - 1),
      ordinal,
      value,
    })),
    gauges: [...gauges.values()],
  };
}
