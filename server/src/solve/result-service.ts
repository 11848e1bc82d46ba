import type { NetworkResults, SolveResult } from '@riseback/contracts';
import { readNetworkFile } from '@riseback/network';
import type { NetworkAccess, PersonAccess } from '../platform/auth/access';
import type { ReadyJson } from '../platform/http/ready-json';
import { badRequest, ProblemError } from '../platform/problem';
import { solveFailed, type LiveSolves, type VersionedInput } from './live-solves';
import { ResultTexts } from './result-texts';
import { bandsInTime, caseIdsOf, withoutBands } from './solve-cases';
import type { SolvePort } from './solve-port';

/** What the results need of the networks. */
export interface VersionedNetworks {
  /** @throws ProblemError 404 where the network never had this version */
  atVersion(access: NetworkAccess, version: number | undefined): VersionedInput & { readonly version: number };
}

export interface ResultServiceOptions {
  readonly engineVersion: string;
  readonly newId: () => string;
  /** How long a request for results waits for a solve to end. */
  readonly waitMs?: number;
}

const WAIT_MS = 5_000;

export class ResultService {
  private readonly texts = new ResultTexts();

  constructor(
    private readonly networks: VersionedNetworks,
    private readonly live: LiveSolves,
    private readonly port: SolvePort,
    private readonly options: ResultServiceOptions,
  ) {}

  /**
   * The results of a version (by default the newest) in all its cases; stored ones as text that lies ready.
   * @param awaited `pressures` is content with those while the bands are to come
   */
  async results(
    access: NetworkAccess,
    asked: number | undefined,
    awaited: 'pressures' | 'whole',
  ): Promise<NetworkResults | ReadyJson> {
    const input = this.networks.atVersion(access, asked);
    const { version, solverHash } = input;
    const stored = await this.live.results(input, awaited, this.options.waitMs ?? WAIT_MS);
    if (stored === undefined) return { state: 'waiting', version };
    if (stored.state === 'failed') return { state: 'failed', version, problem: stored.problem };
    const { finishedAt, solveMs } = stored;
    const { engineVersion } = this.options;
    const head = { state: 'finished', version, solverHash, engineVersion, finishedAt, solveMs } as const;
    if (stored.state === 'finished') return this.texts.of(head, stored);
    return { ...head, bandsToCome: true, cases: [...stored.outcomes] };
  }

  /**
   * Solves one case of a file that is not stored: the given one, else its first, else the plain network.
   * @throws ProblemError 400 for all that can be seen in the file without computing; 503 when the solve was stopped
   */
  async solveFile(_access: PersonAccess, json: unknown, caseId: string | undefined): Promise<SolveResult> {
    const read = readNetworkFile(json);
    if (!read.ok) throw badRequest('The network file has mistakes.', read.errors);
    const [first = ''] = caseIdsOf(read.file);
    const job = { file: read.file, caseIds: [caseId ?? first], partial: false };
    const bands = bandsInTime(job);
    const ended = await this.port.solve(this.options.newId(), { ...job, bands });
    if (ended.end === 'failed') throw new ProblemError(solveFailed(ended.detail));
    const outcomes = ended.end === 'finished' ? ended.outcomes : [];
    const [outcome] = bands ? outcomes : withoutBands(outcomes);
    if (outcome === undefined)
      throw new ProblemError(solveFailed('The server is shutting down. Try again in a moment.'));
    if (outcome.status === 'refused') throw new ProblemError({ ...outcome.problem, status: 400 });
    return outcome.result;
  }
}
