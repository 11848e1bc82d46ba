import { solveLinearSystem } from '@riseback/numerics';
import { MeshResponse } from './mesh-response';
import { SlopeKeeper } from './mesh-slopes';
import type { MeshEvaluator, MeshState, VesselDrains } from './mesh-state';

export interface MeshSolution {
  readonly state: MeshState;
  /** States worked out by the law, the first included. */
  readonly iterations: number;
  readonly converged: boolean;
  /** The greatest mismatch and its pipe; −1 where nothing is open. */
  readonly worstPa: number;
  readonly worstPipe: number;
}

export interface NewtonOptions {
  /** A mesh counts as closed within this. */
  readonly closedPa: number;
  /** The search also goes on until a step changes no flow by more than this share of all that flows, while that still helps. */
  readonly flowShare: number;
  readonly maximumIterations: number;
  /** By pipe: 1 where the pressure jumps as the flow turns, so that a step stops at no flow at all. */
  readonly stops: Uint8Array;
  /** Told before each state that is worked out; true ends the search where it is. */
  readonly isOver?: () => boolean;
  /** What vessels drained before, for those whose liquid comes back to them. */
  readonly drains?: VesselDrains | undefined;
}

/** A step is shortened while it overshoots by more than this share of what drove it. */
const OVERSHOOT_SHARE = 0.3;
const SHORTENINGS = 8;
/** A way out is brought this near to standstill, after which another pipe is its node's way out and this one a chord. */
const NEARLY_STOPPED = 0.9;
/** The search ends after so many steps that have not brought the mismatch down by this factor; while polishing, after one. */
const PATIENCE = 3;
const GAIN = 0.5;

/**
 * Closes every mesh: Newton's method on the flows of the chords, each step shortened where it overshoots.
 *     J δ = −r,   r mismatch of each chord, J its response to each chord's flow
 * In a network where more flow always costs more pressure the way along a step sums to r·δ, which rises all along it from less
 * than nothing; a step that ends far above nothing has overshot (the potential whose slope r is has its least there).
 * Method: docs/methods/loops.md.
 */
export function closeMeshesByNewton(
  evaluator: MeshEvaluator,
  startKgS: Float64Array,
  options: NewtonOptions,
): MeshSolution {
  const slopes = new SlopeKeeper(evaluator);
  let state = evaluator.evaluate(startKgS, options.drains);
  let best = { state, ...worstOf(state) };
  let iterations = 1;
  let gainedFrom = best.worstPa;
  let sinceGain = 0;
  while (iterations < options.maximumIterations && sinceGain < PATIENCE && options.isOver?.() !== true) {
    slopes.update(state);
    const step = newtonStep(new MeshResponse(evaluator, state, slopes), state, options.stops);
    const closed = best.worstPa <= options.closedPa;
    if (step === undefined || (closed && largest(step.changes) <= options.flowShare * evaluator.scaleKgS)) break;
    state = shortened(evaluator, state, step, options, () => iterations++);
    const worst = worstOf(state);
    if (worst.worstPa < best.worstPa) best = { state, ...worst };
    sinceGain++;
    if (best.worstPa <= GAIN * gainedFrom) {
      gainedFrom = best.worstPa;
      sinceGain = 0;
    } else if (closed) break;
  }
  return { ...best, iterations, converged: best.worstPa <= options.closedPa };
}

interface Step {
  /** By pipe, along the arrow. */
  readonly changes: Float64Array;
  /** r·δ, less than nothing for a step that leads down. */
  readonly slope: number;
  /** The share of the step that may be gone. */
  readonly share: number;
}

/** @returns undefined where nothing is open, or no step is left to take */
function newtonStep(response: MeshResponse, state: MeshState, stops: Uint8Array): Step | undefined {
  const { chords } = response;
  if (chords.length === 0) return undefined;
  const step = Float64Array.from(chords, (chord) => -(state.mismatchPa[chord] as number));
  const matrix = response.matrix();
  const diagonal = chords.map((_, i) => matrix[i * chords.length + i] as number);
  if (!solveLinearSystem(matrix, step) || !leadsDown(step, chords, state)) alone(step, diagonal, chords, state);
  chords.forEach((chord, i) => {
    const flow = Math.abs(state.flowKgS[chord] as number);
    const change = step[i] as number;
    // a still pipe begins the way it is driven or not at all; one that turns stops first where the pressure jumps there
    if (flow + change < 0 && (stops[chord] === 1 || flow === 0)) step[i] = -flow;
  });
  const changes = response.flowChanges(step).slice();
  let share = 1;
  for (let pipe = 0; pipe < changes.length; pipe++) {
    const flow = Math.abs(state.flowKgS[pipe] as number);
    const change = changes[pipe] as number;
    if (stops[pipe] === 1 && state.mismatchPa[pipe] === 0 && flow > 0 && flow + change < 0) {
      share = Math.min(share, (NEARLY_STOPPED * flow) / -change);
    }
  }
  changes.forEach((change, pipe) => (changes[pipe] = change * (state.direction[pipe] as number)));
  const slope = driven(state, changes);
  if (!changes.every(Number.isFinite)) return undefined;
  return changes.every((change) => change === 0) ? undefined : { changes, slope, share };
}

function leadsDown(step: Float64Array, chords: readonly number[], state: MeshState): boolean {
  let slope = 0;
  chords.forEach((chord, i) => (slope += (state.mismatchPa[chord] as number) * (step[i] as number)));
  return slope < 0 && Number.isFinite(slope);
}

/** Each chord for itself, where the whole system has no good answer. */
function alone(step: Float64Array, diagonal: readonly number[], chords: readonly number[], state: MeshState): void {
  const floor = diagonal.reduce((most, d) => Math.max(most, Math.abs(d)), 0) * 1e-6 || 1;
  chords.forEach((chord, i) => {
    step[i] = -(state.mismatchPa[chord] as number) / Math.max(Math.abs(diagonal[i] as number), floor) / 2;
  });
}

/** Takes the step, or less of it where it overshoots. */
function shortened(
  evaluator: MeshEvaluator,
  state: MeshState,
  { changes, slope, share: allowed }: Step,
  { isOver }: NewtonOptions,
  count: () => void,
): MeshState {
  let share = allowed;
  for (let shortening = 0; ; shortening++) {
    const next = evaluator.evaluate(moved(state.flowKgS, changes, share), state.drains);
    count();
    const reached = driven(next, changes);
    if (!(slope < 0) || reached <= -OVERSHOOT_SHARE * slope || shortening >= SHORTENINGS || isOver?.() === true) {
      return next;
    }
    share *= Math.min(0.7, Math.max(0.1, -slope / (reached - slope)));
  }
}

/** The flows a share of the way along, those that stop there to the bit at nothing. */
function moved(flowKgS: Float64Array, changes: Float64Array, share: number): Float64Array {
  return flowKgS.map((flow, pipe) => {
    const change = (changes[pipe] as number) * share;
    return Math.abs(flow + change) <= Number.EPSILON * Math.abs(flow) ? 0 : flow + change;
  });
}

/** What the mismatches of a state drive along given changes of flow. */
function driven({ direction, mismatchPa }: MeshState, changes: Float64Array): number {
  let sum = 0;
  for (let pipe = 0; pipe < changes.length; pipe++) {
    sum += (mismatchPa[pipe] as number) * (direction[pipe] as number) * (changes[pipe] as number);
  }
  return sum;
}

function worstOf(state: MeshState): { worstPa: number; worstPipe: number } {
  let [worstPa, worstPipe] = [0, -1];
  state.mismatchPa.forEach((mismatch, pipe) => {
    // a mismatch that is not a number is the worst of all
    if (Math.abs(mismatch) <= worstPa) return;
    worstPa = Number.isNaN(mismatch) ? Infinity : Math.abs(mismatch);
    worstPipe = pipe;
  });
  return state.balanced ? { worstPa, worstPipe } : { worstPa: Infinity, worstPipe };
}

function largest(values: Float64Array): number {
  let most = 0;
  for (const value of values) most = Math.max(most, Math.abs(value));
  return most;
}
