import type { TrapResult } from '@riseback/contracts';
import type { NetworkDocument, Trap } from '@riseback/network';
import { type StallCurve, stallCurve } from '@riseback/solver';

/** A modulated exchanger in one case: its curve, and where the case stands on it. */
export interface StallFacts {
  readonly curve: StallCurve;
  /** The case's load over full load. */
  readonly loadFraction: number;
}

/**
 * The curve behind a trap's stall check.
 * @returns null where the check was not made, so that no curve stands beside a reason why there is none
 */
export function stallFacts(
  document: NetworkDocument,
  caseId: string,
  trap: Trap,
  result: TrapResult,
): StallFacts | null {
  const loadFraction = result.checks.find(({ code }) => code === 'stall')?.limit;
  if (loadFraction === undefined) return null;
  const { atmosphericPressurePa } = document.site;
  // as the solver has it: a case scales the gauge pressure of the steam at full load
  const factor = document.cases.get(caseId)?.value.inletPressureFactor ?? 1;
  const fullLoadPressurePa = atmosphericPressurePa + factor * (trap.inletPressurePa - atmosphericPressurePa);
  const curve = stallCurve(trap, result.backPressurePa, fullLoadPressurePa);
  return curve === undefined ? null : { curve, loadFraction };
}
