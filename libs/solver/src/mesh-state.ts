import { DirectionFinder, type MeshDirections } from './mesh-directions';
import type { MeshLaw, MeshNetwork } from './mesh-network';

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

/** Flow at which a pipe is asked what it takes to begin, as a share of all that flows: friction is then nothing. */
const CREEP_SHARE = 1e-9;
/** Below this a still pipe counts as held. */
const HELD_PA = 1e-6;
/** Rounds in which what a vessel passes on is fitted to what it gets. */
const BALANCING_ROUNDS = 8;

type Pending = { -readonly [K in keyof MeshState]: MeshState[K] };

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

/** Pressures of one state, from the fixed ones up, and what does not close. */
class Pressures {
  private readonly failed: number[] = [];
  private readonly creepKgS: number;

  constructor(
    private readonly evaluator: MeshEvaluator,
    private readonly state: Pending,
  ) {
    this.creepKgS = CREEP_SHARE * (evaluator.scaleKgS || 1);
  }

  find(): void {
    const { state } = this;
    const { flowKgS, order, wayOut, pressurePa, direction, mismatchPa } = state;
    const { finder, network } = this.evaluator;
    for (let i = order.length - 1; i >= 0; i--) {
      const node = order[i] as number;
      const out = wayOut[node] as number;
      if (out < 0 || !Number.isNaN(network.fixedPressurePa[node] as number)) continue;
      pressurePa[node] = this.inletPa(out, node, Math.abs(flowKgS[out] as number));
    }
    state.order = Int32Array.from([...this.standStill(), ...order.filter((node) => this.isFixedOrFlows(node))]);
    for (let pipe = 0; pipe < flowKgS.length; pipe++) {
      const flow = flowKgS[pipe] as number;
      if (flow === 0) {
        this.judgeStill(pipe);
        continue;
      }
      direction[pipe] = Math.sign(flow);
      const node = finder.upstream(pipe, flowKgS);
      if (wayOut[node] === pipe) continue;
      mismatchPa[pipe] = this.inletPa(pipe, node, Math.abs(flow)) - (pressurePa[node] as number);
    }
    state.failed = this.failed;
  }

  private isFixedOrFlows(node: number): boolean {
    return (
      !Number.isNaN(this.evaluator.network.fixedPressurePa[node] as number) ||
      (this.state.massFlowKgS[node] as number) > 0
    );
  }

  /**
   * Pressures of the nodes that nothing flows through. Each stands on the pipe by which a first drop would leave it, the easiest
   * of its ways down, found nearest to the fixed pressures first.
   * @returns these nodes, each before the one that it stands on
   */
  private standStill(): number[] {
    const { network, finder } = this.evaluator;
    const { pressurePa, wayOut } = this.state;
    const open = new Set<number>();
    const reached = new Set<number>();
    for (let node = 0; node < network.nodeCount; node++) {
      if (!this.isFixedOrFlows(node)) open.add(node);
    }
    for (const node of open) pressurePa[node] = Infinity;
    const offer = (below: number): void => {
      for (let i = finder.at.first[below] as number; i < (finder.at.first[below + 1] as number); i++) {
        const pipe = finder.at.pipes[i] as number;
        const withArrow = network.to[pipe] === below;
        const above = (withArrow ? network.from[pipe] : network.to[pipe]) as number;
        if (!open.has(above) || (!withArrow && network.oneWay[pipe] === 1)) continue;
        const pressure = this.inletPa(pipe, above, this.creepKgS);
        if (pressure >= (pressurePa[above] as number)) continue;
        pressurePa[above] = pressure;
        wayOut[above] = pipe;
        reached.add(above);
      }
    };
    if (open.size > 0) {
      for (let node = 0; node < network.nodeCount; node++) if (!open.has(node)) offer(node);
    }
    const stood: number[] = [];
    while (reached.size > 0) {
      const node = [...reached].reduce((a, b) => ((pressurePa[b] as number) < (pressurePa[a] as number) ? b : a));
      reached.delete(node);
      open.delete(node);
      stood.push(node);
      offer(node);
    }
    return stood.reverse();
  }

  /** Whether a pipe without flow is held there, or which way it would begin to flow. */
  private judgeStill(pipe: number): void {
    const { from, to, oneWay } = this.evaluator.network;
    const { wayOut, pressurePa, direction, mismatchPa } = this.state;
    const [start, end] = [from[pipe] as number, to[pipe] as number];
    for (const [node, sign] of [
      [start, 1],
      [end, -1],
    ] as const) {
      if (wayOut[node] === pipe) {
        direction[pipe] = sign;
        return;
      }
    }
    let least = -HELD_PA;
    for (const [node, sign] of [
      [start, 1],
      [end, -1],
    ] as const) {
      if (sign < 0 && oneWay[pipe] === 1) continue;
      const mismatch = this.inletPa(pipe, node, this.creepKgS) - (pressurePa[node] as number);
      if (!(mismatch < least)) continue;
      least = mismatch;
      direction[pipe] = sign;
      mismatchPa[pipe] = mismatch;
    }
  }

  /** At the end of a pipe where it begins, for a flow from `node`. */
  private inletPa(pipe: number, node: number, flow: number): number {
    const { network, law } = this.evaluator;
    const withArrow = network.from[pipe] === node;
    const outlet = (withArrow ? network.to[pipe] : network.from[pipe]) as number;
    const outletPa = this.state.pressurePa[outlet] as number;
    const pressure = law.inletPressurePa(pipe, withArrow, flow, this.state.enthalpyJKg[node] as number, outletPa);
    if (!Number.isNaN(pressure)) return pressure;
    this.failed.push(pipe);
    const { resistance, staticAgainstArrowPa, staticWithArrowPa } = law.rough;
    const staticPa = (withArrow ? staticWithArrowPa : staticAgainstArrowPa)[pipe] as number;
    return outletPa + staticPa + (resistance[pipe] as number) * flow * flow;
  }
}
