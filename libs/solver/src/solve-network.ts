import { pipeEnds, type FileCase, type NetworkFile } from '@riseback/network';
import { NoConvergenceError } from '@riseback/numerics';
import { assembleResult } from './assemble-result';
import { ElementFailure } from './element-failure';
import { ambientLiquidEnthalpyJKg } from './flow-and-energy';
import { stateWithOpenTraps } from './open-traps';
import { findCase, openWithoutOrifice, operatingNodes } from './operating-case';
import { pipeGeometries } from './pipe-geometry';
import { MARCH_TOLERANCE_PA, type GradientEvaluation } from './pipe-march';
import { noSolution, notAvailable, probableInMeshes, unknownCase, unsolvable, type Refusal } from './refusal';
import { returnTree } from './return-tree';
import { shutValves } from './shut-valves';
import type { SolveResult } from './solve-result';
import { mistakesIn, soundPipes } from './solvability';

export interface SolveOptions {
  /** '' is the plain network; left out, the first case, or the plain network if the file has none. */
  readonly caseId?: string;
  /** Leave out, and list, what cannot reach a receiver, instead of refusing the whole. */
  readonly partial: boolean;
  /** Whether each trap is to have its spread and its credible band, which may turn a pass into a watch; false unless asked for. */
  readonly bands?: boolean;
  /** Error allowed in each step of the march, Pa. */
  readonly marchTolerancePa?: number;
  /** Told of each gradient evaluated. */
  readonly onGradient?: (evaluation: GradientEvaluation) => void;
}

/**
 * Back pressure at every trap of a network, in one operating case.
 * @returns a refusal for all that can be seen in the file without computing; else a result, which names a problem and has
 *   `converged: false` where computing found that there is no solution
 * Method: docs/methods/network-walk.md.
 */
export function solveNetwork(file: NetworkFile, options: SolveOptions): SolveResult | Refusal {
  const operatingCase = findCase(file, options.caseId);
  if (operatingCase === undefined) return unknownCase(file, options.caseId ?? '');
  const ends = pipeEnds(file);
  const geometries = pipeGeometries(file, ends);
  const mistakes = options.partial ? [] : mistakesIn(file, ends, geometries);
  const isSound = mistakes.length === 0 && !options.partial ? undefined : soundPipes(file, geometries);
  const tree = returnTree(file, ends, isSound);
  const unavailable = probableInMeshes(file, tree);
  const openMistakes = openWithoutOrifice(file, operatingCase);
  if (mistakes.length + openMistakes.length > 0) return unsolvable([...mistakes, ...openMistakes, ...unavailable]);
  if (unavailable.length > 0) return notAvailable(unavailable);

  try {
    const inCase = operatingNodes(file, operatingCase);
    const ambientEnthalpyJKg = ambientLiquidEnthalpyJKg(file.site.ambientTemperatureK);
    const march = {
      method: file.method,
      tolerancePa: options.marchTolerancePa ?? MARCH_TOLERANCE_PA,
      onGradient: options.onGradient,
    };
    const prepared = { file, geometries, tree, ambientEnthalpyJKg };
    const { nodes, state } = stateWithOpenTraps(prepared, inCase, march);
    const { bands = false } = options;
    const result = assembleResult({ prepared, nodes, state, march, caseId: operatingCase.id, bands });
    const warnings = [...result.warnings, ...shutValves(file, state)];
    return { ...result, warnings };
  } catch (error) {
    if (!(error instanceof ElementFailure)) throw error;
    return unsolved(operatingCase, error);
  }
}

/** True where nothing was computed. */
export function isRefusal(outcome: SolveResult | Refusal): outcome is Refusal {
  return 'refused' in outcome;
}

function unsolved(operatingCase: FileCase, { element, pointer, reason }: ElementFailure): SolveResult {
  return {
    case: operatingCase.id,
    converged: false,
    iterations: reason instanceof NoConvergenceError ? Math.max(1, reason.iterations) : 1,
    nodes: [],
    pipes: [],
    traps: [],
    warnings: [],
    problem: noSolution(element, pointer, reason.message),
  };
}
