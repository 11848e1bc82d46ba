import type { FlowPattern } from '@riseback/hydraulics';

/** What a solve answers; the command line prints it as it stands. Every pressure is absolute, Pa. Keys not computed yet are left out. */
export interface NodeResult {
  readonly id: string;
  readonly pressurePa: number;
  readonly temperatureK: number;
  readonly enthalpyJKg: number;
  readonly quality: number;
  readonly massFlowKgS: number;
}

export interface PipeResult {
  readonly id: string;
  readonly massFlowKgS: number;
  readonly upstreamPressurePa: number;
  readonly downstreamPressurePa: number;
  readonly staticPa: number;
  readonly frictionPa: number;
  readonly flashPa: number;
  readonly upstreamQuality: number;
  readonly downstreamQuality: number;
  readonly liquidVelocityMS: number;
  readonly mixtureVelocityMS: number;
  /** At the downstream end. Absent where no map answers: a still pipe, and one that ends in a fall steeper than 10°. */
  readonly flowPattern?: FlowPattern;
  /** Whether the flow leaves at its critical velocity, so that the outlet stands above the node it discharges into. */
  readonly choked: boolean;
  /** Of a choked pipe: the critical pressure at its outlet, at which quality, velocities and pattern of its end are told. */
  readonly outletPressurePa?: number;
}

export type Verdict = 'pass' | 'watch' | 'fail';

/** The kinds of number that a finding's text may carry; the names are those of libs/units. */
export type FindingQuantity =
  | 'pressure'
  | 'pressureDifference'
  | 'length'
  | 'massFlow'
  | 'velocity'
  | 'temperature'
  | 'temperatureDifference'
  | 'pressureGradient'
  | 'momentumFlux'
  | 'fraction'
  | 'factor';

/** One sentence as words and SI numbers, so that the command line prints it in SI and a screen in the person's units. */
export type FindingText = readonly (string | { readonly quantity: FindingQuantity; readonly si: number })[];

/** What a check or a warning says: what is so and why it matters, and what would mend it. */
export interface FindingWords {
  /** `text` in SI, one plain sentence. */
  readonly message: string;
  readonly text: FindingText;
  /** What would mend it; absent where nothing needs mending. */
  readonly remedy?: FindingText;
}

/** One check at a trap. `value` and `limit` are SI, in the unit that the code's page in docs/methods/checks.md names. */
export interface TrapCheck extends FindingWords {
  readonly code: string;
  readonly verdict: Verdict;
  readonly value?: number;
  readonly limit?: number;
}

/** A check that could not be made (no trap type, no model), so that silence is never taken for a pass. */
export interface UnmadeCheck {
  readonly code: string;
  readonly reason: string;
}

/** Absolute pressures between which methods put what stands behind a trap. */
export interface Band {
  readonly lowPa: number;
  readonly highPa: number;
  /** Methods that belong to the band and have no solution here, by name: the band leaves them out, and is wider in truth. */
  readonly withoutSolution?: readonly string[];
}

export interface TrapResult {
  readonly id: string;
  /** Which discharge its pressures are for; those of nodes and pipes are always for the average. */
  readonly basis: 'average' | 'ownPeak' | 'probable';
  readonly backPressurePa: number;
  readonly receiverPressurePa: number;
  readonly staticPa: number;
  readonly frictionPa: number;
  readonly flashPa: number;
  readonly differentialPa: number;
  readonly handCheck: { readonly staticPa: number; readonly backPressurePa: number };
  /** Of a trap that has failed open: what it blows on top of its load. */
  readonly liveSteamKgS?: number;
  /** Over all friction methods, with the rule and with two-phase risers; present where bands were asked for. */
  readonly spread?: Band;
  /** Over the methods that fit the flow patterns on its walk. */
  readonly credible?: Band;
  /** Pipe ids from the trap to its receiver or vessel. */
  readonly walk: readonly string[];
  readonly checks: readonly TrapCheck[];
  readonly notChecked: readonly UnmadeCheck[];
}

/** A finding about a pipe, a vessel or the whole; checks at pipes come as these. */
export interface SolveWarning extends FindingWords {
  readonly code: string;
  /** The element's id; '' where it is about the network as a whole. */
  readonly element: string;
  readonly verdict: Exclude<Verdict, 'pass'>;
  readonly value?: number;
  readonly limit?: number;
}

/** An RFC 9457 problem object; `pointer` is RFC 6901 into the network file. */
export interface SolveProblem {
  readonly type: string;
  readonly title: string;
  readonly status: number;
  readonly detail: string;
  readonly errors: readonly { readonly pointer: string; readonly detail: string }[];
}

export interface SolveResult {
  /** '' is the plain network. */
  readonly case: string;
  readonly converged: boolean;
  readonly iterations: number;
  readonly nodes: readonly NodeResult[];
  readonly pipes: readonly PipeResult[];
  readonly traps: readonly TrapResult[];
  readonly warnings: readonly SolveWarning[];
  /** Present when elements that reach no receiver were left out (live solves only). */
  readonly partial?: true;
  readonly leftOut?: readonly string[];
  /** Present when `converged` is false. */
  readonly problem?: SolveProblem;
}
