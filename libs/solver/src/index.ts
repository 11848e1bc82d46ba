export { ledger, type LedgerEntry } from './back-pressure-ledger';
export { bandsLeftOut } from './banded-checks';
export { CHECK_LIMITS, limitsInForce, type CheckLimit, type LimitsInForce } from './check-limits';
export { plainText } from './finding-text';
export { liftProfile, type ProfilePoint } from './lift-profile';
export { liftProfileBands, type ProfileBand } from './lift-profile-bands';
export { modulatedInletPressurePa } from './modulating-inlet';
export type { GradientEvaluation } from './pipe-march';
export type { ProblemError, Refusal } from './refusal';
export { isRefusal, solveNetwork, type SolveOptions } from './solve-network';
export type {
  Band,
  FindingQuantity,
  FindingText,
  FindingWords,
  NodeResult,
  PipeResult,
  SolveProblem,
  SolveResult,
  SolveWarning,
  TrapCheck,
  TrapResult,
  UnmadeCheck,
  Verdict,
} from './solve-result';
export { stallCurve, stallFraction, type StallCurve } from './stall';
export { trapCapacityKgS } from './trap-capacity';
export { checkTrap, type TrapUnderCheck } from './trap-checks';
export type { WalkedResult } from './walk-of-trap';
