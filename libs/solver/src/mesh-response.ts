import type { PipeSlopes } from './mesh-slopes';
import type { MeshEvaluator, MeshState } from './mesh-state';

/**
 * How a state answers to small changes of its chord flows, to first order: what else changes its flow, and by how much each
 * mismatch moves. A chord is a pipe that flows, or wants to, and is not its node's way out; ways out take up what chords leave.
 */
export class MeshResponse {
  readonly chords: readonly number[];
  private readonly dFlow: Float64Array;
  private readonly dMass: Float64Array;
  private readonly dEnthalpyFlow: Float64Array;
  private readonly dEnthalpy: Float64Array;
  private readonly dPressure: Float64Array;

  constructor(
    private readonly evaluator: MeshEvaluator,
    private readonly state: MeshState,
    private readonly slopes: PipeSlopes,
  ) {
    const { network } = evaluator;
    const chords: number[] = [];
    state.direction.forEach((direction, pipe) => {
      if (direction !== 0 && state.wayOut[this.upstream(pipe)] !== pipe) chords.push(pipe);
    });
    this.chords = chords;
    this.dFlow = new Float64Array(network.from.length);
    const byNode = (): Float64Array => new Float64Array(network.nodeCount);
    [this.dMass, this.dEnthalpyFlow, this.dEnthalpy, this.dPressure] = [byNode(), byNode(), byNode(), byNode()];
  }

  /** d mismatch of each chord over d flow of each, row by row, flows counted in the direction that each chord has. */
  matrix(): Float64Array {
    const n = this.chords.length;
    const matrix = new Float64Array(n * n);
    const change = new Float64Array(n);
    for (let column = 0; column < n; column++) {
      change[column] = 1;
      this.respond(change);
      change[column] = 0;
      this.chords.forEach((chord, row) => {
        matrix[row * n + column] = this.mismatchChange(chord);
      });
    }
    return matrix;
  }

  /** @returns by pipe, in the direction that each has; overwritten by the next call */
  flowChanges(chordChanges: Float64Array): Float64Array {
    this.respond(chordChanges);
    return this.dFlow;
  }

  private upstream(pipe: number): number {
    const { from, to } = this.evaluator.network;
    return (this.state.direction[pipe] === 1 ? from : to)[pipe] as number;
  }

  private downstream(pipe: number): number {
    const { from, to } = this.evaluator.network;
    return (this.state.direction[pipe] === 1 ? to : from)[pipe] as number;
  }

  private mismatchChange(chord: number): number {
    return this.inletChange(chord) - (this.dPressure[this.upstream(chord)] as number);
  }

  private inletChange(pipe: number): number {
    const { perEnthalpy, perFlow, perOutletPressure } = this.slopes;
    return (
      (perOutletPressure[pipe] as number) * (this.dPressure[this.downstream(pipe)] as number) +
      (perFlow[pipe] as number) * (this.dFlow[pipe] as number) +
      (perEnthalpy[pipe] as number) * (this.dEnthalpy[this.upstream(pipe)] as number)
    );
  }

  private respond(chordChanges: Float64Array): void {
    const { dFlow, dMass, dEnthalpyFlow, dEnthalpy, dPressure } = this;
    for (const array of [dFlow, dMass, dEnthalpyFlow, dEnthalpy, dPressure]) array.fill(0);
    const { enthalpyJKg, order, wayOut } = this.state;
    // chords first, whatever their place in the order: one that only begins to flow may run against it
    this.chords.forEach((pipe, i) => {
      const change = chordChanges[i] as number;
      if (change === 0) return;
      dFlow[pipe] = change;
      this.move(this.upstream(pipe), -change, -change * (enthalpyJKg[this.upstream(pipe)] as number));
      this.move(this.downstream(pipe), change, change * (enthalpyJKg[this.upstream(pipe)] as number));
    });
    for (const node of order) this.passOn(node);
    for (let i = order.length - 1; i >= 0; i--) {
      const node = order[i] as number;
      const out = wayOut[node] as number;
      if (out >= 0) dPressure[node] = this.inletChange(out);
    }
  }

  private move(node: number, mass: number, enthalpyFlow: number): void {
    this.dMass[node] = (this.dMass[node] as number) + mass;
    this.dEnthalpyFlow[node] = (this.dEnthalpyFlow[node] as number) + enthalpyFlow;
  }

  private passOn(node: number): void {
    const { enthalpyJKg, flowKgS, massFlowKgS, wayOut } = this.state;
    this.passThroughVessel(node);
    const mass = this.dMass[node] as number;
    const enthalpyFlow = this.dEnthalpyFlow[node] as number;
    if (mass === 0 && enthalpyFlow === 0) return;
    const h = enthalpyJKg[node] as number;
    const passing = massFlowKgS[node] as number;
    const dh = passing > 0 ? (enthalpyFlow - h * mass) / passing : 0;
    this.dEnthalpy[node] = dh;
    const out = wayOut[node] as number;
    if (out < 0) return;
    this.dFlow[out] = mass;
    this.move(this.downstream(out), mass, mass * h);
    if (dh === 0) return;
    const { first, pipes } = this.evaluator.finder.at;
    for (let i = first[node] as number; i < (first[node + 1] as number); i++) {
      const pipe = pipes[i] as number;
      const flow = Math.abs(flowKgS[pipe] as number);
      if (flow > 0 && this.upstream(pipe) === node) this.move(this.downstream(pipe), 0, flow * dh);
    }
  }

  /** d of m (h_g − h)/(h_g − h_l), the liquid that goes on. */
  private passThroughVessel(node: number): void {
    const link = this.evaluator.linkOfOutlet[node] as number;
    const vesselLink = this.evaluator.network.vesselLinks[link];
    if (vesselLink === undefined || this.state.returning[link] === 1) return;
    const { vessel, liquidEnthalpyJKg, vapourEnthalpyJKg } = vesselLink;
    const h = this.state.enthalpyJKg[vessel] as number;
    const mass = this.dMass[vessel] as number;
    const dh = this.dEnthalpy[vessel] as number;
    const passing = this.state.massFlowKgS[vessel] as number;
    if (h <= liquidEnthalpyJKg) this.move(node, mass, mass * h + passing * dh);
    else {
      const drained = (mass * (vapourEnthalpyJKg - h) - passing * dh) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
      this.move(node, drained, drained * liquidEnthalpyJKg);
    }
  }
}
