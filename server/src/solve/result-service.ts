import type { NetworkResults } from '@riseback/contracts';
import type { NetworkAccess, PersonAccess } from '../platform/auth/access';
import type { ReadyJson } from '../platform/http/ready-json';
import { ProblemError, tooManyRequests } from '../platform/problem';
import { solveFailed, type LiveSolves, type VersionedInput } from './live-solves';
import { ResultTexts } from './result-texts';
import type { FileSolver } from './solve-port';

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
const MOST_OF_A_PERSON = 4;

export class ResultService {
  private readonly texts = new ResultTexts();
  /** Files being solved, by person. */
  private readonly underWay = new Map<string, number>();

  constructor(
    private readonly networks: VersionedNetworks,
    private readonly live: LiveSolves,
    private readonly solver: FileSolver,
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
   * @returns the JSON text of a `SolveResult`
   * @throws ProblemError 400 for all that can be seen in the file without computing; 429 for too many at once; 503 when the solve was
   *   stopped
   */
  async solveText({ person }: PersonAccess, fileText: Uint8Array, caseId: string | undefined): Promise<Uint8Array> {
    const ended = await this.inTurn(person.id, () => this.solver.solveText(this.options.newId(), { fileText, caseId }));
    if (ended.end === 'failed') throw new ProblemError(solveFailed(ended.detail));
    if (ended.end === 'superseded')
      throw new ProblemError(solveFailed('The server is shutting down. Try again in a moment.'));
    if ('refused' in ended.answer) throw new ProblemError(ended.answer.refused);
    return ended.answer.json;
  }

  /** A queue that one person fills would be everybody's wait. */
  private async inTurn<T>(personId: string, solve: () => Promise<T>): Promise<T> {
    const under = this.underWay.get(personId) ?? 0;
    if (under >= MOST_OF_A_PERSON) {
      throw tooManyRequests(`${String(under)} files of yours are being solved; wait for one of them.`, 1);
    }
    this.underWay.set(personId, under + 1);
    try {
      return await solve();
    } finally {
      const left = (this.underWay.get(personId) ?? 1) - 1;
      if (left === 0) this.underWay.delete(personId);
      else this.underWay.set(personId, left);
    }
  }
}
