import { describe, expect, it } from 'vitest';
import { treeFlows } from './mesh-division';
import { closeMeshesByNewton } from './mesh-newton';
import type { MeshLaw, MeshNetwork } from './mesh-network';
import { MeshEvaluator } from './mesh-state';

/** Pipes named by their two nodes, with h = K Q|Q|; outflows are free ends of their own, all at one pressure's drop is not asked. */
function squareLaw(resistance: readonly number[]): MeshLaw {
  const none = new Float64Array(resistance.length);
  return {
    inletPressurePa: (pipe, _withArrow, flow, _h, outletPa) => outletPa + (resistance[pipe] ?? NaN) * flow * flow,
    outletEnthalpyJKg: (_pipe, _flow, h) => h,
    rough: { staticWithArrowPa: none, staticAgainstArrowPa: none, resistance: Float64Array.from(resistance) },
  };
}

/**
 * Inflow at A, outflows at C to F. The solver knows sources and fixed pressures, so all runs backwards here: what flows out at a
 * node flows in, and A is the one node of fixed pressure. h = K Q|Q| is odd, so each flow is the printed one the other way round.
 */
function reversedNetwork(names: readonly string[], outflow: Readonly<Record<string, number>>): MeshNetwork {
  const letters = 'ABCDEF';
  const from = Int32Array.from(names, (name) => letters.indexOf(name.charAt(0)));
  const to = Int32Array.from(names, (name) => letters.indexOf(name.charAt(1)));
  const inflowKgS = Float64Array.from(letters, (letter) => outflow[letter] ?? 0);
  const fixedPressurePa = new Float64Array(6).fill(NaN);
  fixedPressurePa[0] = 0;
  const pipe = (name: string): number => names.indexOf(name);
  return {
    nodeCount: 6,
    from,
    to,
    oneWay: new Uint8Array(names.length),
    fixedPressurePa,
    inflowKgS,
    inflowW: inflowKgS.map((flow) => flow * 4e5),
    vesselLinks: [],
    // A; B by AB, C by BC, D by AD, E by BE, F by CF
    startWayOut: Int32Array.of(-1, pipe('AB'), pipe('BC'), pipe('AD'), pipe('BE'), pipe('CF')),
    startOrder: [5, 4, 2, 3, 1, 0],
    ambientEnthalpyJKg: 84e3,
  };
}

// Two looped networks of single-phase flow, h = K Q|Q|, solved by Newton and confirmed by Hardy Cross sweeps to 1e-9: an
// independent computation, not from a book. Nine decimals, hence 1e-8 of the largest flow.
const CASES = [
  {
    id: 'open_loop_1',
    outflow: { C: 2, D: 3, E: 1, F: 4 },
    resistance: [2, 3, 4, 1, 5, 2, 3],
    flow: [5.779331422, 3.052631367, 4.220668578, 2.726700055, 1.052631367, 1.220668578, 2.947368633],
  },
  {
    id: 'open_loop_2',
    outflow: { C: 0.02, D: 0.03, E: 0.01, F: 0.04 },
    resistance: [120, 90, 300, 45, 150, 220, 75],
    flow: [0.060705095, 0.030883109, 0.039294905, 0.029821986, 0.010883109, 0.009294905, 0.029116891],
  },
];
const PIPES = ['AB', 'BC', 'AD', 'BE', 'CF', 'DE', 'EF'];

describe('closing meshes by Newton', () => {
  it.each(CASES)('divides the flow of $id as Hardy Cross does', ({ outflow, resistance, flow }) => {
    const network = reversedNetwork(PIPES, outflow);
    const evaluator = new MeshEvaluator(network, squareLaw(resistance));
    const { converged, state, iterations } = closeMeshesByNewton(evaluator, treeFlows(network, network.inflowKgS), {
      closedPa: 1e-6,
      flowShare: 1e-12,
      maximumIterations: 50,
      stops: new Uint8Array(PIPES.length),
    });
    expect(converged).toBe(true);
    const largest = Math.max(...flow);
    flow.forEach((expected, pipe) => {
      expect(Math.abs((state.flowKgS[pipe] ?? NaN) + expected)).toBeLessThan(1e-8 * largest);
    });
    expect(iterations).toBeLessThan(20);
  });
});
