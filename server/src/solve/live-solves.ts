import type { CaseOutcome, Problem, SolveSummary } from '@riseback/contracts';
import { toFile, type NetworkDocument } from '@riseback/network';
import { caseIdsOf } from './solve-cases';
import type { SolvePort } from './solve-port';
import type { CaseVerdicts, SolveInput, SolveRepository, StoredSolve } from './solve-repository';

/** A network as it stood after one of its versions. */
export interface VersionedInput {
  readonly networkId: string;
  readonly solverHash: string;
  readonly document: NetworkDocument;
}

export interface LiveSolvesOptions {
  readonly engineVersion: string;
  readonly newId: () => string;
  readonly now: () => Date;
  /** Told of every solve that has ended, also of one that was stored before. */
  readonly ended: (networkId: string, solverHash: string, state: 'finished' | 'failed') => void;
  /** Told of what nobody waits for and yet went wrong. */
  readonly report: (error: unknown) => void;
}

/**
 * Keeps every network solved: an accepted edit starts a solve, whose results are stored under the hash of what was
 * solved. Results of a hash that was solved before are found at once, and a moved symbol starts nothing.
 */
export class LiveSolves {
  /** Solves under way, by network and hash. */
  private readonly underWay = new Map<string, Promise<void>>();

  constructor(
    private readonly solves: SolveRepository,
    private readonly port: SolvePort,
    private readonly options: LiveSolvesOptions,
  ) {}

  /** Starts a solve where none is stored; one that failed is tried again. The newest version of a network wins. */
  changed(input: VersionedInput): void {
    // the edit is stored already: whatever goes wrong here must not make its answer look like a refusal
    this.startUnlessStored(input).catch(this.options.report);
  }

  /** What is stored for this input, waiting so long for a solve to end. Undefined: it has not ended yet. */
  async results(input: VersionedInput, waitMs: number): Promise<StoredSolve | undefined> {
    let timer: NodeJS.Timeout | undefined;
    const giveUp = new Promise<'late'>((resolve) => {
      timer = setTimeout(() => resolve('late'), waitMs);
    });
    try {
      // twice: a solve that a newer version superseded is started again, under a key of its own, because someone asks for it
      for (let attempt = 1, late = false; attempt <= 2 && !late; attempt += 1) {
        const stored = this.solves.find(this.keyOf(input));
        if (stored !== undefined) return stored;
        late = (await Promise.race([this.start(`${input.networkId} ${input.solverHash}`, input), giveUp])) === 'late';
      }
      return this.solves.find(this.keyOf(input));
    } finally {
      clearTimeout(timer);
    }
  }

  /** The verdicts of one case of what is stored. */
  summary(networkId: string, solverHash: string, caseId: string): SolveSummary {
    const overview = this.solves.overview(this.keyOf({ networkId, solverHash }));
    if (overview === undefined) return { state: 'stale' };
    if (overview === 'failed') return { state: 'failed' };
    const counts = overview.cases.find((verdicts) => verdicts.caseId === caseId)?.counts;
    return counts === undefined ? { state: 'failed' } : { state: 'solved', ...counts };
  }

  /** How far the solve of this input is. */
  state(networkId: string, solverHash: string): 'waiting' | 'finished' | 'failed' {
    const overview = this.solves.overview(this.keyOf({ networkId, solverHash }));
    if (overview === undefined) return 'waiting';
    return overview === 'failed' ? 'failed' : 'finished';
  }

  private async startUnlessStored(input: VersionedInput): Promise<void> {
    const overview = this.solves.overview(this.keyOf(input));
    if (overview === undefined || overview === 'failed') await this.start(input.networkId, input);
    else this.options.ended(input.networkId, input.solverHash, 'finished');
  }

  private start(key: string, input: VersionedInput): Promise<void> {
    const place = `${input.networkId} ${input.solverHash}`;
    const present = this.underWay.get(place);
    if (present !== undefined) return present;
    const solve = this.solveAndStore(key, input).finally(() => this.underWay.delete(place));
    this.underWay.set(place, solve);
    return solve;
  }

  private async solveAndStore(key: string, input: VersionedInput): Promise<void> {
    const { newId, now } = this.options;
    const file = toFile(input.document);
    const startedAt = now().toISOString();
    const ended = await this.port.solve(key, { file, caseIds: caseIdsOf(file), partial: true });
    if (ended.end === 'superseded') return;
    const solve = { ...this.keyOf(input), id: newId(), startedAt, finishedAt: now().toISOString() };
    if (ended.end === 'failed') {
      this.solves.storeFailed(solve, solveFailed(ended.detail));
    } else {
      const overview = { solveMs: ended.solveMs, cases: ended.outcomes.map(verdictsOf) };
      this.solves.storeFinished(solve, overview, ended.outcomes);
    }
    this.options.ended(input.networkId, input.solverHash, ended.end);
  }

  private keyOf({ networkId, solverHash }: Omit<VersionedInput, 'document'>): SolveInput {
    return { networkId, solverHash, engineVersion: this.options.engineVersion };
  }
}

/** What a solve that did not come to its end says, in results and to those who asked for it. */
export function solveFailed(detail: string): Problem {
  return { type: '/problems/solve-failed', title: 'The solve did not come to its end', status: 503, detail };
}

function verdictsOf(outcome: CaseOutcome): CaseVerdicts {
  const { caseId } = outcome;
  if (outcome.status === 'refused' || !outcome.result.converged) return { caseId };
  const worst = outcome.result.traps.map(({ checks }) => new Set(checks.map(({ verdict }) => verdict)));
  const fail = worst.filter((verdicts) => verdicts.has('fail')).length;
  const watch = worst.filter((verdicts) => !verdicts.has('fail') && verdicts.has('watch')).length;
  return { caseId, counts: { traps: worst.length, fail, watch } };
}
