import { fittingLossCoefficient, pipeBore, type FittingName } from '@riseback/hydraulics';
import type { FittingKind, NetworkFile, PipeEnds, PipeRun, RoutePiece } from '@riseback/network';

/** What the march needs of a pipe, with its size and fittings looked up. */
export interface PipeGeometry {
  readonly lengthM: number;
  readonly insideDiameterM: number;
  readonly roughnessM: number;
  /** K of all fittings and the given K, spread evenly over the length. */
  readonly lossCoefficientPerM: number;
  readonly heatLossWM: number;
  /** From `from` to `to`; rises counted that way. */
  readonly pieces: readonly RoutePiece[];
}

/** Of no pipe: where a record that is filled in for each pipe begins. */
export const NO_GEOMETRY: PipeGeometry = {
  lengthM: 0,
  insideDiameterM: 0,
  roughnessM: 0,
  lossCoefficientPerM: 0,
  heatLossWM: 0,
  pieces: [],
};

/** Each kind of fitting in a network file has its figures in libs/hydraulics; one that had none would not compile. */
const FIGURES_OF: Readonly<Record<FittingKind, FittingName>> & Readonly<Record<FittingName, FittingKind>> = {
  elbow90: 'elbow90',
  elbow90LongRadius: 'elbow90LongRadius',
  elbow45: 'elbow45',
  mitre90: 'mitre90',
  returnBend180: 'returnBend180',
  teeRun: 'teeRun',
  teeBranch: 'teeBranch',
  gateValve: 'gateValve',
  globeValve: 'globeValve',
  angleValve: 'angleValve',
  ballValve: 'ballValve',
  plugValve: 'plugValve',
  butterflyValve: 'butterflyValve',
  swingCheckValve: 'swingCheckValve',
  liftCheckValve: 'liftCheckValve',
  entrance: 'entrance',
  exit: 'exit',
};

/** The bore of a pipe; undefined for a size that no standard in the catalogue makes. */
export function insideDiameterM(pipe: PipeRun): number | undefined {
  return pipe.size === undefined ? pipe.insideDiameterM : pipeBore(pipe.size)?.insideDiameterM;
}

/** By pipe in the file's order; undefined where the pipe cannot be. */
export function pipeGeometries({ nodes, pipes }: NetworkFile, { from, to }: PipeEnds): (PipeGeometry | undefined)[] {
  const elevationM = (node: number | undefined): number => nodes[node as number]?.elevationM ?? 0;
  return pipes.map((pipe, i) => pipeGeometry(pipe, elevationM(to[i]) - elevationM(from[i])));
}

/** @returns undefined for a size that no standard makes, and for a roughness that reaches the middle of the bore */
export function pipeGeometry(pipe: PipeRun, riseM: number): PipeGeometry | undefined {
  const bore = insideDiameterM(pipe);
  if (bore === undefined || pipe.roughnessM >= bore / 2) return undefined;
  let lossCoefficient = pipe.lossCoefficient;
  for (const { kind, count } of pipe.fittings)
    lossCoefficient += count * fittingLossCoefficient(FIGURES_OF[kind], bore);
  return {
    lengthM: pipe.lengthM,
    insideDiameterM: bore,
    roughnessM: pipe.roughnessM,
    lossCoefficientPerM: lossCoefficient / pipe.lengthM,
    heatLossWM: pipe.heatLossWM,
    pieces: pipe.route ?? [{ lengthM: pipe.lengthM, riseM }],
  };
}

/** The pieces as the walk meets them, from the downstream end up; rises counted in the direction of flow. */
export function piecesAgainstFlow(pieces: readonly RoutePiece[], withArrow: boolean): readonly RoutePiece[] {
  if (!withArrow) return pieces.map(({ lengthM, riseM }) => ({ lengthM, riseM: -riseM }));
  return pieces.length === 1 ? pieces : pieces.toReversed();
}
