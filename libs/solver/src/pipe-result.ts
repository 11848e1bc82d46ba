import { boreAreaM2, flowPattern, type FlowPattern } from '@riseback/hydraulics';
import type { PipeRun } from '@riseback/network';
import { saturationState, type SaturationState } from '@riseback/steam';
import { atElement } from './element-failure';
import { enthalpyAlong, type PipeFlow } from './flow-and-energy';
import { fluidStateAt, thermodynamicQuality, vapourFraction, type FluidState } from './fluid-state';
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
  let outlet: FluidState;
  let ends: readonly PieceEnd[];
  try {
    const saturation = choked ? saturationState(marched.outletPressurePa) : downstream;
    outlet = fluidStateAt(saturation, enthalpyAlong(flow, geometry.lengthM));
    ends = pieceEnds(at, outlet);
  } catch (error) {
    throw atElement('pipe', pipe, index, error);
  }
  // a still pipe whose arrow runs the other way has no −0
  const massFlowKgS = flow.massFlowKgS === 0 ? 0 : flow.massFlowKgS * arrow;
  const massFlux = massFlowKgS / boreAreaM2(geometry.insideDiameterM);
  const quality = vapourFraction(outlet.quality);
  const pattern = ends[0]?.pattern;
  const result = {
    id: pipe.id,
    massFlowKgS,
    upstreamPressurePa: marched.upstreamPressurePa,
    downstreamPressurePa: downstream.pressurePa,
    staticPa: marched.staticPa,
    frictionPa: marched.frictionPa,
    flashPa: marched.flashPa,
    upstreamQuality: vapourFraction(thermodynamicQuality(upstream, flow.inletEnthalpyJKg)),
    downstreamQuality: quality,
    liquidVelocityMS: massFlux / outlet.liquidDensityKgM3,
    mixtureVelocityMS: massFlux * (quality / outlet.vapourDensityKgM3 + (1 - quality) / outlet.liquidDensityKgM3),
    ...(pattern === undefined ? {} : { flowPattern: pattern }),
    choked,
    ...(choked ? { outletPressurePa: marched.outletPressurePa } : {}),
  };
  return { result, ends };
}

function pieceEnds({ geometry, marched, flow, arrow }: PipeAfterMarch, outlet: FluidState): PieceEnd[] {
  let endM = geometry.lengthM;
  return piecesAgainstFlow(geometry.pieces, arrow === 1).map(({ lengthM, riseM }, i) => {
    const saturation = i === 0 ? outlet.saturation : saturationState(marched.pieceOutletsPa[i] as number);
    const quality = i === 0 ? outlet.quality : thermodynamicQuality(saturation, enthalpyAlong(flow, endM));
    endM -= lengthM;
    const pattern = flowPattern({
      massFlowKgS: flow.massFlowKgS,
      quality,
      saturation,
      insideDiameterM: geometry.insideDiameterM,
      roughnessM: geometry.roughnessM,
      lossCoefficientPerM: geometry.lossCoefficientPerM,
      fallSlope: -riseM / lengthM,
    });
    return { riseM, quality: vapourFraction(quality), ...(pattern === undefined ? {} : { pattern }) };
  });
}
