/** A flash vessel inside a network of meshes: the node that it fills at, and the node from which its liquid goes on. */
export interface VesselLink {
  readonly vessel: number;
  readonly outlet: number;
  /** At the vessel's pressure. */
  readonly liquidEnthalpyJKg: number;
  readonly vapourEnthalpyJKg: number;
}

/**
 * What is left of a network when all is taken away whose flow cannot depend on how meshes divide it. By index, with indices of
 * its own. Any pipe may turn out to flow either way, but for those that are one way.
 */
export interface MeshNetwork {
  readonly nodeCount: number;
  /** By pipe. */
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** By pipe: 1 where nothing can flow against the arrow, for a check valve or because a node of fixed pressure gives nothing. */
  readonly oneWay: Uint8Array;
  /** By node; not a number where the pressure is to be found. */
  readonly fixedPressurePa: Float64Array;
  /** By node: what enters it from outside, sources and branches together. */
  readonly inflowKgS: Float64Array;
  readonly inflowW: Float64Array;
  readonly vesselLinks: readonly VesselLink[];
  /** By node: a pipe by which it can drain, −1 at fixed pressures. These pipes make trees, and respect what is one way. */
  readonly startWayOut: Int32Array;
  /** Nodes, each before the one that it drains to by `startWayOut`. */
  readonly startOrder: readonly number[];
  readonly ambientEnthalpyJKg: number;
}

/** How pressure and enthalpy run along a pipe of a {@link MeshNetwork}. */
export interface MeshLaw {
  /**
   * Pressure at the inlet of a pipe, not a number where the flow cannot be.
   * @param massFlowKgS from 0 up, with the arrow or against it
   */
  inletPressurePa(
    pipe: number,
    withArrow: boolean,
    massFlowKgS: number,
    inletEnthalpyJKg: number,
    outletPressurePa: number,
  ): number;
  outletEnthalpyJKg(pipe: number, massFlowKgS: number, inletEnthalpyJKg: number): number;
  /** The same pipe roughly, for where `inletPressurePa` is not a number. */
  readonly rough: RoughPipes;
}

/** Pipes as a jump at rest and a square law: Δp = static + resistance · m². By pipe. */
export interface RoughPipes {
  readonly staticWithArrowPa: Float64Array;
  readonly staticAgainstArrowPa: Float64Array;
  readonly resistance: Float64Array;
}

/** Pipes at each node, as stretches of one list. */
export interface PipesAtNode {
  readonly first: Int32Array;
  readonly pipes: Int32Array;
}

export function pipesAtNode(nodeCount: number, from: Int32Array, to: Int32Array): PipesAtNode {
  const first = new Int32Array(nodeCount + 1);
  const count = (node: number): void => {
    if (node >= 0) first[node + 1] = (first[node + 1] as number) + 1;
  };
  from.forEach(count);
  to.forEach(count);
  for (let node = 0; node < nodeCount; node++) first[node + 1] = (first[node + 1] as number) + (first[node] as number);
  const next = first.slice();
  const pipes = new Int32Array(first[nodeCount] as number);
  const put = (node: number, pipe: number): void => {
    if (node < 0) return;
    pipes[next[node] as number] = pipe;
    next[node] = (next[node] as number) + 1;
  };
  for (let pipe = 0; pipe < from.length; pipe++) {
    put(from[pipe] as number, pipe);
    put(to[pipe] as number, pipe);
  }
  return { first, pipes };
}
