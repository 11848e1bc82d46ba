import type { MeshEvaluator, MeshState } from './mesh-state';

/** How a pipe's inlet pressure answers to its flow, its outlet pressure and the enthalpy at its inlet. */
export interface PipeSlopes {
  readonly perFlow: Float64Array;
  readonly perOutletPressure: Float64Array;
  readonly perEnthalpy: Float64Array;
}

/** Steps of the difference quotients: small against curvature, large against what the march leaves open. */
const FLOW_STEP_SHARE = 2e-3;
const PRESSURE_STEP_SHARE = 1e-3;
const LEAST_PRESSURE_STEP_PA = 1;
const ENTHALPY_STEP_JKG = 500;
/** The least step in flow, and that of a still pipe, as shares of all that flows. */
const LEAST_STEP_SHARE = 1e-7;
const STILL_STEP_SHARE = 1e-3;
/** A slope is kept while flow and pressure stay within this share of where it was taken, and enthalpy within some J/kg. */
const KEPT_SHARE = 0.02;
const KEPT_ENTHALPY_JKG = 300;
/** Enthalpies closer than this everywhere need no slope. */
const ALIKE_JKG = 1;

/** Takes slopes where they are needed, and keeps those that still hold. */
export class SlopeKeeper implements PipeSlopes {
  readonly perFlow: Float64Array;
  readonly perOutletPressure: Float64Array;
  readonly perEnthalpy: Float64Array;
  /** Where each was taken; direction 0 before the first. */
  private readonly takenDirection: Int8Array;
  private readonly takenFlow: Float64Array;
  private readonly takenOutletPa: Float64Array;
  private readonly takenEnthalpy: Float64Array;

  constructor(private readonly evaluator: MeshEvaluator) {
    const count = evaluator.network.from.length;
    const byPipe = (): Float64Array => new Float64Array(count);
    [this.perFlow, this.perOutletPressure, this.perEnthalpy] = [byPipe(), byPipe(), byPipe()];
    [this.takenFlow, this.takenOutletPa, this.takenEnthalpy] = [byPipe(), byPipe(), byPipe()];
    this.takenDirection = new Int8Array(count);
  }

  update(state: MeshState): void {
    const mixes = enthalpiesDiffer(state);
    for (let pipe = 0; pipe < state.direction.length; pipe++) {
      if (state.direction[pipe] !== 0) this.updatePipe(state, pipe, mixes);
    }
  }

  private updatePipe(state: MeshState, pipe: number, mixes: boolean): void {
    const { network, scaleKgS } = this.evaluator;
    const withArrow = state.direction[pipe] === 1;
    const [up, down] = (withArrow ? [network.from, network.to] : [network.to, network.from]) as [
      Int32Array,
      Int32Array,
    ];
    const node = up[pipe] as number;
    const flow = Math.abs(state.flowKgS[pipe] as number);
    const outletPa = state.pressurePa[down[pipe] as number] as number;
    const enthalpy = state.enthalpyJKg[node] as number;
    if (this.holds(state, pipe, flow, outletPa, enthalpy)) return;
    this.takenDirection[pipe] = state.direction[pipe] as number;
    this.takenFlow[pipe] = flow;
    this.takenOutletPa[pipe] = outletPa;
    this.takenEnthalpy[pipe] = enthalpy;

    const { law } = this.evaluator;
    const mismatch = state.mismatchPa[pipe] as number;
    const inletPa = (state.pressurePa[node] as number) + mismatch;
    const resistance = law.rough.resistance[pipe] as number;
    const flowStep =
      flow > 0
        ? Math.max(FLOW_STEP_SHARE * flow, LEAST_STEP_SHARE * scaleKgS)
        : stillStep(-mismatch, resistance, scaleKgS);
    const slope = (changed: number, step: number, otherwise: number): number =>
      Number.isFinite(changed) ? (changed - inletPa) / step : otherwise;
    const at = (m: number, h: number, p: number): number => law.inletPressurePa(pipe, withArrow, m, h, p);
    this.perFlow[pipe] = slope(at(flow + flowStep, enthalpy, outletPa), flowStep, resistance * (2 * flow + flowStep));
    const pressureStep = Math.max(LEAST_PRESSURE_STEP_PA, PRESSURE_STEP_SHARE * Math.abs(outletPa));
    this.perOutletPressure[pipe] = flow > 0 ? slope(at(flow, enthalpy, outletPa + pressureStep), pressureStep, 1) : 1;
    this.perEnthalpy[pipe] =
      mixes && flow > 0 ? slope(at(flow, enthalpy + ENTHALPY_STEP_JKG, outletPa), ENTHALPY_STEP_JKG, 0) : 0;
  }

  private holds(state: MeshState, pipe: number, flow: number, outletPa: number, enthalpy: number): boolean {
    if (flow === 0 || this.takenDirection[pipe] !== state.direction[pipe]) return false;
    return (
      Math.abs(flow - (this.takenFlow[pipe] as number)) <= KEPT_SHARE * flow &&
      Math.abs(outletPa - (this.takenOutletPa[pipe] as number)) <= KEPT_SHARE * Math.abs(outletPa) &&
      Math.abs(enthalpy - (this.takenEnthalpy[pipe] as number)) <= KEPT_ENTHALPY_JKG
    );
  }
}

/** A pipe that begins to flow is judged by the flow at which friction alone would take up what drives it. */
function stillStep(drivingPa: number, resistance: number, scaleKgS: number): number {
  const step = Math.sqrt(Math.max(0, drivingPa) / resistance);
  const usual = STILL_STEP_SHARE * scaleKgS;
  return step > 0 && Number.isFinite(step) ? Math.min(step, scaleKgS) : usual;
}

function enthalpiesDiffer({ order, massFlowKgS, enthalpyJKg }: MeshState): boolean {
  let [least, most] = [Infinity, -Infinity];
  for (const node of order) {
    if (massFlowKgS[node] === 0) continue;
    least = Math.min(least, enthalpyJKg[node] as number);
    most = Math.max(most, enthalpyJKg[node] as number);
  }
  return most - least > ALIKE_JKG;
}
