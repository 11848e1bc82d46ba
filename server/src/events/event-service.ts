import type { Presence, ReloadEvent, SavedBatch, SolveEvent } from '@riseback/contracts';
import type { NetworkAccess } from '../platform/auth/access';
import type { EventStream } from './event-stream';
import { editEvent, solveEvent, type NetworkStreams } from './network-streams';

/** What the events need of the networks and their solves. */
export interface EventSources {
  headOf(access: NetworkAccess): { readonly version: number; readonly solverHash: string };
  editsSince(access: NetworkAccess, version: number): { readonly batches: SavedBatch[]; readonly more: boolean };
  solveState(networkId: string, solverHash: string): SolveEvent['state'];
}

/** Beyond this a reader is better off with the whole network than with every edit since. */
export const MOST_BEHIND = 500;

export class EventService {
  constructor(
    private readonly sources: EventSources,
    private readonly streams: NetworkStreams,
  ) {}

  /**
   * Opens a stream from the version that its reader has; what was saved since comes first, and nothing is missed between the
   * two, because all of it happens in one turn.
   * @param since undefined: from now on
   * @throws ProblemError 429, 503 before the answer begins
   */
  open(access: NetworkAccess, since: number | undefined, begin: () => EventStream): void {
    this.streams.demandRoom(access);
    const head = this.sources.headOf(access);
    const behind = since === undefined ? 0 : head.version - since;
    // ahead of the newest version: the database was put back to an earlier state
    const tooFar = behind > MOST_BEHIND || behind < 0;
    const none = { batches: [], more: false };
    const missed = tooFar || behind === 0 ? none : this.sources.editsSince(access, head.version - behind);
    const stream = begin();
    if (tooFar || missed.more) {
      stream.send({ event: 'reload', data: { currentVersion: head.version } satisfies ReloadEvent });
    } else for (const batch of missed.batches) stream.send(editEvent(batch));
    stream.send(solveEvent({ ...head, state: this.sources.solveState(access.networkId, head.solverHash) }));
    this.streams.join(access, stream, head);
  }

  present(access: NetworkAccess, { selected }: Presence): void {
    this.streams.selected(access, selected);
  }
}
