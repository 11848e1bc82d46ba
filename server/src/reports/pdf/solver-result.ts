import type { SolveResult } from '@riseback/contracts';
import type { SolveResult as SolverResult } from '@riseback/solver';

/** A result that crossed as JSON, as the solver's own functions take it: a key that JSON does not have is absent, never undefined. */
export function solverResult(result: SolveResult): SolverResult {
  return result as unknown as SolverResult;
}
