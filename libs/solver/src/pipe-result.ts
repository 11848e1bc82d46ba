import { boreAreaM2, flowPattern, type FlashingFlow, type FlowPattern } from '@riseback/hydraulics';
import type { RoutePiece } from '@riseback/network';
import { blankSaturation, saturationState, type SaturationState } from '@riseback/steam';
import { atElement } from './element-failure';
import { enthalpyAlong, type PipeFlow } from './flow-and-energy';
import { fluidStateAt, thermodynamicQuality, vapourFraction } from './fluid-state';
import { piecesAgainstFlow, type PipeGeometry } from './pipe-geometry';
import type { MarchedPipe } from './pipe-march';
import type { PipeResult } from './solve-result';

/** A pipe whose march is done, between the nodes at its ends. */
export interface PipeAfterMarch {
  readonly pipe: { readonly id: string };
  readonly index: number;
  readonly geometry: PipeGeometry;
  readonly marched: MarchedPipe;
  readonly flow: PipeFlow;
  /** 1 where the flow runs with the pipe’s arrow, −1 against it. */
  readonly arrow: number;
  /** Mass fraction of vapour in what flows in. */
  readonly upstreamQuality: number;
  /** Not kept. */
  readonly downstream: SaturationState;
  /** Filled in here, a record for each piece: those that are there already serve again. */
  readonly ends: PieceEndRecord[];
}

/** How the flow stands at the downstream end of a piece of a pipe’s route. */
export interface PieceEnd {
  /** In the direction of flow. */
  readonly riseM: number;
  readonly quality: number;
  /** undefined where no map answers. */
  readonly pattern: FlowPattern | undefined;
}
export type PieceEndRecord = Writable<PieceEnd>;

/**
 * What is told of the pipe, and in `ends` how the flow stands at the end of each of its pieces, from the outlet up.
 * @throws ElementFailure where what leaves the pipe is outside the steam properties
 */
export function pipeResult(at: PipeAfterMarch): PipeResult {
  const { pipe, index, geometry, marched, flow, arrow, upstreamQuality, downstream, ends } = at;
  const choked = marched.outletPressurePa > downstream.pressurePa;
  let phases: Phases;
  try {
    const saturation = choked ? saturationState(marched.outletPressurePa) : downstream;
    phases = phasesAt(saturation, enthalpyAlong(flow, geometry.lengthM));
    fillEnds(at, saturation);
  } catch (error) {
    throw atElement('pipe', pipe, index, error);
  }
  // a still pipe whose arrow runs the other way has no −0
  const massFlowKgS = flow.massFlowKgS === 0 ? 0 : flow.massFlowKgS * arrow;
  const massFlux = massFlowKgS / boreAreaM2(geometry.insideDiameterM);
  const { liquidDensityKgM3, vapourDensityKgM3 } = phases;
  const { quality, pattern } = ends[0] as PieceEnd;
  const result: Writable<PipeResult> = {
    id: pipe.id,
    massFlowKgS,
    upstreamPressurePa: marched.upstreamPressurePa,
    downstreamPressurePa: downstream.pressurePa,
    staticPa: marched.staticPa,
    frictionPa: marched.frictionPa,
    flashPa: marched.flashPa,
    upstreamQuality,
    downstreamQuality: quality,
    liquidVelocityMS: massFlux / liquidDensityKgM3,
    mixtureVelocityMS: massFlux * (quality / vapourDensityKgM3 + (1 - quality) / liquidDensityKgM3),
    choked,
  };
  if (pattern !== undefined) result.flowPattern = pattern;
  if (choked) result.outletPressurePa = marched.outletPressurePa;
  return result;
}

type Writable<T> = { -readonly [Key in keyof T]: T[Key] };

type Phases = Pick<SaturationState, 'liquidDensityKgM3' | 'vapourDensityKgM3'>;

/** A boiling mixture has the densities of saturation; only a single phase has its own to be found. */
function phasesAt(saturation: SaturationState, enthalpyJKg: number): Phases {
  const quality = thermodynamicQuality(saturation, enthalpyJKg);
  return quality >= 0 && quality <= 1 ? saturation : fluidStateAt(saturation, enthalpyJKg);
}

/** Filled in anew for each piece: `flowPattern` keeps nothing of it. */
const flashing: Writable<FlashingFlow> = {
  massFlowKgS: NaN,
  quality: NaN,
  saturation: blankSaturation(),
  insideDiameterM: NaN,
  roughnessM: NaN,
  lossCoefficientPerM: NaN,
  fallSlope: NaN,
};

function fillEnds({ geometry, marched, flow, arrow, ends }: PipeAfterMarch, outlet: SaturationState): void {
  flashing.massFlowKgS = flow.massFlowKgS;
  flashing.insideDiameterM = geometry.insideDiameterM;
  flashing.roughnessM = geometry.roughnessM;
  flashing.lossCoefficientPerM = geometry.lossCoefficientPerM;
  const pieces = piecesAgainstFlow(geometry.pieces, arrow === 1);
  let endM = geometry.lengthM;
  for (let i = 0; i < pieces.length; i++) {
    const { lengthM, riseM } = pieces[i] as RoutePiece;
    flashing.saturation = i === 0 ? outlet : saturationState(marched.upperOutletsPa[i - 1] as number);
    flashing.quality = thermodynamicQuality(flashing.saturation, enthalpyAlong(flow, endM));
    flashing.fallSlope = -riseM / lengthM;
    endM -= lengthM;
    const end = (ends[i] ??= { riseM: NaN, quality: NaN, pattern: undefined });
    end.riseM = riseM;
    end.quality = vapourFraction(flashing.quality);
    end.pattern = flowPattern(flashing);
  }
  if (ends.length > pieces.length) ends.length = pieces.length;
}
