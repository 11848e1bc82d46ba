import { CaseOutcome, Problem } from '@riseback/contracts';
import { and, asc, desc, eq, inArray } from 'drizzle-orm';
import * as z from 'zod';
import type { Queries } from '../platform/db/database';
import { solveResults, solves } from '../platform/db/schema';

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
      readonly finishedAt: string;
      readonly solveMs: number;
      readonly outcomes: CaseOutcome[];
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
  constructor(private readonly db: Queries) {}

  find(input: SolveInput): StoredSolve | undefined {
    const row = this.row(input);
    if (row === undefined) return undefined;
    const { finishedAt } = row;
    if (row.state === 'failed') return { state: 'failed', finishedAt, problem: Problem.parse(row.problem) };
    const outcomes = this.db
      .select({ result: solveResults.result })
      .from(solveResults)
      .where(eq(solveResults.solveId, row.id))
      .orderBy(asc(solveResults.ordinal))
      .all()
      .map(({ result }) => CaseOutcome.parse(result));
    return { state: 'finished', finishedAt, solveMs: SolveOverview.parse(row.summary).solveMs, outcomes };
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
      solves.prune(solve.networkId);
    });
  }

  storeFailed(solve: EndedSolve, problem: Problem): void {
    this.db.transaction((tx) => {
      const solves = new SolveRepository(tx);
      solves.replace({ ...solve, state: 'failed', problem, summary: null });
      solves.prune(solve.networkId);
    });
  }

  private row(input: SolveInput) {
    return this.db.select().from(solves).where(isInput(input)).get();
  }

  private replace(row: typeof solves.$inferInsert): void {
    const earlier = this.row(row);
    if (earlier !== undefined) this.delete([earlier.id]);
    this.db.insert(solves).values(row).run();
  }

  private prune(networkId: string): void {
    const old = this.db
      .select({ id: solves.id })
      .from(solves)
      .where(eq(solves.networkId, networkId))
      .orderBy(desc(solves.finishedAt), desc(solves.id))
      .all()
      .slice(KEPT_SOLVES);
    if (old.length > 0) this.delete(old.map(({ id }) => id));
  }

  private delete(ids: readonly string[]): void {
    this.db.delete(solveResults).where(inArray(solveResults.solveId, ids)).run();
    this.db.delete(solves).where(inArray(solves.id, ids)).run();
  }
}

function isInput({ networkId, solverHash, engineVersion }: SolveInput) {
  return and(
    eq(solves.networkId, networkId),
    eq(solves.solverHash, solverHash),
    eq(solves.engineVersion, engineVersion),
  );
}
