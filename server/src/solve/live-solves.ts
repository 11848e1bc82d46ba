import type { CaseOutcome, Problem, SolveSummary } from '@riseback/contracts';
import { toFile, type NetworkDocument } from '@riseback/network';
import { bandsInTime, caseIdsOf, withoutBands } from './solve-cases';
import type { SolveJob, SolvePort } from './solve-port';
import type {
  CaseVerdicts,
  EndedSolve,
  SolveInput,
  SolveOverview,
  SolveRepository,
  StoredSolve,
} from './solve-repository';

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

/** What is there before the bands are: each trap's pressures and checks by the chosen method alone. Kept in memory, never stored. */
export interface Pressures {
  readonly state: 'bandsToCome';
  readonly startedAt: string;
  readonly finishedAt: string;
  readonly solveMs: number;
  readonly outcomes: readonly CaseOutcome[];
}

interface UnderWay {
  /** Undefined: there will be none, or what there is lies stored. */
  readonly pressures: Promise<Pressures | undefined>;
  /** Never rejects: what goes wrong is reported. */
  readonly whole: Promise<void>;
  /** Somebody waits for the whole: its bands are begun at once. */
  readonly hurry: () => void;
}

/**
 * The bands are begun so long after the pressures are there, unless somebody asks for them: on a machine with two cores they would take
 * one from the browser that is just painting the pressures, and from the solve of the next edit.
 */
const BANDS_AFTER_MS = 150;

/**
 * Keeps every network solved: an accepted edit starts a solve, whose results are stored under the hash of what was
 * solved. Results of a hash that was solved before are found at once, and a moved symbol starts nothing. Pressures come
 * first, then the whole with its bands; only the whole is stored.
 */
export class LiveSolves {
  /** Solves under way, by network and hash. */
  private readonly underWay = new Map<string, UnderWay>();
  /** By key: the place of what was begun last under it. */
  private readonly newest = new Map<string, string>();

  constructor(
    private readonly solves: SolveRepository,
    private readonly port: SolvePort,
    private readonly options: LiveSolvesOptions,
  ) {}

  /** Starts a solve where none is stored; one that failed is tried again. The newest version of a network wins. */
  changed(input: VersionedInput): void {
    try {
      this.startUnlessStored(input);
    } catch (error) {
      // the edit is stored already: whatever goes wrong here must not make its answer look like a refusal
      this.options.report(error);
    }
  }

  /**
   * What there is for this input, waiting so long for it. Undefined: it is not there yet.
   * @param awaited `pressures` is content with those while the bands are to come; `whole` is what will be stored
   */
  async results(
    input: VersionedInput,
    awaited: 'pressures' | 'whole',
    waitMs: number,
  ): Promise<StoredSolve | Pressures | undefined> {
    let timer: NodeJS.Timeout | undefined;
    const giveUp = new Promise<'late'>((resolve) => {
      timer = setTimeout(() => resolve('late'), waitMs);
    });
    try {
      // twice: a solve that a newer version superseded is started again, under a key of its own, because someone asks for it
      for (let attempt = 1; attempt <= 2; attempt += 1) {
        const stored = this.solves.find(this.keyOf(input));
        // one that failed is being tried again
        const tried = stored?.state === 'failed' && this.underWay.has(placeOf(input));
        if (stored !== undefined && !tried) return stored;
        const { pressures, whole, hurry } = this.start(placeOf(input), input);
        const first = await Promise.race([pressures, giveUp]);
        if (first === 'late') break;
        if (first === undefined) continue;
        if (awaited === 'pressures') return first;
        hurry();
        // not started again when its bands are superseded: whoever waited so long has most likely gone on to the newer version
        await Promise.race([whole, giveUp]);
        break;
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

  private startUnlessStored(input: VersionedInput): void {
    const overview = this.solves.overview(this.keyOf(input));
    if (overview === undefined || overview === 'failed') this.start(input.networkId, input);
    else this.options.ended(input.networkId, input.solverHash, 'finished');
  }

  private start(key: string, input: VersionedInput): UnderWay {
    const place = placeOf(input);
    const present = this.underWay.get(place);
    if (present !== undefined) return present;
    const file = toFile(input.document);
    const job = { file, caseIds: caseIdsOf(file), partial: true };
    this.newest.set(key, place);
    const pause = new Pause();
    const pressures = this.solvePressures(key, input, job);
    const whole = pressures
      .then(async (first) => {
        if (first === undefined) return;
        await pause.end(BANDS_AFTER_MS);
        // its own bands would call off those of the newer version
        if (this.newest.get(key) === place) await this.solveBands(key, input, job, first);
      })
      .catch(this.options.report)
      .finally(() => {
        this.underWay.delete(place);
        if (this.newest.get(key) === place) this.newest.delete(key);
      });
    const solve = { pressures, whole, hurry: () => pause.cutShort() };
    this.underWay.set(place, solve);
    return solve;
  }

  private async solvePressures(
    key: string,
    input: VersionedInput,
    job: Omit<SolveJob, 'bands'>,
  ): Promise<Pressures | undefined> {
    const startedAt = this.time();
    const ended = await this.port.solve(key, { ...job, bands: false });
    if (ended.end === 'superseded') return undefined;
    if (ended.end === 'failed') {
      this.solves.storeFailed(this.ended(input, startedAt), solveFailed(ended.detail));
      this.options.ended(input.networkId, input.solverHash, 'failed');
      return undefined;
    }
    const { outcomes, solveMs } = ended;
    const first: Pressures = { state: 'bandsToCome', startedAt, finishedAt: this.time(), solveMs, outcomes };
    if (bandsInTime(job)) return first;
    this.store(input, first, withoutBands(outcomes));
    return undefined;
  }

  private async solveBands(
    key: string,
    input: VersionedInput,
    job: Omit<SolveJob, 'bands'>,
    first: Pressures,
  ): Promise<void> {
    const ended = await this.port.solve(key, { ...job, bands: true });
    if (ended.end === 'superseded') return;
    // pressures are not lost with the bands
    this.store(input, first, ended.end === 'failed' ? withoutBands(first.outcomes) : ended.outcomes);
  }

  private store(input: VersionedInput, { startedAt, solveMs }: Pressures, outcomes: readonly CaseOutcome[]): void {
    this.solves.storeFinished(this.ended(input, startedAt), solvedOverview(outcomes, solveMs), outcomes);
    this.options.ended(input.networkId, input.solverHash, 'finished');
  }

  private ended(input: VersionedInput, startedAt: string): EndedSolve {
    return { ...this.keyOf(input), id: this.options.newId(), startedAt, finishedAt: this.time() };
  }

  private time(): string {
    return this.options.now().toISOString();
  }

  private keyOf({ networkId, solverHash }: Omit<VersionedInput, 'document'>): SolveInput {
    return { networkId, solverHash, engineVersion: this.options.engineVersion };
  }
}

function placeOf({ networkId, solverHash }: VersionedInput): string {
  return `${networkId} ${solverHash}`;
}

/** A wait that may be cut short, also before it has begun. */
class Pause {
  private cut: () => void = () => undefined;
  private readonly over = new Promise<void>((resolve) => (this.cut = resolve));

  cutShort(): void {
    this.cut();
  }

  end(afterMs: number): Promise<void> {
    // a server that stops does not wait for it
    setTimeout(this.cut, afterMs).unref();
    return this.over;
  }
}

/** What a solve that did not come to its end says, in results and to those who asked for it. */
export function solveFailed(detail: string): Problem {
  return { type: '/problems/solve-failed', title: 'The solve did not come to its end', status: 503, detail };
}

/** What is kept at hand of a solve. */
export function solvedOverview(outcomes: readonly CaseOutcome[], solveMs: number): SolveOverview {
  return { solveMs, cases: outcomes.map(verdictsOf) };
}

function verdictsOf(outcome: CaseOutcome): CaseVerdicts {
  const { caseId } = outcome;
  if (outcome.status === 'refused' || !outcome.result.converged) return { caseId };
  const worst = outcome.result.traps.map(({ checks }) => new Set(checks.map(({ verdict }) => verdict)));
  const fail = worst.filter((verdicts) => verdicts.has('fail')).length;
  const watch = worst.filter((verdicts) => !verdicts.has('fail') && verdicts.has('watch')).length;
  return { caseId, counts: { traps: worst.length, fail, watch } };
}
