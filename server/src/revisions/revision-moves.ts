import { eventText, recordText, REVISION_MOVES, type EventRecord, type RevisionMove } from '@riseback/revisions';
import type { AuditEntry } from '../platform/db/audit';
import { sha256 } from './hashes';
import type { NewRevisionRow, RevisionRepository, RevisionRow, StoredOutcome } from './revision-repository';

/** Who does something, and when. Without a session in the demo, which nobody signs in for. */
export interface DoneBy {
  readonly personId: string;
  readonly sessionId?: string;
  readonly siteId: string;
  readonly at: Date;
}

/** Stores a new revision with its first event, a draft. */
export function recordFreeze(
  revisions: RevisionRepository,
  revision: NewRevisionRow,
  outcomes: readonly StoredOutcome[],
  by: DoneBy,
): void {
  revisions.insert(revision, outcomes);
  const event = { seq: 1, state: 'draft', personId: by.personId, at: by.at.toISOString(), note: '' } as const;
  revisions.insertEvent(revision.id, event);
  const { letter, title, networkVersion } = revision;
  const details = { letter, title, networkVersion, recordHash: sha256(recordText(revision)), ...eventDetails(event) };
  revisions.audit(entryOf(by, 'revision.freeze', revision.id, details));
}

/** Stores what becomes of a revision; that it may is the caller's to ask first. */
export function recordMove(
  revisions: RevisionRepository,
  { row, events }: { readonly row: RevisionRow; readonly events: readonly EventRecord[] },
  move: RevisionMove,
  note: string,
  by: DoneBy,
): void {
  const { to } = REVISION_MOVES[move];
  const seq = (events.at(-1)?.seq ?? 0) + 1;
  const event = { seq, state: to, personId: by.personId, at: by.at.toISOString(), note };
  revisions.insertEvent(row.id, event);
  const details = { letter: row.letter, ...eventDetails(event) };
  revisions.audit(entryOf(by, `revision.${move}`, row.id, details));
}

/** What the log says of an event: so much that one changed, taken away or slipped in later shows. */
export function eventDetails(event: EventRecord): { readonly eventSeq: number; readonly eventHash: string } {
  return { eventSeq: event.seq, eventHash: sha256(eventText(event)) };
}

export function entryOf(
  { personId, sessionId, siteId, at }: DoneBy,
  action: string,
  subject: string,
  details: Readonly<Record<string, unknown>>,
): AuditEntry {
  return { at, personId, ...(sessionId === undefined ? {} : { sessionId }), siteId, action, subject, details };
}
