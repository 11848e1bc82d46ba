import type { SolveResult } from '@riseback/contracts';
import type { PredictedResult } from '@riseback/diagnosis';

/** The contract's result is the solver's, but that an absent key may also be undefined there. */
export function predictedResult(result: SolveResult): PredictedResult {
  return result as PredictedResult;
}
