import type { NetworkFile } from '@riseback/network';
import { ambientLiquidEnthalpyJKg, type PipeFlow } from './flow-and-energy';
import { piecesAgainstFlow } from './pipe-geometry';
import { MARCH_TOLERANCE_PA, PipeMarcher } from './pipe-march';
import { walkOfTrap, type WalkedResult, type WalkStep } from './walk-of-trap';

/** A place on the way from a trap to the end of its walk: the trap, each end of a route's piece, each end of a pipe. */
export interface ProfilePoint {
  /** Along the pipes from the trap. */
  readonly distanceM: number;
  readonly elevationM: number;
  readonly pressurePa: number;
  /** The pipe that comes to this point from upstream; at the trap, the pipe that leaves it. */
  readonly pipeId: string;
}

/**
 * Height and pressure along a trap's walk, from the trap down. Pressures inside a pipe come from marching it once more, by the
 * same method from the same end, so they meet the result's at both of its ends.
 * @param file the file that was solved
 * @returns no points for a trap that the result does not have
 */
export function liftProfile(file: NetworkFile, result: WalkedResult, trapId: string): ProfilePoint[] {
  const walk = walkOfTrap(file, result, trapId);
  const [first] = walk?.steps ?? [];
  if (walk === undefined || first === undefined) return [];
  const { elevationM } = first.upstream;
  const points: ProfilePoint[] = [
    { distanceM: 0, elevationM, pressurePa: walk.trap.backPressurePa, pipeId: first.pipe.id },
  ];
  const ambientEnthalpyJKg = ambientLiquidEnthalpyJKg(file.site.ambientTemperatureK);
  let pipeStartM = 0;
  for (const step of walk.steps) {
    const flow = flowOf(step, ambientEnthalpyJKg);
    let distanceM = pipeStartM;
    let heightM = step.upstream.elevationM;
    for (const { lengthM, riseM, outletPressurePa } of piecesWithPressure(file, step, flow)) {
      distanceM += lengthM;
      heightM += riseM;
      points.push({ distanceM, elevationM: heightM, pressurePa: outletPressurePa, pipeId: step.pipe.id });
    }
    pipeStartM += step.pipe.lengthM;
  }
  return points;
}

interface PieceWithPressure {
  readonly lengthM: number;
  readonly riseM: number;
  readonly outletPressurePa: number;
}

/** The pieces of a pipe in the direction of flow, each with what stands at its downstream end. */
function piecesWithPressure(
  file: NetworkFile,
  { geometry, withArrow, result }: WalkStep,
  flow: PipeFlow,
): PieceWithPressure[] {
  const pieces: PieceWithPressure[] = [];
  let outletPressurePa = result.downstreamPressurePa;
  const marcher = new PipeMarcher({ method: file.method, tolerancePa: MARCH_TOLERANCE_PA });
  const against = piecesAgainstFlow(geometry.pieces, withArrow);
  marcher.march(geometry, flow, against, outletPressurePa, ({ lengthM, riseM }, inletPressurePa) => {
    pieces.push({ lengthM, riseM, outletPressurePa });
    outletPressurePa = inletPressurePa;
  });
  return pieces.reverse();
}

/** A walk ends at the first vessel, so what enters each of its pipes is what stands at the pipe's upstream node. */
export function flowOf({ result, upstreamResult, geometry }: WalkStep, ambientEnthalpyJKg: number): PipeFlow {
  return {
    massFlowKgS: Math.abs(result.massFlowKgS),
    inletEnthalpyJKg: upstreamResult.enthalpyJKg,
    heatLossWM: geometry.heatLossWM,
    ambientEnthalpyJKg,
  };
}
