import type { RoutePiece } from '@riseback/network';
import { NoConvergenceError } from '@riseback/numerics';
import { SteamRangeError } from '@riseback/steam';
import { outletEnthalpyJKg } from './flow-and-energy';
import type { MeshLaw, RoughPipes } from './mesh-network';
import { piecesAgainstFlow, type PipeGeometry } from './pipe-geometry';
import { PipeMarcher, type MarchOptions } from './pipe-march';

/** Pipes of a network of meshes, marched by the network's method. */
export class MarchedLaw implements MeshLaw {
  private readonly marcher: PipeMarcher;
  private readonly withArrow: (readonly RoutePiece[])[] = [];
  private readonly againstArrow: (readonly RoutePiece[])[] = [];

  /** @param rough see {@link MeshLaw.rough}; filled in by {@link findRough} */
  constructor(
    private readonly geometries: readonly PipeGeometry[],
    private readonly ambientEnthalpyJKg: number,
    march: MarchOptions,
    readonly rough: RoughPipes = noRoughPipes(geometries.length),
  ) {
    this.marcher = new PipeMarcher(march);
    for (const { pieces } of geometries) {
      this.withArrow.push(piecesAgainstFlow(pieces, true));
      this.againstArrow.push(piecesAgainstFlow(pieces, false));
    }
  }

  inletPressurePa(
    pipe: number,
    withArrow: boolean,
    massFlowKgS: number,
    inletEnthalpyJKg: number,
    outletPressurePa: number,
  ): number {
    const geometry = this.geometries[pipe];
    const pieces = (withArrow ? this.withArrow : this.againstArrow)[pipe];
    if (geometry === undefined || pieces === undefined || !Number.isFinite(outletPressurePa + massFlowKgS)) return NaN;
    const { heatLossWM } = geometry;
    const flow = { massFlowKgS, inletEnthalpyJKg, heatLossWM, ambientEnthalpyJKg: this.ambientEnthalpyJKg };
    try {
      return this.marcher.march(geometry, flow, pieces, outletPressurePa).upstreamPressurePa;
    } catch (error) {
      // an iterate may well lie where water has no properties; if the solution does, the last walk says so with its place
      if (error instanceof SteamRangeError || error instanceof NoConvergenceError) return NaN;
      throw error;
    }
  }

  outletEnthalpyJKg(pipe: number, massFlowKgS: number, inletEnthalpyJKg: number): number {
    const geometry = this.geometries[pipe] as PipeGeometry;
    return outletEnthalpyJKg(geometry, massFlowKgS, inletEnthalpyJKg, this.ambientEnthalpyJKg);
  }
}

/** What a pipe is asked to make a rough one of it. */
export interface RoughReference {
  readonly massFlowKgS: number;
  readonly enthalpyJKg: number;
  readonly pressurePa: number;
}

/** Of the flow asked for, what stands for none. */
const CREEP_SHARE = 1e-6;
/** Tenfold smaller flows are tried this often where one cannot be. */
const REFERENCE_TRIALS = 8;

/** Fills in the rough pipes of a law from three marches of each. */
export function findRough(law: MarchedLaw, pipe: number, reference: RoughReference): void {
  const { enthalpyJKg, pressurePa } = reference;
  const { resistance, staticAgainstArrowPa, staticWithArrowPa } = law.rough;
  const rise = (withArrow: boolean, flow: number): number =>
    law.inletPressurePa(pipe, withArrow, flow, enthalpyJKg, pressurePa) - pressurePa;
  const creepKgS = CREEP_SHARE * reference.massFlowKgS;
  staticWithArrowPa[pipe] = finiteOr(rise(true, creepKgS), 0);
  staticAgainstArrowPa[pipe] = finiteOr(rise(false, creepKgS), 0);
  let flow = reference.massFlowKgS;
  resistance[pipe] = Infinity;
  for (let trial = 0; trial < REFERENCE_TRIALS && !Number.isFinite(resistance[pipe] as number); trial++, flow /= 10) {
    resistance[pipe] = (rise(true, flow) - (staticWithArrowPa[pipe] as number)) / flow ** 2;
  }
  // what never costs anything still needs a slope, however slight
  resistance[pipe] = Math.max(finiteOr(resistance[pipe] as number, 0), 1e-3 / reference.massFlowKgS ** 2);
}

function finiteOr(value: number, otherwise: number): number {
  return Number.isFinite(value) ? value : otherwise;
}

function noRoughPipes(count: number): RoughPipes {
  return {
    staticWithArrowPa: new Float64Array(count),
    staticAgainstArrowPa: new Float64Array(count),
    resistance: new Float64Array(count),
  };
}
