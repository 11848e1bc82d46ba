import { solveLinearSystem } from '@riseback/numerics';
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
/** What stands against a flow that a pipe does not let through, over the width of the stage. */
const SHUT_PA = 1e7;
const STEPS_PER_STAGE = 60;
/** A stage is done when the way down along a step is this small against scale and pressure. */
const DONE_SHARE = 1e-9;
const LINE_TRIALS = 30;
/** Flows below this many widths of the last stage count as none where the pressure jumps. */
const STILL_WIDTHS = 30;

/**
 * Divides the flow so that all meshes close, for pipes whose pressure always rises with flow: there is one such division, the
 * least of a convex potential, and Newton's method with a search along each step finds it from anywhere.
 *     least of Σ ∫ Δp_k dm_k + Σ p_fixed m_into   over the chord flows of one spanning tree
 * @param inflowKgS by node, with what vessels drain
 * @param startKgS flows by pipe to begin with, in balance
 * @returns flows by pipe; to the bit 0 where a pipe stands still although a slight push would not move it
 */
export function divideFlow(
  network: MeshNetwork,
  pipes: RisingPipes,
  inflowKgS: Float64Array,
  scaleKgS: number,
  startKgS?: Float64Array,
): Float64Array {
  const tree = new CycleTree(network, inflowKgS);
  const chordKgS = Float64Array.from(tree.chords, (chord) => startKgS?.[chord] ?? 0);
  for (const stage of STAGES)
    settle(tree, new SpreadPipes(pipes, network.oneWay, stage * scaleKgS), chordKgS, scaleKgS);
  const flowKgS = tree.flows(chordKgS);
  const [last] = STAGES.slice(-1);
  const stillKgS = STILL_WIDTHS * (last ?? 0) * scaleKgS;
  return flowKgS.map((flow, pipe) => {
    const jumpPa = (pipes.staticWithArrowPa[pipe] as number) + (pipes.staticAgainstArrowPa[pipe] as number);
    const turned = network.oneWay[pipe] === 1 && flow < 0;
    return turned || ((jumpPa > 0 || network.oneWay[pipe] === 1) && Math.abs(flow) < stillKgS) ? 0 : flow;
  });
}

/** Newton's method in one stage; changes `chordKgS`. */
function settle(tree: CycleTree, pipes: SpreadPipes, chordKgS: Float64Array, scaleKgS: number): void {
  const n = chordKgS.length;
  for (let count = 0; count < STEPS_PER_STAGE; count++) {
    const flowKgS = tree.flows(chordKgS);
    const open = tree.mismatches(flowKgS, pipes);
    const step = open.map((mismatch) => -mismatch);
    const matrix = tree.matrix(flowKgS, pipes);
    // a trace of stiffness keeps meshes of still water from dividing nothing by nothing
    for (let i = 0; i < n; i++) matrix[i * n + i] = (matrix[i * n + i] as number) * (1 + 1e-12) + 1e-12;
    if (!solveLinearSystem(matrix, step) || !step.every(Number.isFinite)) return;
    const slope = dot(open, step);
    if (!(slope < -DONE_SHARE * scaleKgS)) return;
    const share = shareOfStep(tree, pipes, chordKgS, step, slope);
    for (let i = 0; i < n; i++) chordKgS[i] = (chordKgS[i] as number) + share * (step[i] as number);
  }
}

/** How much of a step to go: as far as the potential falls, or nearly. Its slope rises all along the step. */
function shareOfStep(
  tree: CycleTree,
  pipes: SpreadPipes,
  chordKgS: Float64Array,
  step: Float64Array,
  slope: number,
): number {
  const slopeAt = (share: number): number =>
    dot(tree.mismatches(tree.flows(chordKgS.map((flow, i) => flow + share * (step[i] as number))), pipes), step);
  if (slopeAt(1) <= -0.1 * slope) return 1;
  let [low, high] = [0, 1];
  for (let trial = 0; trial < LINE_TRIALS; trial++) {
    const middle = (low + high) / 2;
    const found = slopeAt(middle);
    if (Math.abs(found) <= -0.3 * slope) return middle;
    if (found < 0) low = middle;
    else high = middle;
  }
  return low > 0 ? low : high;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] as number) * (b[i] as number);
  return sum;
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
    return turning + (linear[pipe] as number) + 2 * (square[pipe] as number) * Math.abs(flow) + shut;
  }

  /** Where lighter water stands on one side the jump may be the wrong way round: then there is none, but their mean. */
  private statics(pipe: number): readonly [ahead: number, back: number] {
    const ahead = this.pipes.staticWithArrowPa[pipe] as number;
    if (this.oneWay[pipe] === 1) return [ahead, -ahead];
    const back = this.pipes.staticAgainstArrowPa[pipe] as number;
    return ahead + back >= 0 ? [ahead, back] : [(ahead - back) / 2, (back - ahead) / 2];
  }
}

/** One spanning tree, that of the start, and the cycle that each other pipe makes with it. */
class CycleTree {
  readonly chords: readonly number[];
  /** By chord: pipes of its cycle, and whether the chord's flow runs with their arrows. */
  private readonly cycles: readonly { readonly pipes: Int32Array; readonly signs: Int8Array }[];
  private readonly baseKgS: Float64Array;
  private readonly fixedPa: Float64Array;

  constructor(
    private readonly network: MeshNetwork,
    inflowKgS: Float64Array,
  ) {
    const { from, startWayOut } = network;
    const isWayOut = new Uint8Array(from.length);
    for (const pipe of startWayOut) if (pipe >= 0) isWayOut[pipe] = 1;
    const chords: number[] = [];
    isWayOut.forEach((is, pipe) => {
      if (is === 0) chords.push(pipe);
    });
    this.chords = chords;
    this.baseKgS = treeFlows(network, inflowKgS);
    const depth = new Int32Array(network.nodeCount);
    for (let i = network.startOrder.length - 1; i >= 0; i--) {
      const node = network.startOrder[i] as number;
      if ((startWayOut[node] as number) >= 0) depth[node] = (depth[this.below(node)] as number) + 1;
    }
    this.fixedPa = new Float64Array(chords.length);
    this.cycles = chords.map((chord, i) => this.cycleOf(chord, i, depth));
  }

  flows(chordKgS: Float64Array): Float64Array {
    const flowKgS = this.baseKgS.slice();
    this.cycles.forEach(({ pipes, signs }, i) => {
      const flow = chordKgS[i] as number;
      if (flow === 0) return;
      for (let k = 0; k < pipes.length; k++) {
        const pipe = pipes[k] as number;
        flowKgS[pipe] = (flowKgS[pipe] as number) + (signs[k] as number) * flow;
      }
    });
    return flowKgS;
  }

  /** Pressure lost around each cycle. */
  mismatches(flowKgS: Float64Array, law: SpreadPipes): Float64Array {
    const dropPa = flowKgS.map((flow, pipe) => law.dropPa(pipe, flow));
    return Float64Array.from(this.cycles, ({ pipes, signs }, i) => {
      let sum = this.fixedPa[i] as number;
      for (let k = 0; k < pipes.length; k++) sum += (signs[k] as number) * (dropPa[pipes[k] as number] as number);
      return sum;
    });
  }

  /** d mismatch over d chord flow: what two cycles share. */
  matrix(flowKgS: Float64Array, law: SpreadPipes): Float64Array {
    const n = this.chords.length;
    const slopes = flowKgS.map((flow, pipe) => law.slope(pipe, flow));
    const matrix = new Float64Array(n * n);
    const shared = new Float64Array(flowKgS.length);
    this.cycles.forEach((cycle, column) => {
      cycle.pipes.forEach((pipe, k) => (shared[pipe] = (cycle.signs[k] as number) * (slopes[pipe] as number)));
      for (let row = 0; row <= column; row++) {
        const { pipes, signs } = this.cycles[row] as (typeof this.cycles)[number];
        let sum = 0;
        for (let k = 0; k < pipes.length; k++) sum += (signs[k] as number) * (shared[pipes[k] as number] as number);
        matrix[row * n + column] = sum;
        matrix[column * n + row] = sum;
      }
      cycle.pipes.forEach((pipe) => (shared[pipe] = 0));
    });
    return matrix;
  }

  private below(node: number): number {
    const { from, to, startWayOut } = this.network;
    const pipe = startWayOut[node] as number;
    return (from[pipe] === node ? to[pipe] : from[pipe]) as number;
  }

  /** The chord, down the ways out from its end, and back up to its start, as far as they do not share the way. */
  private cycleOf(chord: number, index: number, depth: Int32Array): { pipes: Int32Array; signs: Int8Array } {
    const { from, to, startWayOut, fixedPressurePa } = this.network;
    const pipes = [chord];
    const signs = [1];
    let [start, end] = [from[chord] as number, to[chord] as number];
    const isBottom = (node: number): boolean => (startWayOut[node] as number) < 0;
    while (start !== end && !(isBottom(start) && isBottom(end))) {
      const goesDown = isBottom(start) || (!isBottom(end) && (depth[end] as number) >= (depth[start] as number));
      const node = goesDown ? end : start;
      const pipe = startWayOut[node] as number;
      const withFlow = from[pipe] === node ? 1 : -1;
      pipes.push(pipe);
      signs.push(goesDown ? withFlow : -withFlow);
      if (goesDown) end = this.below(end);
      else start = this.below(start);
    }
    if (start !== end) this.fixedPa[index] = (fixedPressurePa[end] as number) - (fixedPressurePa[start] as number);
    return { pipes: Int32Array.from(pipes), signs: Int8Array.from(signs) };
  }
}

/** Everything over the ways out of the start, nothing in any other pipe. */
export function treeFlows(network: MeshNetwork, inflowKgS: Float64Array): Float64Array {
  const { from, startOrder, startWayOut, to } = network;
  const flowKgS = new Float64Array(from.length);
  const passing = inflowKgS.slice();
  for (const node of startOrder) {
    const pipe = startWayOut[node] as number;
    if (pipe < 0) continue;
    const withArrow = from[pipe] === node;
    const flow = passing[node] as number;
    flowKgS[pipe] = withArrow ? flow : -flow;
    const next = (withArrow ? to[pipe] : from[pipe]) as number;
    passing[next] = (passing[next] as number) + flow;
  }
  return flowKgS;
}
