import type { CaseOutcome, Person, ReportRequest, RevisionEvent, RevisionState, Signature } from '@riseback/contracts';
import type { NetworkFile } from '@riseback/network';

/** The plain data that a report is made of, in whatever format: all of it is known before the first line is set. */
export interface ReportContent {
  readonly siteName: string;
  readonly networkName: string;
  readonly paper: ReportRequest['paper'];
  /** For whom it is made: numbers in their units, times in their time zone. */
  readonly reader: Pick<Person, 'name' | 'units' | 'timeZone'>;
  readonly madeAt: string;
  readonly state: ReportedState;
  readonly file: NetworkFile;
  /** SHA-256 of the file's canonical text; bytes are told apart by it on every page. */
  readonly fileHash: string;
  readonly solverHash: string;
  readonly engineVersion: string;
  /** Every case in the file's order; the plain network under '' where it has none. */
  readonly outcomes: readonly CaseOutcome[];
  /** The revision frozen before this one; for the network as it stands, its newest. */
  readonly previous?: PreviousRevision;
  /** Ids of traps whose ledgers are wanted beside the governing one of each header. */
  readonly ledgersOf: readonly string[];
}

export type ReportedState = WorkingState | FrozenState;

/** The network as it stands: a draft, whoever looks at it. */
export interface WorkingState {
  readonly kind: 'working';
  readonly version: number;
  readonly changedAt: string;
  readonly changedByName: string;
}

export interface FrozenState {
  readonly kind: 'revision';
  readonly id: string;
  readonly letter: string;
  readonly title: string;
  readonly reason: string;
  readonly state: RevisionState;
  readonly version: number;
  readonly createdAt: string;
  readonly createdByName: string;
  readonly resultsHash: string;
  /** The first to the last: what became of it, and who did it. */
  readonly events: readonly RevisionEvent[];
  readonly signatures: readonly Signature[];
  /** Edits accepted after it was frozen. */
  readonly editsSince: number;
  /** What would solve it today; another than its own says that its results may be others by now. */
  readonly presentEngineVersion: string;
}

export interface PreviousRevision {
  readonly letter: string;
  readonly title: string;
  readonly state: RevisionState;
  readonly createdAt: string;
  readonly engineVersion: string;
  readonly file: NetworkFile;
  readonly outcomes: readonly CaseOutcome[];
}

/** Told how far a maker has come: a share from 0 to 1 and what it is doing, in a word or two. */
export type ReportProgress = (share: number, doing: string) => void;

/** What every format is: it takes the content, tells how far it has come and answers with the bytes of the file. */
export type ReportMaker = (content: ReportContent, progress: ReportProgress, signal: AbortSignal) => Promise<Buffer>;
