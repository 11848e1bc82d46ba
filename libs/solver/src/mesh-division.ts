import { SparseSymmetric } from '@riseback/numerics';
import type { MeshNetwork } from './mesh-network';

/**
 * Pipes whose pressure always rises with their flow. By pipe:
 *     Δp(m) = static + linear |m| + square m²   in the direction of the flow, the jump at rest between the two statics
 */
export interface RisingPipes {
  readonly staticWithArrowPa: Float64Array;
  readonly staticAgainstArrowPa: Float64Array;
  readonly linear: Float64Array;
  readonly square: Float64Array;
}

/** The jump at rest is spread over this share of all that flows, stage by stage down to the last. */
const STAGES = [1e-1, 1e-3, 1e-5, 1e-7] as const;
const LAST_STAGE = STAGES[STAGES.length - 1] as number;
/** What stands against a flow that a pipe does not let through, over the width of the stage. */
const SHUT_PA = 1e7;
const STEPS_PER_STAGE = 60;
/** A stage is done when no flow moves by more than this share of its width. */
const DONE_WIDTHS = 0.1;
const LINE_TRIALS = 30;
/** A step is gone whole where it ends below this share of what drove it; a shorter one is searched to within the second. */
const WHOLE_STEP_SHARE = 0.1;
const SEARCHED_SHARE = 0.3;
/** Flows below this many widths of the last stage count as none where the pressure jumps. */
const STILL_WIDTHS = 30;

/** Divides flows in one network again and again. */
export class FlowDivider {
  private readonly system: SparseSymmetric;
  /** By node: its row, −1 at fixed pressures. By edge of the system: its pipe. */
  private readonly rowOf: Int32Array;
  private readonly pipeOfEdge: Int32Array;
  private readonly rows: number;

  constructor(
    private readonly network: MeshNetwork,
    private readonly scaleKgS: number,
    private readonly isOver: () => boolean,
  ) {
    const { fixedPressurePa, from, to } = network;
    let rows = 0;
    this.rowOf = Int32Array.from(fixedPressurePa, (pressure) => (Number.isNaN(pressure) ? rows++ : -1));
    this.rows = rows;
    const isFree = (node: number): boolean => (this.rowOf[node] as number) >= 0;
    this.pipeOfEdge = from
      .map((_, pipe) => pipe)
      .filter((pipe) => isFree(from[pipe] as number) && isFree(to[pipe] as number));
    const row = (ends: Int32Array): Int32Array =>
      this.pipeOfEdge.map((pipe) => this.rowOf[ends[pipe] as number] as number);
    this.system = new SparseSymmetric(rows, row(from), row(to));
  }

  /**
   * Divides the flow so that all meshes close, for pipes whose pressure always rises with flow: there is one such division, the
   * least of a convex potential, and Newton's method with a search along each step finds it from anywhere.
   *     least of Σ ∫ Δp_k dm_k + Σ p_fixed m_into   over all flows in balance
   * @param inflowKgS by node, with what vessels drain
   * @param startKgS flows by pipe to begin with
   * @returns flows by pipe; to the bit 0 where a pipe stands still although a slight push would not move it
   */
  divide(pipes: RisingPipes, inflowKgS: Float64Array, startKgS?: Float64Array): Float64Array {
    const { oneWay } = this.network;
    const flowKgS = treeFlows(this.network, inflowKgS, startKgS);
    for (const stage of STAGES) this.settle(new SpreadPipes(pipes, oneWay, stage * this.scaleKgS), flowKgS, stage);
    const stillKgS = STILL_WIDTHS * LAST_STAGE * this.scaleKgS;
    return flowKgS.map((flow, pipe) => {
      const jumpPa = (pipes.staticWithArrowPa[pipe] as number) + (pipes.staticAgainstArrowPa[pipe] as number);
      if (oneWay[pipe] === 1 && flow < stillKgS) return 0;
      return jumpPa > 0 && Math.abs(flow) < stillKgS ? 0 : flow;
    });
  }

  /** Newton's method in one stage; changes the flows. */
  private settle(pipes: SpreadPipes, flowKgS: Float64Array, stage: number): void {
    for (let count = 0; count < STEPS_PER_STAGE && !this.isOver(); count++) {
      const step = this.step(pipes, flowKgS);
      if (step === undefined) return;
      const share = shareOfStep(pipes, flowKgS, step);
      let most = 0;
      step.changes.forEach((change, pipe) => {
        flowKgS[pipe] = (flowKgS[pipe] as number) + share * change;
        most = Math.max(most, Math.abs(share * change));
      });
      if (most <= DONE_WIDTHS * stage * this.scaleKgS) return;
    }
  }

  /**
   * The step that would close everything if pressures were straight in flow, by way of the nodes' pressures:
   *     Σ (p_i − p_j − Δp_k)/Δp_k′ = 0 at each node,   δm_k = (p_i − p_j − Δp_k)/Δp_k′
   */
  private step(pipes: SpreadPipes, flowKgS: Float64Array): Step | undefined {
    const { fixedPressurePa, from, to } = this.network;
    const drops = flowKgS.map((flow, pipe) => pipes.dropPa(pipe, flow));
    const eases = flowKgS.map((flow, pipe) => 1 / pipes.slope(pipe, flow));
    const diagonal = new Float64Array(this.rows);
    const pressures = new Float64Array(this.rows);
    const add = (values: Float64Array, node: number, value: number): void => {
      const row = this.rowOf[node] as number;
      if (row >= 0) values[row] = (values[row] as number) + value;
    };
    const fixed = (node: number): number => (this.rowOf[node] === -1 ? (fixedPressurePa[node] as number) : 0);
    for (let pipe = 0; pipe < flowKgS.length; pipe++) {
      const [start, end, ease] = [from[pipe] as number, to[pipe] as number, eases[pipe] as number];
      add(diagonal, start, ease);
      add(diagonal, end, ease);
      add(pressures, start, ease * ((drops[pipe] as number) + fixed(end)));
      add(pressures, end, ease * (fixed(start) - (drops[pipe] as number)));
    }
    const off = Float64Array.from(this.pipeOfEdge, (pipe) => -(eases[pipe] as number));
    if (!this.system.solve(diagonal, off, pressures)) return undefined;
    const at = (node: number): number => {
      const row = this.rowOf[node] as number;
      return row >= 0 ? (pressures[row] as number) : (fixedPressurePa[node] as number);
    };
    const lossPa = flowKgS.map((_, pipe) => at(from[pipe] as number) - at(to[pipe] as number));
    const changes = lossPa.map((loss, pipe) => (loss - (drops[pipe] as number)) * (eases[pipe] as number));
    return changes.every(Number.isFinite) ? { changes, lossPa } : undefined;
  }
}

interface Step {
  /** By pipe; in balance. */
  readonly changes: Float64Array;
  /** Pressure lost along each pipe between the nodes' pressures. */
  readonly lossPa: Float64Array;
}

/** How much of a step to go: as far as the potential falls, or nearly. Its slope rises all along the step. */
function shareOfStep(pipes: SpreadPipes, flowKgS: Float64Array, { changes, lossPa }: Step): number {
  const slopeAt = (share: number): number => {
    let sum = 0;
    for (let pipe = 0; pipe < flowKgS.length; pipe++) {
      const change = changes[pipe] as number;
      sum += (pipes.dropPa(pipe, (flowKgS[pipe] as number) + share * change) - (lossPa[pipe] as number)) * change;
    }
    return sum;
  };
  const slope = slopeAt(0);
  if (slopeAt(1) <= -WHOLE_STEP_SHARE * slope) return 1;
  let [low, high] = [0, 1];
  for (let trial = 0; trial < LINE_TRIALS; trial++) {
    const middle = (low + high) / 2;
    const found = slopeAt(middle);
    if (Math.abs(found) <= -SEARCHED_SHARE * slope) return middle;
    if (found < 0) low = middle;
    else high = middle;
  }
  return low > 0 ? low : high;
}

/** The jump at rest spread over a width of flow, so that there is a slope everywhere. */
class SpreadPipes {
  constructor(
    private readonly pipes: RisingPipes,
    private readonly oneWay: Uint8Array,
    private readonly widthKgS: number,
  ) {}

  dropPa(pipe: number, flow: number): number {
    const { linear, square } = this.pipes;
    const [ahead, back] = this.statics(pipe);
    const turn = flow / Math.hypot(flow, this.widthKgS);
    const shut = this.oneWay[pipe] === 1 && flow < 0 ? (SHUT_PA * flow) / this.widthKgS : 0;
    const moving = flow * ((linear[pipe] as number) + (square[pipe] as number) * Math.abs(flow));
    return (ahead - back) / 2 + ((ahead + back) / 2) * turn + moving + shut;
  }

  slope(pipe: number, flow: number): number {
    const { linear, square } = this.pipes;
    const [ahead, back] = this.statics(pipe);
    const root = Math.hypot(flow, this.widthKgS);
    const turning = ((ahead + back) / 2) * ((this.widthKgS / root) ** 2 / root);
    const shut = this.oneWay[pipe] === 1 && flow < 0 ? SHUT_PA / this.widthKgS : 0;
    // of a square law at rest as well, or a step from there would know no bounds
    return turning + (linear[pipe] as number) + 2 * (square[pipe] as number) * root + shut;
  }

  /** Where lighter water stands on one side the jump may be the wrong way round: then there is none, but their mean. */
  private statics(pipe: number): readonly [ahead: number, back: number] {
    const ahead = this.pipes.staticWithArrowPa[pipe] as number;
    if (this.oneWay[pipe] === 1) return [ahead, -ahead];
    const back = this.pipes.staticAgainstArrowPa[pipe] as number;
    return ahead + back >= 0 ? [ahead, back] : [(ahead - back) / 2, (back - ahead) / 2];
  }
}

/**
 * Flows in balance: the ways out of the start carry what other pipes leave.
 * @param otherKgS what those carry, by pipe; nothing by default
 */
export function treeFlows(network: MeshNetwork, inflowKgS: Float64Array, otherKgS?: Float64Array): Float64Array {
  const { from, startOrder, startWayOut, to } = network;
  const flowKgS = otherKgS?.slice() ?? new Float64Array(from.length);
  const passing = inflowKgS.slice();
  const move = (node: number, flow: number): void => {
    passing[node] = (passing[node] as number) + flow;
  };
  for (const pipe of startWayOut) if (pipe >= 0) flowKgS[pipe] = 0;
  flowKgS.forEach((flow, pipe) => {
    if (flow === 0) return;
    move(from[pipe] as number, -flow);
    move(to[pipe] as number, flow);
  });
  for (const node of startOrder) {
    const pipe = startWayOut[node] as number;
    if (pipe < 0) continue;
    const withArrow = from[pipe] === node;
    const flow = passing[node] as number;
    flowKgS[pipe] = withArrow ? flow : -flow;
    move((withArrow ? to[pipe] : from[pipe]) as number, flow);
  }
  return flowKgS;
}
