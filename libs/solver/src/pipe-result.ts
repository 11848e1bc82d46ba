import { boreAreaM2, flowPattern, type FlashingFlow, type FlowPattern } from '@riseback/hydraulics';
import type { PipeRun } from '@riseback/network';
import { blankSaturation, saturationState, type SaturationState } from '@riseback/steam';
import { atElement } from './element-failure';
import { enthalpyAlong, type PipeFlow } from './flow-and-energy';
import { fluidStateAt, thermodynamicQuality, vapourFraction } from './fluid-state';
import { piecesAgainstFlow, type PipeGeometry } from './pipe-geometry';
import type { MarchedPipe } from './pipe-march';
import type { PipeResult } from './solve-result';

/** A pipe whose march is done, between the states of the nodes at its ends. */
export interface PipeAfterMarch {
  readonly pipe: PipeRun;
  readonly index: number;
  readonly geometry: PipeGeometry;
  readonly marched: MarchedPipe;
  readonly flow: PipeFlow;
  /** 1 where the flow runs with the pipe’s arrow, −1 against it. */
  readonly arrow: number;
  readonly upstream: SaturationState;
  readonly downstream: SaturationState;
}

/** How the flow stands at the downstream end of a piece of a pipe’s route. */
export interface PieceEnd {
  /** In the direction of flow. */
  readonly riseM: number;
  readonly quality: number;
  /** Absent where no map answers. */
  readonly pattern?: FlowPattern;
}

/**
 * @returns what is told of the pipe, and how the flow stands at the end of each of its pieces, from the outlet up
 * @throws ElementFailure where what leaves the pipe is outside the steam properties
 */
export function pipeResult(at: PipeAfterMarch): { readonly result: PipeResult; readonly ends: readonly PieceEnd[] } {
  const { pipe, index, geometry, marched, flow, arrow, upstream, downstream } = at;
  const choked = marched.outletPressurePa > downstream.pressurePa;
  let outlet: OutletState;
  let ends: readonly PieceEnd[];
  try {
    const saturation = choked ? saturationState(marched.outletPressurePa) : downstream;
    outlet = outletState(saturation, enthalpyAlong(flow, geometry.lengthM));
    ends = pieceEnds(at, saturation);
  } catch (error) {
    throw atElement('pipe', pipe, index, error);
  }
  // a still pipe whose arrow runs the other way has no −0
  const massFlowKgS = flow.massFlowKgS === 0 ? 0 : flow.massFlowKgS * arrow;
  const massFlux = massFlowKgS / boreAreaM2(geometry.insideDiameterM);
  const { liquidDensityKgM3, vapourDensityKgM3 } = outlet.phases;
  const quality = vapourFraction(outlet.quality);
  const result: Writable<PipeResult> = {
    id: pipe.id,
    massFlowKgS,
    upstreamPressurePa: marched.upstreamPressurePa,
    downstreamPressurePa: downstream.pressurePa,
    staticPa: marched.staticPa,
    frictionPa: marched.frictionPa,
    flashPa: marched.flashPa,
    upstreamQuality: vapourFraction(thermodynamicQuality(upstream, flow.inletEnthalpyJKg)),
    downstreamQuality: quality,
    liquidVelocityMS: massFlux / liquidDensityKgM3,
    mixtureVelocityMS: massFlux * (quality / vapourDensityKgM3 + (1 - quality) / liquidDensityKgM3),
    choked,
  };
  const pattern = ends[0]?.pattern;
  if (pattern !== undefined) result.flowPattern = pattern;
  if (choked) result.outletPressurePa = marched.outletPressurePa;
  return { result, ends };
}

type Writable<T> = { -readonly [Key in keyof T]: T[Key] };

interface OutletState {
  readonly quality: number;
  readonly phases: Pick<SaturationState, 'liquidDensityKgM3' | 'vapourDensityKgM3'>;
}

/** A boiling mixture has the densities of saturation; only a single phase has its own to be found. */
function outletState(saturation: SaturationState, enthalpyJKg: number): OutletState {
  const quality = thermodynamicQuality(saturation, enthalpyJKg);
  return { quality, phases: quality >= 0 && quality <= 1 ? saturation : fluidStateAt(saturation, enthalpyJKg) };
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

function pieceEnds({ geometry, marched, flow, arrow }: PipeAfterMarch, outlet: SaturationState): PieceEnd[] {
  flashing.massFlowKgS = flow.massFlowKgS;
  flashing.insideDiameterM = geometry.insideDiameterM;
  flashing.roughnessM = geometry.roughnessM;
  flashing.lossCoefficientPerM = geometry.lossCoefficientPerM;
  let endM = geometry.lengthM;
  return piecesAgainstFlow(geometry.pieces, arrow === 1).map(({ lengthM, riseM }, i) => {
    flashing.saturation = i === 0 ? outlet : saturationState(marched.pieceOutletsPa[i] as number);
    flashing.quality = thermodynamicQuality(flashing.saturation, enthalpyAlong(flow, endM));
    flashing.fallSlope = -riseM / lengthM;
    endM -= lengthM;
    const pattern = flowPattern(flashing);
    const quality = vapourFraction(flashing.quality);
    return pattern === undefined ? { riseM, quality } : { riseM, quality, pattern };
  });
}
