import type { NetworkFile } from '@riseback/network';
import { NoConvergenceError } from '@riseback/numerics';
import { saturationState, SteamRangeError } from '@riseback/steam';
import { contendersOf, crediblyIn, type Contender, type Contenders } from './contenders';
import { ambientLiquidEnthalpyJKg, type PipeFlow } from './flow-and-energy';
import { flowOf } from './lift-profile';
import { piecesAgainstFlow } from './pipe-geometry';
import { MARCH_TOLERANCE_PA, PipeMarcher } from './pipe-march';
import { pipeResult, type PieceEnd, type PieceEndRecord } from './pipe-result';
import { walkOfTrap, type WalkedResult, type WalkStep } from './walk-of-trap';

/** Both bands at a point of a lift profile, absolute pressures. */
export interface ProfileBand {
  readonly spreadLowPa: number;
  readonly spreadHighPa: number;
  readonly credibleLowPa: number;
  readonly credibleHighPa: number;
}

/**
 * The bands along a trap's walk, one for each point of its `liftProfile`, from the trap down: nothing at the receiver, whose pressure
 * is given, and the trap's own bands at the trap. Computed as those are, with the flows of the result; in a network with meshes the
 * spread at the trap is with each method's own flows, so there the two need not meet, and who draws them has to compare.
 * @param file the file that was solved
 * @returns undefined where the walk is not that of the result, or where a pipe of it cannot be marched by the chosen method
 */
export function liftProfileBands(
  file: NetworkFile,
  result: WalkedResult,
  trapId: string,
): readonly ProfileBand[] | undefined {
  const walk = walkOfTrap(file, result, trapId);
  if (walk === undefined || walk.steps.length === 0) return undefined;
  const contenders = contendersOf(file.method, MARCH_TOLERANCE_PA);
  const ambientEnthalpyJKg = ambientLiquidEnthalpyJKg(file.site.ambientTemperatureK);
  const { receiverPressurePa } = walk.trap;
  let below: Below = {
    spreadPa: contenders.spread.map(() => receiverPressurePa),
    credibleLowPa: receiverPressurePa,
    credibleHighPa: receiverPressurePa,
  };
  const bands: ProfileBand[] = [bandOf(below, receiverPressurePa)];
  for (const step of walk.steps.toReversed()) {
    const up = upPipe(file, contenders, step, flowOf(step, ambientEnthalpyJKg), below);
    if (up === undefined) return undefined;
    bands.push(...up.bands);
    below = up.inlet;
  }
  return bands.reverse();
}

/** What stands below a pipe by each method of the spread, undefined from where it has no solution, and at the ends of the credible band. */
interface Below {
  readonly spreadPa: readonly (number | undefined)[];
  readonly credibleLowPa: number;
  readonly credibleHighPa: number;
}

function upPipe(
  { method }: NetworkFile,
  contenders: Contenders,
  step: WalkStep,
  flow: PipeFlow,
  below: Below,
): { readonly bands: readonly ProfileBand[]; readonly inlet: Below } | undefined {
  const { downstreamPressurePa } = step.result;
  const marcher = new PipeMarcher({ method, tolerancePa: MARCH_TOLERANCE_PA });
  const chosenPa = pieceInlets(marcher, step, flow, downstreamPressurePa);
  if (chosenPa === undefined) return undefined;
  const credible = crediblyIn(contenders, endsOf(marcher, step, flow));
  const spread = contenders.spread.map((contender, i) => inletsBy(contender, step, flow, below.spreadPa[i]));
  const lows = credible.map((contender) => inletsBy(contender, step, flow, below.credibleLowPa));
  const highs = credible.map((contender) => inletsBy(contender, step, flow, below.credibleHighPa));
  let inlet = below;
  const bands = chosenPa.map((herePa, piece) => {
    // what the chosen method found stands in where no credible method has a solution
    const risePa = herePa - downstreamPressurePa;
    inlet = {
      spreadPa: spread.map((inlets) => inlets?.[piece]),
      credibleLowPa: least(lows.map((inlets) => inlets?.[piece])) ?? below.credibleLowPa + risePa,
      credibleHighPa: most(highs.map((inlets) => inlets?.[piece])) ?? below.credibleHighPa + risePa,
    };
    return bandOf(inlet, herePa);
  });
  return { bands, inlet };
}

function bandOf({ spreadPa, credibleLowPa, credibleHighPa }: Below, chosenPa: number): ProfileBand {
  return {
    spreadLowPa: least([chosenPa, ...spreadPa]) ?? chosenPa,
    spreadHighPa: most([chosenPa, ...spreadPa]) ?? chosenPa,
    credibleLowPa,
    credibleHighPa,
  };
}

function inletsBy(
  { marcher }: Contender,
  step: WalkStep,
  flow: PipeFlow,
  outletPa: number | undefined,
): readonly number[] | undefined {
  return outletPa === undefined ? undefined : pieceInlets(marcher, step, flow, outletPa);
}

/** The pressure at the upstream end of each piece, from the outlet up; undefined where the method has no solution. */
function pieceInlets(
  marcher: PipeMarcher,
  { geometry, withArrow }: WalkStep,
  flow: PipeFlow,
  outletPa: number,
): readonly number[] | undefined {
  const inletsPa: number[] = [];
  try {
    marcher.march(geometry, flow, piecesAgainstFlow(geometry.pieces, withArrow), outletPa, (_piece, pressurePa) => {
      inletsPa.push(pressurePa);
    });
  } catch (error) {
    if (error instanceof SteamRangeError || error instanceof NoConvergenceError) return undefined;
    throw error;
  }
  return inletsPa;
}

function endsOf(marcher: PipeMarcher, step: WalkStep, flow: PipeFlow): readonly PieceEnd[] {
  const { pipe, geometry, withArrow, result } = step;
  const marched = marcher.march(
    geometry,
    flow,
    piecesAgainstFlow(geometry.pieces, withArrow),
    result.downstreamPressurePa,
  );
  const ends: PieceEndRecord[] = [];
  pipeResult({
    pipe,
    index: 0,
    geometry,
    marched,
    flow,
    arrow: withArrow ? 1 : -1,
    upstreamQuality: result.upstreamQuality,
    downstream: saturationState(result.downstreamPressurePa),
    ends,
  });
  return ends;
}

function least(values: readonly (number | undefined)[]): number | undefined {
  const found = values.filter((value) => value !== undefined);
  return found.length === 0 ? undefined : Math.min(...found);
}

function most(values: readonly (number | undefined)[]): number | undefined {
  const found = values.filter((value) => value !== undefined);
  return found.length === 0 ? undefined : Math.max(...found);
}
