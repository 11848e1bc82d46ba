import { canonicalText } from '@riseback/network';
import type { RevisionState } from './revision-state';
import type { SignatureMeaning } from './signature-meaning';

/** What a revision is, but for its content, which its hashes stand for. */
export interface RevisionRecord {
  readonly id: string;
  readonly networkId: string;
  readonly letter: string;
  readonly title: string;
  readonly reason: string;
  readonly networkVersion: number;
  readonly fileHash: string;
  readonly solverHash: string;
  readonly resultsHash: string;
  readonly engineVersion: string;
  readonly createdBy: string;
  readonly createdAt: string;
}

/** One step of what became of a revision. */
export interface EventRecord {
  readonly seq: number;
  readonly state: RevisionState;
  readonly personId: string;
  readonly at: string;
  readonly note: string;
}

export interface Signer {
  readonly id: string;
  readonly name: string;
  readonly role: string;
}

/** What is signed. */
export interface SigningStatement {
  readonly format: 'riseback-signature';
  readonly version: 1;
  readonly revision: RevisionRecord;
  /** What had become of the revision up to then. */
  readonly events: readonly EventRecord[];
  readonly person: Signer;
  readonly at: string;
  readonly meaning: SignatureMeaning;
  /** As they were shown before signing. */
  readonly sentences: readonly string[];
  /** The log's last entry before this signature's own. */
  readonly audit: { readonly seq: number; readonly hash: string };
}

/** The RFC 8785 text of a statement: the bytes that are signed. */
export function statementText(parts: Omit<SigningStatement, 'format' | 'version'>): string {
  const { revision, events, person, at, meaning, sentences, audit } = parts;
  const statement: SigningStatement = {
    format: 'riseback-signature',
    version: 1,
    revision: recordOf(revision),
    events: events.map(eventOf),
    person: { id: person.id, name: person.name, role: person.role },
    at,
    meaning,
    sentences,
    audit: { seq: audit.seq, hash: audit.hash },
  };
  return canonicalText(statement);
}

/** The RFC 8785 text of what a revision is: its hash stands in the log from the moment it is frozen. */
export function recordText(revision: RevisionRecord): string {
  return canonicalText(recordOf(revision));
}

/** The RFC 8785 text of one event: its hash stands in the log. */
export function eventText(event: EventRecord): string {
  return canonicalText(eventOf(event));
}

/** These keys and no others, whatever else a row may carry. */
function recordOf(revision: RevisionRecord): RevisionRecord {
  const { id, networkId, letter, title, reason, networkVersion } = revision;
  const { fileHash, solverHash, resultsHash, engineVersion, createdBy, createdAt } = revision;
  return {
    id,
    networkId,
    letter,
    title,
    reason,
    networkVersion,
    fileHash,
    solverHash,
    resultsHash,
    engineVersion,
    createdBy,
    createdAt,
  };
}

function eventOf({ seq, state, personId, at, note }: EventRecord): EventRecord {
  return { seq, state, personId, at, note };
}
