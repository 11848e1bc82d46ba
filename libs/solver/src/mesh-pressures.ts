import type { MeshEvaluator, Pending } from './mesh-state';

/** Flow at which a pipe is asked what it takes to begin, as a share of all that flows: friction is then nothing. */
const CREEP_SHARE = 1e-9;
/** Below this a still pipe counts as held. */
const HELD_PA = 1e-6;
/** Pressures of one state, from the fixed ones up, and what does not close. */
export class Pressures {
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
    const ends = [
      { node: from[pipe] as number, sign: 1 },
      { node: to[pipe] as number, sign: -1 },
    ];
    const stoodOn = ends.find(({ node }) => wayOut[node] === pipe);
    if (stoodOn !== undefined) {
      direction[pipe] = stoodOn.sign;
      return;
    }
    let least = -HELD_PA;
    for (const { node, sign } of ends) {
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
