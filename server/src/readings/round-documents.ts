import type { Gauge, NetworkDocument } from '@riseback/network';
import type { NetworkAccess } from '../platform/auth/access';
import { conflict, notFound, ProblemError } from '../platform/problem';

/** What rounds need of the networks. */
export interface RoundNetworks {
  /** @throws ProblemError 404 it never had this version; from `document` 422 too long ago to be worked out */
  atVersion(
    access: NetworkAccess,
    version: number | undefined,
  ): { readonly version: number; readonly document: NetworkDocument };
}

type Gauges = NetworkDocument['gauges'];

/** The gauges of a network, at the last versions that were asked for: a round's readings come one by one, all of one version. */
const KEPT = 32;

export class RoundDocuments {
  private readonly gauges = new Map<string, Gauges>();

  constructor(private readonly networks: RoundNetworks) {}

  /**
   * The network at a version; undefined where that is too long ago, which is no reason to refuse what was read in the plant.
   * @throws ProblemError 404
   */
  at(access: NetworkAccess, version: number): NetworkDocument | undefined {
    const found = this.networks.atVersion(access, version);
    try {
      return found.document;
    } catch (error) {
      if (error instanceof ProblemError && error.problem.status === 422) return undefined;
      throw error;
    }
  }

  /**
   * A gauge as it was read: that of the round's version, which the device showed; or, for one that was added or put back to use since, that
   * of the network as it stands. One that was retired or removed after the round began can be sent still.
   * @throws ProblemError 404 no such gauge; 409 retired
   */
  gauge(access: NetworkAccess, version: number, id: string): Gauge {
    const then = this.gaugesAt(access, version).get(id)?.value;
    if (then !== undefined && !then.retired) return then;
    const now = this.networks.atVersion(access, undefined).document.gauges.get(id)?.value;
    if (now !== undefined && !now.retired) return now;
    const known = now ?? then;
    if (known === undefined) {
      throw notFound(`The network has no gauge ${id}: neither in version ${version}, nor as it stands. Add it first.`);
    }
    throw conflict(
      `Gauge ${known.tag ?? id} is retired. Nothing was stored. Put it back to use in the list of gauges, then send the reading again.`,
    );
  }

  private gaugesAt(access: NetworkAccess, version: number): Gauges {
    const key = `${access.networkId} ${version}`;
    const known = this.gauges.get(key);
    if (known !== undefined) return known;
    const gauges = this.at(access, version)?.gauges ?? new Map<string, never>();
    const [oldest] = this.gauges.keys();
    if (oldest !== undefined && this.gauges.size >= KEPT) this.gauges.delete(oldest);
    this.gauges.set(key, gauges);
    return gauges;
  }
}
