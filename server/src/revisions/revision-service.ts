import { createHash } from 'node:crypto';
import type {
  AllowedDeeds,
  NewRevision,
  Revision,
  RevisionDeed,
  RevisionSummary,
  Signature,
} from '@riseback/contracts';
import { NetworkFileShape, type NetworkFile } from '@riseback/network';
import { deedsOf, nextLetter, type Allowance, type Doer, type RevisionFacts } from '@riseback/revisions';
import type { NetworkService } from '../networks/network-service';
import type { NetworkAccess } from '../platform/auth/access';
import type { Queries } from '../platform/db/database';
import type { ReadyJson } from '../platform/http/ready-json';
import { conflict, forbidden, notFound, unprocessable } from '../platform/problem';
import type { LiveSolves } from '../solve/live-solves';
import { frozenContent, outcomesText, readOutcomes } from './frozen-revision';
import { summaryOf, type OutcomeSummary } from './outcome-summary';
import { parsedJson } from './parsed-json';
import { historyOf, stateOf, type RevisionWithHistory } from './revision-history';
import { authorsOf, type RevisionMails } from './revision-mails';
import { recordFreeze, recordMove, type DoneBy } from './revision-moves';
import type { RevisionRepository, RevisionRow } from './revision-repository';
import { readStatement } from './statement-reading';

/** Told of every change of a network's revisions, for those who have it open. */
export interface RevisionListener {
  revisionsChanged(networkId: string, revisionId: string): void;
}

export type RevisionNetworks = Pick<NetworkService, 'headOf' | 'atVersion'>;

export interface RevisionServiceOptions {
  readonly engineVersion: string;
  readonly newId: () => string;
  readonly now: () => Date;
  /** How long a freeze waits for the solve of its version. */
  readonly waitMs?: number;
}

/** A revision as comments know it. */
export interface CommentedRevision {
  readonly letter: string;
  readonly title: string;
  readonly file: NetworkFile;
  /** Who froze it and who submitted it. */
  readonly authors: readonly string[];
}

const WAIT_MS = 5_000;
/** Each is a few numbers; what they tell of never changes. */
const MOST_SUMMARIES = 2_000;

/** Frozen copies of a network and what becomes of them. */
export class RevisionService {
  private readonly summaries = new Map<string, OutcomeSummary>();

  constructor(
    private readonly revisions: RevisionRepository,
    private readonly networks: RevisionNetworks,
    private readonly live: Pick<LiveSolves, 'results'>,
    private readonly mails: RevisionMails,
    private readonly listener: RevisionListener,
    private readonly options: RevisionServiceOptions,
  ) {}

  /** The newest first. */
  list({ networkId }: NetworkAccess): RevisionSummary[] {
    const events = this.revisions.eventsOfNetwork(networkId);
    const openComments = this.revisions.openComments(networkId);
    return this.revisions
      .list(networkId)
      .map((row) => this.summary(row, events.get(row.id), openComments.get(row.id) ?? 0))
      .reverse();
  }

  /** @throws ProblemError 404 */
  get(access: NetworkAccess, id: string): Revision {
    const revision = this.find(this.revisions, access, id);
    const { row, events, editedBy, facts } = revision;
    const open = this.revisions.openComments(row.networkId).get(id) ?? 0;
    return {
      ...this.summary(row, events, open),
      networkId: row.networkId,
      file: this.file(row),
      events: [...events],
      signatures: this.revisions.signatures(id).flatMap(signatureOf),
      editedBy: [...editedBy],
      deeds: allowedDeeds(facts, doerOf(access)),
    };
  }

  /** The frozen results, as the results of a version are answered. @throws ProblemError 404 */
  results(access: NetworkAccess, id: string): ReadyJson {
    const { row } = this.find(this.revisions, access, id);
    const head = {
      state: 'finished',
      version: row.networkVersion,
      solverHash: row.solverHash,
      engineVersion: row.engineVersion,
      finishedAt: row.createdAt,
      solveMs: 0,
    };
    const cases = outcomesText(this.revisions.outcomes(id));
    const json = Buffer.from(`${JSON.stringify(head).slice(0, -1)},"cases":${cases}}`);
    return { json, etag: `"${createHash('sha256').update(json).digest('base64url')}"` };
  }

  /**
   * Freezes the network as it stood at a version, with the results of all its cases.
   * @throws ProblemError 409 the network has no such version, or its solve is not finished; 422 the version is too long ago
   */
  async freeze(access: NetworkAccess, { title, reason, networkVersion }: NewRevision): Promise<Revision> {
    const newest = this.networks.headOf(access).version;
    if (networkVersion > newest) {
      throw conflict(`The network has no version ${networkVersion} yet; its newest is ${newest}.`);
    }
    const input = this.networks.atVersion(access, networkVersion);
    const solved = await this.solveOf(input);
    if (solved?.state === 'failed') {
      throw conflict(
        `Version ${networkVersion} could not be solved, and a revision holds results: ${solved.problem.detail ?? solved.problem.title}`,
      );
    }
    if (solved?.state !== 'finished') {
      throw conflict(
        `Version ${networkVersion} is still being solved, and a revision holds the results of exactly its inputs. Try again in a moment.`,
      );
    }
    const { file, fileHash, outcomes, resultsHash } = frozenContent(input.document, solved.casesText());
    const { engineVersion, newId } = this.options;
    const { networkId } = access;
    const by = this.by(access);
    const id = newId();
    this.revisions.transaction((revisions) => {
      const letter = nextLetter(revisions.lastLetter(networkId));
      const { solverHash } = input;
      const hashes = { fileHash, solverHash, resultsHash };
      const made = { createdBy: by.personId, createdAt: by.at.toISOString() };
      const row = { id, networkId, letter, title, reason, networkVersion, file, engineVersion, ...hashes, ...made };
      recordFreeze(revisions, row, outcomes, by);
    });
    this.listener.revisionsChanged(networkId, id);
    return this.get(access, id);
  }

  /** Twice: the bands of a version that a newer one has overtaken are not computed until somebody asks for them once more. */
  private async solveOf(input: ReturnType<RevisionNetworks['atVersion']>): ReturnType<LiveSolves['results']> {
    const waitMs = (this.options.waitMs ?? WAIT_MS) / 2;
    const first = await this.live.results(input, 'whole', waitMs);
    return first ?? this.live.results(input, 'whole', waitMs);
  }

  /** @throws ProblemError 404; 403, 409 in the words of the deed that is not allowed */
  submit(access: NetworkAccess, id: string, note: string): Revision {
    return this.move(access, id, 'submit', note, (tx, revisions, revision) =>
      this.mails.submitted(tx, revisions, access, revision, note),
    );
  }

  /** @throws ProblemError as `submit` */
  return(access: NetworkAccess, id: string, note: string): Revision {
    return this.move(access, id, 'return', note, (tx, revisions, revision) =>
      this.mails.judged(tx, revisions, access, revision, { purpose: 'returned', note }),
    );
  }

  /** @throws ProblemError as `submit` */
  withdraw(access: NetworkAccess, id: string, note: string): Revision {
    return this.move(access, id, 'withdraw', note, () => undefined);
  }

  /** @throws ProblemError 404 also for a revision of another network */
  find(revisions: RevisionRepository, access: NetworkAccess, id: string): RevisionWithHistory {
    const row = revisions.find(id);
    if (row?.networkId !== access.networkId) throw notFound('The network has no such revision.');
    return historyOf(revisions, row, this.options.engineVersion);
  }

  /** What a comment on a revision is held against, and whose work it is. @throws ProblemError 404 */
  commented(access: NetworkAccess, id: string): CommentedRevision {
    const revision = this.find(this.revisions, access, id);
    const { letter, title } = revision.row;
    return { letter, title, file: this.file(revision.row), authors: authorsOf(revision) };
  }

  /** The frozen file, its cases in their order. @throws ProblemError 422 when it was changed since and cannot be read */
  file(row: RevisionRow): NetworkFile {
    const read = NetworkFileShape.safeParse(parsedJson(this.revisions.fileText(row.id) ?? ''));
    if (!read.success) {
      throw unprocessable(`The frozen inputs of revision ${row.letter} cannot be read: verify the revision.`);
    }
    const order = new Map(this.revisions.outcomes(row.id).map(({ caseId, ordinal }) => [caseId, ordinal]));
    const placeOf = ({ id }: { readonly id: string }) => order.get(id) ?? 0;
    return { ...read.data, cases: read.data.cases.toSorted((a, b) => placeOf(a) - placeOf(b)) };
  }

  /** Undefined when the frozen results were changed since and cannot be read. */
  outcomeSummary(id: string): OutcomeSummary | undefined {
    const known = this.summaries.get(id);
    if (known !== undefined) return known;
    const [oldest] = this.summaries.size >= MOST_SUMMARIES ? this.summaries.keys() : [];
    if (oldest !== undefined) this.summaries.delete(oldest);
    try {
      const summary = summaryOf(readOutcomes(outcomesText(this.revisions.outcomes(id))));
      this.summaries.set(id, summary);
      return summary;
    } catch {
      return undefined;
    }
  }

  private move(
    access: NetworkAccess,
    id: string,
    deed: Exclude<RevisionDeed, 'sign'>,
    note: string,
    tell: (tx: Queries, revisions: RevisionRepository, moved: RevisionWithHistory) => void,
  ): Revision {
    this.revisions.transaction((revisions, tx) => {
      const revision = this.find(revisions, access, id);
      demandDeed(revision, access, deed);
      recordMove(revisions, revision, deed, note, this.by(access));
      tell(tx, revisions, this.find(revisions, access, id));
    });
    this.listener.revisionsChanged(access.networkId, id);
    return this.get(access, id);
  }

  private summary(
    { createdBy, createdByName, ...row }: RevisionRow,
    events: RevisionWithHistory['events'] | undefined,
    openComments: number,
  ): RevisionSummary {
    const { networkId: _, ...record } = row;
    const verdicts = this.outcomeSummary(row.id)?.verdicts;
    return {
      ...record,
      name: `${row.letter}: ${row.title}`,
      state: stateOf(events),
      createdBy,
      createdByName,
      changedAt: events?.at(-1)?.at ?? row.createdAt,
      openComments,
      ...(verdicts === undefined ? {} : { verdicts }),
    };
  }

  private by({ person, siteId }: NetworkAccess): DoneBy {
    return { personId: person.id, sessionId: person.sessionId, siteId, at: this.options.now() };
  }
}

/** @throws ProblemError 403, 409 in the words of what is not allowed */
export function demandDeed({ facts }: RevisionWithHistory, access: NetworkAccess, deed: RevisionDeed): void {
  const allowance = deedsOf(facts, doerOf(access))[deed];
  if (allowance.allowed) return;
  throw allowance.because === 'person' ? forbidden(allowance.why) : conflict(allowance.why);
}

/** As they cross the wire: why not, in words alone. */
function allowedDeeds(facts: RevisionFacts, doer: Doer): AllowedDeeds {
  const { submit, return: giveBack, withdraw, sign } = deedsOf(facts, doer);
  const told = (allowance: Allowance) =>
    allowance.allowed ? { allowed: true as const } : { allowed: false as const, why: allowance.why };
  return { submit: told(submit), return: told(giveBack), withdraw: told(withdraw), sign: told(sign) };
}

function doerOf(access: NetworkAccess): Doer {
  return { personId: access.person.id, mayDraw: access.may('draw'), maySign: access.may('sign') };
}

/** Time and role stand in what was signed; a statement that was changed since and cannot be read is left out, and verification names it. */
function signatureOf(row: ReturnType<RevisionRepository['signatures']>[number]): Signature[] {
  const { revisionId: _, ...signature } = row;
  const statement = readStatement(signature.statement);
  if (statement === undefined) return [];
  return [{ ...signature, at: statement.at, role: statement.person.role }];
}
