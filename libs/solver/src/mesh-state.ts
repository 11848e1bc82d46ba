import { DirectionFinder, type MeshDirections } from './mesh-directions';
import type { MeshLaw, MeshNetwork } from './mesh-network';
import { Pressures } from './mesh-pressures';

/** What leaves a vessel as liquid; by vessel link. */
export interface VesselDrains {
  readonly flowKgS: Float64Array;
  readonly enthalpyJKg: Float64Array;
}

/** A network of meshes with given flows: what enthalpies and pressures follow, and what does not close. */
export interface MeshState {
  /** By pipe, along the arrow. */
  readonly flowKgS: Float64Array;
  /** By pipe: which way it flows, or would if it began to (1 with the arrow, −1 against it); 0 where it stands still for good. */
  readonly direction: Int8Array;
  /** Nodes, each before those it flows to, still ones before those that they stand on. */
  readonly order: Int32Array;
  /** By node: the pipe of its largest outflow, of a still one the pipe that it stands on; −1 at fixed pressures. */
  readonly wayOut: Int32Array;
  readonly massFlowKgS: Float64Array;
  readonly enthalpyJKg: Float64Array;
  readonly pressurePa: Float64Array;
  /**
   * By pipe: pressure at its inlet by its own law less that of the node there. 0 for ways out. Of a still pipe less than 0 where
   * its node overcomes what holds it, else 0.
   */
  readonly mismatchPa: Float64Array;
  /** Pipes whose law had no answer, so that a rough one stands in. */
  readonly failed: readonly number[];
  /** Pipes whose flow was taken back because it went round in a circle. */
  readonly circled: readonly number[];
  /** By vessel link: 1 where the liquid comes back to its vessel. */
  readonly returning: Uint8Array;
  readonly drains: VesselDrains;
  /** False where flows could not be brought into balance. */
  readonly balanced: boolean;
}

/** Rounds in which what a vessel passes on is fitted to what it gets. */
const BALANCING_ROUNDS = 8;

/** A state in the making. */
export type Pending = { -readonly [K in keyof MeshState]: MeshState[K] };

/** Works out states of one network by one law. */
export class MeshEvaluator {
  readonly finder: DirectionFinder;
  readonly linkOfOutlet: Int32Array;
  /** All that flows in. */
  readonly scaleKgS: number;

  constructor(
    readonly network: MeshNetwork,
    readonly law: MeshLaw,
  ) {
    this.finder = new DirectionFinder(network);
    this.linkOfOutlet = new Int32Array(network.nodeCount).fill(-1);
    network.vesselLinks.forEach(({ outlet }, link) => (this.linkOfOutlet[outlet] = link));
    this.scaleKgS = network.inflowKgS.reduce((sum, flow) => sum + flow, 0);
  }

  /**
   * @param wantedKgS flows along the arrows; each node's largest outflow is fitted so that mass balances to rounding
   * @param before what the vessels drained, for those whose liquid comes back to them
   */
  evaluate(wantedKgS: Float64Array, before?: VesselDrains): MeshState {
    const { from, nodeCount, vesselLinks } = this.network;
    const state: Pending = {
      flowKgS: wantedKgS.slice(),
      direction: new Int8Array(from.length),
      order: new Int32Array(0),
      wayOut: new Int32Array(nodeCount).fill(-1),
      massFlowKgS: new Float64Array(nodeCount),
      enthalpyJKg: new Float64Array(nodeCount),
      pressurePa: this.network.fixedPressurePa.slice(),
      mismatchPa: new Float64Array(from.length),
      failed: [],
      circled: [],
      returning: new Uint8Array(0),
      drains: {
        flowKgS: before?.flowKgS.slice() ?? new Float64Array(vesselLinks.length),
        enthalpyJKg: before?.enthalpyJKg.slice() ?? new Float64Array(vesselLinks.length),
      },
      balanced: false,
    };
    let directions: MeshDirections | undefined;
    for (let round = 0; round < BALANCING_ROUNDS && !state.balanced; round++) {
      directions = this.finder.directions(state.flowKgS);
      state.circled = [...state.circled, ...directions.circled];
      this.findLargestOutflows(state);
      state.balanced = this.balance(state, directions);
    }
    state.order = directions?.order ?? state.order;
    state.returning = directions?.returning ?? state.returning;
    new Pressures(this, state).find();
    return state;
  }

  private findLargestOutflows({ flowKgS, wayOut }: Pending): void {
    wayOut.fill(-1);
    for (let pipe = 0; pipe < flowKgS.length; pipe++) {
      const flow = Math.abs(flowKgS[pipe] as number);
      if (flow === 0) continue;
      const node = this.finder.upstream(pipe, flowKgS);
      const best = wayOut[node] as number;
      if (best < 0 || flow > Math.abs(flowKgS[best] as number)) wayOut[node] = pipe;
    }
  }

  /** Mass and energy from the sources down. @returns false where directions have changed on the way */
  private balance(state: Pending, { order, returning }: MeshDirections): boolean {
    const { fixedPressurePa, inflowKgS, inflowW, ambientEnthalpyJKg, startWayOut } = this.network;
    const { flowKgS, wayOut, massFlowKgS, enthalpyJKg } = state;
    massFlowKgS.set(inflowKgS);
    const enthalpyFlowW = inflowW.slice();
    let settled = true;
    for (const node of order) {
      this.addDrain(state, node, returning, enthalpyFlowW);
      const passing = massFlowKgS[node] as number;
      const h = passing > 0 ? (enthalpyFlowW[node] as number) / passing : ambientEnthalpyJKg;
      enthalpyJKg[node] = h;
      if (!Number.isNaN(fixedPressurePa[node] as number)) continue;
      const out = wayOut[node] as number;
      if (out >= 0) settled = this.divide(flowKgS, node, out, passing) && settled;
      else if (passing > 0) {
        // a vessel that begins to pass something on, or what came in by the node's only way out
        const start = startWayOut[node] as number;
        const flow = this.network.from[start] === node ? passing : -passing;
        flowKgS[start] = flowKgS[start] === 0 ? flow : 0;
        settled = false;
      }
      this.eachOutflow(flowKgS, node, (pipe, flow) => {
        const below = this.finder.downstream(pipe, flowKgS);
        massFlowKgS[below] = (massFlowKgS[below] as number) + flow;
        const outletW = flow * this.law.outletEnthalpyJKg(pipe, flow, h);
        enthalpyFlowW[below] = (enthalpyFlowW[below] as number) + outletW;
      });
    }
    return settled;
  }

  /** The largest outflow carries what the others leave. Where they take more than there is, they share it. @returns false then */
  private divide(flowKgS: Float64Array, node: number, out: number, passing: number): boolean {
    let others = 0;
    this.eachOutflow(flowKgS, node, (pipe, flow) => {
      if (pipe !== out) others += flow;
    });
    const sign = Math.sign(flowKgS[out] as number);
    if (others < passing) {
      flowKgS[out] = sign * (passing - others);
      return true;
    }
    flowKgS[out] = 0;
    this.eachOutflow(flowKgS, node, (pipe) => {
      flowKgS[pipe] = others > 0 ? ((flowKgS[pipe] as number) * passing) / others : 0;
    });
    return false;
  }

  private eachOutflow(flowKgS: Float64Array, node: number, visit: (pipe: number, flow: number) => void): void {
    const { first, pipes } = this.finder.at;
    for (let i = first[node] as number; i < (first[node + 1] as number); i++) {
      const pipe = pipes[i] as number;
      const flow = flowKgS[pipe] as number;
      if (flow !== 0 && this.finder.upstream(pipe, flowKgS) === node) visit(pipe, Math.abs(flow));
    }
  }

  private addDrain(state: Pending, node: number, returning: Uint8Array, enthalpyFlowW: Float64Array): void {
    const link = this.linkOfOutlet[node] as number;
    const vesselLink = this.network.vesselLinks[link];
    if (vesselLink === undefined) return;
    const { flowKgS, enthalpyJKg } = state.drains;
    if (returning[link] === 0) {
      const { vessel, liquidEnthalpyJKg, vapourEnthalpyJKg } = vesselLink;
      const inflow = state.massFlowKgS[vessel] as number;
      const h = state.enthalpyJKg[vessel] as number;
      const share = (vapourEnthalpyJKg - h) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
      flowKgS[link] = inflow * Math.min(1, Math.max(0, share));
      enthalpyJKg[link] = Math.min(h, liquidEnthalpyJKg);
    }
    const drained = flowKgS[link] as number;
    state.massFlowKgS[node] = (state.massFlowKgS[node] as number) + drained;
    enthalpyFlowW[node] = (enthalpyFlowW[node] as number) + drained * (enthalpyJKg[link] as number);
  }
}
