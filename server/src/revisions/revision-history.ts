import type { EventRecord, RevisionFacts, RevisionState } from '@riseback/revisions';
import { placeOfLetter } from '@riseback/revisions';
import type { Named, RevisionRepository, RevisionRow } from './revision-repository';

export interface RevisionWithHistory {
  readonly row: RevisionRow;
  readonly events: readonly Named<EventRecord>[];
  readonly editedBy: readonly { readonly personId: string; readonly personName: string }[];
  readonly facts: RevisionFacts;
}

/** A revision with what became of it, and what the rules ask of both. */
export function historyOf(revisions: RevisionRepository, row: RevisionRow, presentEngine: string): RevisionWithHistory {
  const byRevision = revisions.eventsOfNetwork(row.networkId);
  const others = revisions.list(row.networkId).filter(({ id }) => id !== row.id);
  const events = byRevision.get(row.id) ?? [];
  const ended = events.find(({ state }) => ENDS_REVIEW.has(state))?.at;
  const base = lastApprovedVersion(others, byRevision, row.networkVersion, ended);
  const editedBy = revisions.editors(row.networkId, base, row.networkVersion);
  const place = placeOf(row);
  const later = others.filter((other) => placeOf(other) > place && stateOf(byRevision.get(other.id)) === 'approved');
  return {
    row,
    events,
    editedBy,
    facts: {
      letter: row.letter,
      state: stateOf(events),
      frozenBy: row.createdBy,
      submittedBy: events.find(({ state }) => state === 'underReview')?.personId,
      editedBy: editedBy.map(({ personId }) => personId),
      laterApproved: later.at(-1)?.letter,
      engine: { frozen: row.engineVersion, present: presentEngine },
    },
  };
}

/** The state is that of the last event; the first one is written with the revision. */
export function stateOf(events: readonly EventRecord[] | undefined): RevisionState {
  const state = events?.at(-1)?.state;
  if (state === undefined) throw new Error('a revision without an event');
  return state;
}

const ENDS_REVIEW: ReadonlySet<RevisionState> = new Set(['returned', 'approved', 'withdrawn']);
/** A superseded one was approved, and what it holds was judged. */
const WAS_JUDGED: ReadonlySet<RevisionState> = new Set(['approved', 'superseded']);

/**
 * The version of the last revision that is approved, at this version or before it; 0 when none is. Of a revision whose review has ended
 * as it was then, so that what happened afterwards changes nobody's part in it.
 */
function lastApprovedVersion(
  others: readonly RevisionRow[],
  byRevision: ReadonlyMap<string, readonly EventRecord[]>,
  upTo: number,
  ended: string | undefined,
): number {
  const versions = others
    .filter(({ id, networkVersion }) => {
      const events = (byRevision.get(id) ?? []).filter(({ at }) => ended === undefined || at <= ended);
      const state = events.at(-1)?.state;
      return networkVersion <= upTo && state !== undefined && WAS_JUDGED.has(state);
    })
    .map(({ networkVersion }) => networkVersion);
  return Math.max(0, ...versions);
}

function placeOf({ letter }: RevisionRow): number {
  return placeOfLetter(letter) ?? 0;
}
