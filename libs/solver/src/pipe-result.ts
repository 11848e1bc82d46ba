import { boreAreaM2, flowPattern } from '@riseback/hydraulics';
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

/** @throws ElementFailure where what leaves the pipe is outside the steam properties */
export function pipeResult(at: PipeAfterMarch): PipeResult {
  const { pipe, index, geometry, marched, flow, arrow, upstream, downstream } = at;
  const choked = marched.outletPressurePa > downstream.pressurePa;
  let saturation: SaturationState;
  let outlet: FluidState;
  try {
    saturation = choked ? saturationState(marched.outletPressurePa) : downstream;
    outlet = fluidStateAt(saturation, enthalpyAlong(flow, geometry.lengthM));
  } catch (error) {
    throw atElement('pipe', pipe, index, error);
  }
  // a still pipe whose arrow runs the other way has no −0
  const massFlowKgS = flow.massFlowKgS === 0 ? 0 : flow.massFlowKgS * arrow;
  const massFlux = massFlowKgS / boreAreaM2(geometry.insideDiameterM);
  const quality = vapourFraction(outlet.quality);
  const [lastPiece] = piecesAgainstFlow(geometry.pieces, arrow === 1);
  const pattern = flowPattern({
    massFlowKgS: flow.massFlowKgS,
    quality,
    saturation,
    insideDiameterM: geometry.insideDiameterM,
    roughnessM: geometry.roughnessM,
    lossCoefficientPerM: geometry.lossCoefficientPerM,
    fallSlope: lastPiece === undefined ? 0 : -lastPiece.riseM / lastPiece.lengthM,
  });
  return {
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
}
