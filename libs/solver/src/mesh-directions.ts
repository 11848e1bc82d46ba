import { pipesAtNode, type MeshNetwork, type PipesAtNode } from './mesh-network';

/** Which way everything flows. */
export interface MeshDirections {
  /** All nodes, each before those that it flows to; nodes without flow stand anywhere. */
  readonly order: Int32Array;
  /** Pipes whose flow was taken back because it went round in a circle. */
  readonly circled: readonly number[];
  /** By vessel link: 1 where the vessel's liquid comes back to it, so that `order` cannot have it before its outlet. */
  readonly returning: Uint8Array;
}

/** Finds directions again and again in one network. */
export class DirectionFinder {
  readonly at: PipesAtNode;
  private readonly linkOfOutlet: Int32Array;
  private readonly linksOfVessel: number[][];

  constructor(private readonly network: MeshNetwork) {
    const { nodeCount, from, to, vesselLinks } = network;
    this.at = pipesAtNode(nodeCount, from, to);
    this.linkOfOutlet = new Int32Array(nodeCount).fill(-1);
    this.linksOfVessel = Array.from({ length: nodeCount }, (): number[] => []);
    vesselLinks.forEach(({ vessel, outlet }, link) => {
      this.linkOfOutlet[outlet] = link;
      this.linksOfVessel[vessel]?.push(link);
    });
  }

  /**
   * Orders the nodes by flow. Water that goes round in a circle of pipes is taken back, the least flow of the circle from each:
   * nothing drives it (what weight alone would drive is told from what is left over, see meshes.md).
   * @param flowKgS by pipe, along the arrow; changed where there is a circle
   */
  directions(flowKgS: Float64Array): MeshDirections {
    const returning = new Uint8Array(this.network.vesselLinks.length);
    const circled: number[] = [];
    for (;;) {
      const { order, isOrdered } = this.ordered(flowKgS, returning);
      if (order.length === this.network.nodeCount) return { order: Int32Array.from(order), circled, returning };
      const circle = this.circle(flowKgS, returning, isOrdered);
      const link = circle.find((edge) => edge < 0);
      if (link === undefined) {
        takeBack(circle, flowKgS);
        circled.push(...circle);
      } else returning[-1 - link] = 1;
    }
  }

  /** The upstream end of a pipe that flows. */
  upstream(pipe: number, flowKgS: Float64Array): number {
    const { from, to } = this.network;
    return ((flowKgS[pipe] as number) > 0 ? from[pipe] : to[pipe]) as number;
  }

  downstream(pipe: number, flowKgS: Float64Array): number {
    const { from, to } = this.network;
    return ((flowKgS[pipe] as number) > 0 ? to[pipe] : from[pipe]) as number;
  }

  private ordered(flowKgS: Float64Array, returning: Uint8Array): { order: number[]; isOrdered: Uint8Array } {
    const { nodeCount, vesselLinks } = this.network;
    const waiting = new Int32Array(nodeCount);
    for (let pipe = 0; pipe < flowKgS.length; pipe++) {
      if (flowKgS[pipe] === 0) continue;
      const node = this.downstream(pipe, flowKgS);
      waiting[node] = (waiting[node] as number) + 1;
    }
    vesselLinks.forEach(({ outlet }, link) => {
      if (returning[link] === 0) waiting[outlet] = (waiting[outlet] as number) + 1;
    });
    const order: number[] = [];
    const isOrdered = new Uint8Array(nodeCount);
    for (let node = 0; node < nodeCount; node++) if (waiting[node] === 0) order.push(node);
    const release = (node: number): void => {
      waiting[node] = (waiting[node] as number) - 1;
      if (waiting[node] === 0) order.push(node);
    };
    for (let head = 0; head < order.length; head++) {
      const node = order[head] as number;
      isOrdered[node] = 1;
      for (let i = this.at.first[node] as number; i < (this.at.first[node + 1] as number); i++) {
        const pipe = this.at.pipes[i] as number;
        if (flowKgS[pipe] !== 0 && this.upstream(pipe, flowKgS) === node) release(this.downstream(pipe, flowKgS));
      }
      for (const link of this.linksOfVessel[node] ?? []) {
        if (returning[link] === 0) release((vesselLinks[link] as { outlet: number }).outlet);
      }
    }
    return { order, isOrdered };
  }

  /** Against the flow from any node left over, for each of them is fed by another: sooner or later a node comes again. */
  private circle(flowKgS: Float64Array, returning: Uint8Array, isOrdered: Uint8Array): number[] {
    const placeOnWay = new Map<number, number>();
    const way: number[] = [];
    let node = isOrdered.indexOf(0);
    while (!placeOnWay.has(node)) {
      placeOnWay.set(node, way.length);
      const edge = this.feeder(node, flowKgS, returning, isOrdered);
      way.push(edge);
      node = edge < 0 ? this.vesselOf(-1 - edge) : this.upstream(edge, flowKgS);
    }
    return way.slice(placeOnWay.get(node));
  }

  private vesselOf(link: number): number {
    return (this.network.vesselLinks[link] as { vessel: number }).vessel;
  }

  /** A pipe that feeds the node from another that is left over, or −1 less the vessel link that does. */
  private feeder(node: number, flowKgS: Float64Array, returning: Uint8Array, isOrdered: Uint8Array): number {
    for (let i = this.at.first[node] as number; i < (this.at.first[node + 1] as number); i++) {
      const pipe = this.at.pipes[i] as number;
      if (flowKgS[pipe] === 0 || this.downstream(pipe, flowKgS) !== node) continue;
      if (isOrdered[this.upstream(pipe, flowKgS)] === 0) return pipe;
    }
    const link = this.linkOfOutlet[node] as number;
    if (link >= 0 && returning[link] === 0) return -1 - link;
    throw new Error(`Nothing feeds node ${String(node)} of a circle`);
  }
}

function takeBack(circle: readonly number[], flowKgS: Float64Array): void {
  let least = Infinity;
  for (const pipe of circle) least = Math.min(least, Math.abs(flowKgS[pipe] as number));
  for (const pipe of circle) {
    const flow = flowKgS[pipe] as number;
    // the least becomes zero to the bit, or the circle would be found again
    flowKgS[pipe] = Math.abs(flow) === least ? 0 : flow - Math.sign(flow) * least;
  }
}
