import { Problem, type CaseOutcome } from '@riseback/contracts';
import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm';
import * as z from 'zod';
import type { Queries } from '../platform/db/database';
import { onFirstUse } from '../platform/db/on-first-use';
import { edits, rounds, solveResults, solves } from '../platform/db/schema';

/** How many traps of a case fail or need watching, by the worst check of each; absent counts mean a refused or unsolved case. */
export const CaseVerdicts = z.object({
  caseId: z.string(),
  counts: z.object({ traps: z.number().int(), fail: z.number().int(), watch: z.number().int() }).optional(),
});
export type CaseVerdicts = z.infer<typeof CaseVerdicts>;

export const SolveOverview = z.object({ solveMs: z.number(), cases: z.array(CaseVerdicts) });
export type SolveOverview = z.infer<typeof SolveOverview>;

/** What results are stored under: the same input solved by the same engine has the same results. */
export interface SolveInput {
  readonly networkId: string;
  readonly solverHash: string;
  readonly engineVersion: string;
}

export type StoredSolve =
  | {
      readonly state: 'finished';
      readonly id: string;
      readonly finishedAt: string;
      readonly solveMs: number;
      /** Reads the outcomes of the cases: the JSON text of a list of `CaseOutcome`, as it was stored. */
      readonly casesText: () => string;
    }
  | { readonly state: 'failed'; readonly finishedAt: string; readonly problem: Problem };

export interface EndedSolve extends SolveInput {
  readonly id: string;
  readonly startedAt: string;
  readonly finishedAt: string;
}

/** So many solves of a network are kept that undo and redo find theirs at once; older ones can be computed again. */
export const KEPT_SOLVES = 20;

export class SolveRepository {
  private readonly rowQuery;

  constructor(private readonly db: Queries) {
    this.rowQuery = onFirstUse(() => prepareRow(db));
  }

  find(input: SolveInput): StoredSolve | undefined {
    const row = this.row(input);
    if (row === undefined) return undefined;
    const { finishedAt } = row;
    if (row.state === 'failed') return { state: 'failed', finishedAt, problem: Problem.parse(row.problem) };
    const { id } = row;
    const { solveMs } = SolveOverview.parse(row.summary);
    return { state: 'finished', id, finishedAt, solveMs, casesText: () => this.casesText(id) };
  }

  /** The state and the verdicts alone, without the results. */
  overview(input: SolveInput): SolveOverview | 'failed' | undefined {
    const row = this.row(input);
    if (row === undefined) return undefined;
    return row.state === 'failed' ? 'failed' : SolveOverview.parse(row.summary);
  }

  storeFinished(solve: EndedSolve, overview: SolveOverview, outcomes: readonly CaseOutcome[]): void {
    this.db.transaction((tx) => {
      const solves = new SolveRepository(tx);
      solves.replace({ ...solve, state: 'finished', problem: null, summary: overview });
      for (const [ordinal, outcome] of outcomes.entries()) {
        const converged = outcome.status === 'solved' && outcome.result.converged;
        tx.insert(solveResults)
          .values({ solveId: solve.id, caseId: outcome.caseId, ordinal, converged, result: outcome })
          .run();
      }
      solves.prune(solve);
    });
  }

  storeFailed(solve: EndedSolve, problem: Problem): void {
    this.db.transaction((tx) => {
      const solves = new SolveRepository(tx);
      solves.replace({ ...solve, state: 'failed', problem, summary: null });
      solves.prune(solve);
    });
  }

  private row(input: SolveInput) {
    const { networkId, solverHash, engineVersion } = input;
    return this.rowQuery().get({ networkId, solverHash, engineVersion });
  }

  private casesText(solveId: string): string {
    const texts = this.db
      .select({ text: sql<string>`${solveResults.result}` })
      .from(solveResults)
      .where(eq(solveResults.solveId, solveId))
      .orderBy(asc(solveResults.ordinal))
      .all()
      .map(({ text }) => text);
    return `[${texts.join(',')}]`;
  }

  private replace(row: typeof solves.$inferInsert): void {
    const earlier = this.row(row);
    if (earlier !== undefined) this.delete([earlier.id]);
    this.db.insert(solves).values(row).run();
  }

  /** What a round of readings was read against stays, by the engine that is in use. */
  private prune({ networkId, engineVersion }: Pick<SolveInput, 'networkId' | 'engineVersion'>): void {
    const read = this.db
      .select({ hash: edits.solverHash })
      .from(rounds)
      .innerJoin(edits, and(eq(edits.networkId, rounds.networkId), eq(edits.version, rounds.networkVersion)))
      .where(eq(rounds.networkId, networkId));
    const isRead = and(eq(solves.engineVersion, engineVersion), inArray(solves.solverHash, read));
    const old = this.db
      .select({ id: solves.id, isRead: sql<number>`${isRead}` })
      .from(solves)
      .where(eq(solves.networkId, networkId))
      .orderBy(desc(solves.finishedAt), desc(solves.id))
      .all()
      .slice(KEPT_SOLVES)
      .filter((solve) => solve.isRead === 0);
    if (old.length > 0) this.delete(old.map(({ id }) => id));
  }

  private delete(ids: readonly string[]): void {
    this.db.delete(solveResults).where(inArray(solveResults.solveId, ids)).run();
    this.db.delete(solves).where(inArray(solves.id, ids)).run();
  }
}

function prepareRow(db: Queries) {
  const isInput = and(
    eq(solves.networkId, sql.placeholder('networkId')),
    eq(solves.solverHash, sql.placeholder('solverHash')),
    eq(solves.engineVersion, sql.placeholder('engineVersion')),
  );
  return db.select().from(solves).where(isInput).prepare();
}
