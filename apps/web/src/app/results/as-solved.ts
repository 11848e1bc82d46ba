import type { SolveResult } from '@riseback/contracts';
import type { SolveResult as Solved } from '@riseback/solver';

/** The contract's result is the solver's, but that an absent key may also be undefined there. */
export function asSolved(result: SolveResult): Solved {
  return result as Solved;
}
