import { FlowDivider, type RisingPipes } from './mesh-division';
import { closeMeshesByNewton, type MeshSolution } from './mesh-newton';
import { SlopeKeeper } from './mesh-slopes';
import type { MeshEvaluator, MeshState, VesselDrains } from './mesh-state';

/** Every mesh closes within this. */
export const MESH_CLOSED_PA = 1;
/** Newton's method is asked for better, so that the last walk's own rounding leaves a mesh closed. */
const AIMED_PA = MESH_CLOSED_PA / 2;
/** Accepted where it cannot have that. */
const ACCEPTED_PA = 0.9 * MESH_CLOSED_PA;
/** Flows are polished until they move by less than this share of all that flows. */
const POLISHED_SHARE = 1e-9;
/** Each time Newton's method is tried it may take so many states. */
const NEWTON_STATES = 30;
const MAXIMUM_ROUNDS = 30;
/** After so many a search may be found to stall. */
const ROUNDS_TO_STALL = 4;
/** From here on a round goes only half of its way, for networks that swing. */
const CALMER_ROUNDS = 6;
/** Above this the pressure of a pipe counts as jumping as its flow turns. */
const JUMP_PA = 1e-3;

export interface SearchOptions {
  /** Whether to be content with the best so far. */
  readonly isOver: () => boolean;
  /** Flows to begin with; by default a first division is made. */
  readonly startKgS?: Float64Array;
  /** A search that has come this near and goes on no better is ended. */
  readonly stallsBelowPa: number;
}

/**
 * Finds the division of the flow that closes every mesh.
 * In rounds: pipes that rise with their flow and have the value and slope of the true ones at the present flows are divided, which
 * always succeeds; from there Newton's method with the true pipes closes the meshes, or does not, and the next round begins.
 */
export function searchDivision(
  evaluator: MeshEvaluator,
  { isOver, startKgS, stallsBelowPa }: SearchOptions,
): MeshSolution {
  const { network, scaleKgS } = evaluator;
  const rough = risingPipes(evaluator);
  const stops = network.oneWay.map((oneWay, pipe) => {
    const jumpPa = (rough.staticWithArrowPa[pipe] as number) + (rough.staticAgainstArrowPa[pipe] as number);
    return oneWay === 1 || jumpPa > JUMP_PA ? 1 : 0;
  });
  const divider = new FlowDivider(network, scaleKgS, isOver);
  let flowKgS = startKgS ?? divider.divide(rough, network.inflowKgS);
  let drains: VesselDrains | undefined;
  let best: MeshSolution | undefined;
  let iterations = 0;
  for (let round = 1; ; round++) {
    const options = { closedPa: AIMED_PA, flowShare: POLISHED_SHARE, maximumIterations: NEWTON_STATES, stops, isOver };
    const solution = closeMeshesByNewton(evaluator, flowKgS, { ...options, drains });
    iterations += solution.iterations;
    if (best === undefined || solution.converged || solution.worstPa < best.worstPa) best = solution;
    const stalls = round >= ROUNDS_TO_STALL && best.worstPa < stallsBelowPa;
    if (solution.converged || stalls || round === MAXIMUM_ROUNDS || isOver()) {
      return { ...best, iterations, converged: best.worstPa <= ACCEPTED_PA };
    }
    const state = evaluator.evaluate(flowKgS, drains);
    drains = state.drains;
    refit(rough, evaluator, state);
    const next = divider.divide(rough, withDrains(evaluator, state), state.flowKgS);
    flowKgS = round < CALMER_ROUNDS ? next : next.map((flow, pipe) => (flow + (state.flowKgS[pipe] as number)) / 2);
  }
}

function risingPipes({ law, network }: MeshEvaluator): RisingPipes {
  const { resistance, staticAgainstArrowPa, staticWithArrowPa } = law.rough;
  return {
    staticWithArrowPa: staticWithArrowPa.slice(),
    staticAgainstArrowPa: staticAgainstArrowPa.slice(),
    linear: new Float64Array(network.from.length),
    square: resistance.slice(),
  };
}

/** Gives the rising pipes the value and the slope that the true ones have at the flows of a state. */
function refit(rising: RisingPipes, evaluator: MeshEvaluator, state: MeshState): void {
  const { network, law } = evaluator;
  const slopes = new SlopeKeeper(evaluator);
  slopes.update(state);
  const failed = new Set(state.failed);
  for (let pipe = 0; pipe < network.from.length; pipe++) {
    const flow = Math.abs(state.flowKgS[pipe] as number);
    if (flow === 0 || failed.has(pipe)) continue;
    const withArrow = state.direction[pipe] === 1;
    const statics = withArrow ? rising.staticWithArrowPa : rising.staticAgainstArrowPa;
    const atRest = withArrow ? law.rough.staticWithArrowPa : law.rough.staticAgainstArrowPa;
    const inlet = (withArrow ? network.from : network.to)[pipe] as number;
    const outlet = (withArrow ? network.to : network.from)[pipe] as number;
    const inletPa = (state.pressurePa[inlet] as number) + (state.mismatchPa[pipe] as number);
    const dropPa = inletPa - (state.pressurePa[outlet] as number);
    const slope = Math.max(0, slopes.perFlow[pipe] as number);
    // a riser that grows lighter as it flows stands higher at rest than it flows: then it is fitted where it is
    const movingPa = Math.max(dropPa - (atRest[pipe] as number), (slope * flow) / 2);
    statics[pipe] = dropPa - movingPa;
    rising.square[pipe] = Math.min(movingPa / flow, Math.max(0, slope - movingPa / flow)) / flow;
    rising.linear[pipe] = movingPa / flow - (rising.square[pipe] as number) * flow;
  }
}

function withDrains({ network }: MeshEvaluator, { drains }: MeshState): Float64Array {
  const inflowKgS = network.inflowKgS.slice();
  network.vesselLinks.forEach(({ outlet }, link) => {
    inflowKgS[outlet] = (inflowKgS[outlet] as number) + (drains.flowKgS[link] as number);
  });
  return inflowKgS;
}
