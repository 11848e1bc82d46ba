import type { NetworkFile } from '@riseback/network';
import { expandedUncertainty, type ExpandedUncertainty, type UncertaintyPart } from './expanded-uncertainty';
import type { GaugePrediction, PredictedResult } from './predicted-at-gauge';

/** How closely a regulated vessel or receiver is held, as a share of its gauge pressure, either way (common practice). */
export const HELD_PRESSURE_TOLERANCE = 0.05;

/** Friction in a full or flashing line grows at most with the square of its flow, so that this errs to the safe side. */
const FRICTION_EXPONENT = 2;

/** Whether the reading lies above or below what is predicted: the model's band need not be as wide both ways. */
export type Side = 'above' | 'below';

/**
 * U_p of a prediction at a gauge: how loads and held pressures may be off, and how far methods are apart on the side measured.
 * @param file in the case that was solved, as far as node loads go: only the tolerances are read here
 */
export function predictionUncertainty(
  file: NetworkFile,
  result: PredictedResult,
  prediction: GaugePrediction,
  side: Side,
): ExpandedUncertainty {
  return expandedUncertainty([
    ...loadsPart(file, result, prediction),
    ...receiverPart(file, prediction),
    ...modelPart(prediction, side),
  ]);
}

/** From what is predicted to the credible band's end on one side; 0 where the band lies wholly on the other. */
export function credibleHalfWidthPa({ pressurePa, credible }: GaugePrediction, side: Side): number | undefined {
  if (credible === undefined) return undefined;
  return Math.max(0, side === 'above' ? credible.highPa - pressurePa : pressurePa - credible.lowPa);
}

function modelPart(prediction: GaugePrediction, side: Side): UncertaintyPart[] {
  const limitPa = credibleHalfWidthPa(prediction, side) ?? 0;
  return limitPa === 0 ? [] : [{ cause: 'model', shape: 'rectangular', limitPa }];
}

/**
 * Each load may be off by its tolerance, by itself. A share δ more from one trap, of a pipe's flow m, moves what is lost in the pipe by
 * 2 δ m_trap/m; summed over the pipes below the tap that its condensate passes, then in quadrature over the traps.
 */
export function loadsPart(
  { nodes }: NetworkFile,
  { traps, pipes }: PredictedResult,
  { below }: GaugePrediction,
): UncertaintyPart[] {
  const lossPerFlow = new Map(
    below.flatMap(({ pipe: id, share }) => {
      const pipe = pipes.find((candidate) => candidate.id === id);
      if (pipe === undefined || pipe.massFlowKgS === 0) return [];
      const lostPa = share * Math.max(0, pipe.frictionPa + pipe.flashPa);
      return [[id, (FRICTION_EXPONENT * lostPa) / Math.abs(pipe.massFlowKgS)] as const];
    }),
  );
  const byTrap = traps.map(({ id, walk }) => {
    const node = nodes.find((candidate) => candidate.id === id);
    if (node?.kind !== 'trap') return 0;
    const perFlow = walk.reduce((sum, pipe) => sum + (lossPerFlow.get(pipe) ?? 0), 0);
    return (node.loadTolerance * flowOfTrap(pipes, walk) * perFlow) / Math.sqrt(3);
  });
  const standardPa = Math.hypot(...byTrap);
  return standardPa === 0 ? [] : [{ cause: 'loads', shape: 'normal', standardPa }];
}

/** Of its first pipe, which is its own in a plant; where traps share it, the figure errs to the safe side. */
function flowOfTrap(pipes: PredictedResult['pipes'], walk: readonly string[]): number {
  return Math.abs(pipes.find(({ id }) => id === walk[0])?.massFlowKgS ?? 0);
}

/**
 * A vented receiver stands at the site's pressure, as the back of the gauge does: nothing to be off by. Where the end of the way is not
 * known (below a flash vessel) the whole pressure at the tap is taken as held.
 */
function receiverPart(
  { site: { atmosphericPressurePa } }: NetworkFile,
  { endPressurePa, pressurePa }: GaugePrediction,
): UncertaintyPart[] {
  const limitPa = HELD_PRESSURE_TOLERANCE * Math.abs((endPressurePa ?? pressurePa) - atmosphericPressurePa);
  return limitPa === 0 ? [] : [{ cause: 'receiver', shape: 'rectangular', limitPa }];
}
