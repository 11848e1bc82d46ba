import type { NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import type { SolveResult } from '@riseback/solver';
import { liquidAtEnthalpy, saturationPressurePa, saturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { found, networkFile, solved } from '../fixtures/solver/small-networks';

const TEMPERATURE_K = 293.15;
const BORE_M = 0.05;
const ROUGHNESS_M = 4.57e-5;
const RECEIVER_PA = 120_000;

/**
 * Two meshes of seven pipes between six junctions; what enters at B to F leaves at A through the lead to the receiver.
 *     A ── B ── C
 *     │    │    │
 *     D ── E ── F
 */
const RING = [
  { id: 'AB', from: 'B', to: 'A', lengthM: 40 },
  { id: 'BC', from: 'C', to: 'B', lengthM: 60 },
  { id: 'AD', from: 'D', to: 'A', lengthM: 80 },
  { id: 'BE', from: 'E', to: 'B', lengthM: 25 },
  { id: 'CF', from: 'F', to: 'C', lengthM: 90 },
  { id: 'DE', from: 'E', to: 'D', lengthM: 50 },
  { id: 'EF', from: 'F', to: 'E', lengthM: 70 },
] as const;
const INFLOW_KG_S = { B: 0.1, C: 0.4, D: 0.6, E: 0.2, F: 0.8 } as const;
/** Each mesh: pipes in the sense of the clock, the sign telling whether the arrow runs that way. */
const MESHES: readonly (readonly (readonly [pipe: string, sign: number])[])[] = [
  [
    ['AB', -1],
    ['BE', -1],
    ['DE', 1],
    ['AD', 1],
  ],
  [
    ['BC', -1],
    ['CF', -1],
    ['EF', 1],
    ['BE', 1],
  ],
];

function ring(source: (id: string, flowKgS: number) => object, pipe: object = {}): NetworkFile {
  const inlets = Object.entries(INFLOW_KG_S);
  return networkFile({
    nodes: [
      ...'ABCDEF'.split('').map((id) => ({ id, kind: 'junction', elevationM: 0 })),
      { id: 'R', kind: 'receiver', elevationM: 0, pressurePa: RECEIVER_PA },
      ...inlets.map(([id, flow]) => source(`S${id}`, flow)),
    ],
    pipes: [
      ...RING.map((run) => ({ insideDiameterM: BORE_M, ...run, ...pipe })),
      { id: 'lead', from: 'A', to: 'R', lengthM: 10, insideDiameterM: 0.1 },
      ...inlets.map(([id]) => ({ id: `L${id}`, from: `S${id}`, to: id, lengthM: 2, insideDiameterM: BORE_M })),
    ],
  });
}

describe('a ring of seven pipes that carries cold liquid', () => {
  const result = solved(
    ring((id, flowKgS) => ({ id, kind: 'pumpedInlet', elevationM: 0, flowKgS, temperatureK: TEMPERATURE_K })),
  );

  it('divides as an independent Hardy Cross computation finds', () => {
    const flows = hardyCross();
    const largest = Math.max(...flows.values());
    for (const [id, flow] of flows) {
      expect(Math.abs(found(result.pipes, id).massFlowKgS - flow)).toBeLessThan(1e-6 * largest);
    }
  });

  it('closes each mesh', () => {
    for (const mesh of MESHES) expect(Math.abs(lossAround(mesh, result))).toBeLessThan(1e-3);
  });
});

describe('the same ring with flashing condensate', () => {
  const network = ring((id, loadKgS) => ({
    id,
    kind: 'trap',
    elevationM: 0,
    loadKgS: loadKgS / 4,
    inletPressurePa: 4e5 + loadKgS * 4e5,
  }));
  const result = solved(network);

  it('flashes', () => {
    for (const { id } of RING) expect(found(result.pipes, id).downstreamQuality).toBeGreaterThan(0.01);
  });

  it('closes each mesh within 1 Pa', () => {
    for (const mesh of MESHES) expect(Math.abs(lossAround(mesh, result))).toBeLessThan(1);
    for (const pipe of network.pipes) {
      const { massFlowKgS, upstreamPressurePa, downstreamPressurePa } = found(result.pipes, pipe.id);
      const [up, down] = massFlowKgS < 0 ? [pipe.to, pipe.from] : [pipe.from, pipe.to];
      expect(Math.abs(upstreamPressurePa - found(result.nodes, up).pressurePa)).toBeLessThan(1);
      expect(downstreamPressurePa).toBe(found(result.nodes, down).pressurePa);
    }
  });

  it('balances mass and energy at each node to 1e-9', () => {
    for (const { id, kind } of network.nodes) {
      if (kind !== 'junction') continue;
      let [inKgS, outKgS, inW] = [0, 0, 0];
      for (const pipe of network.pipes) {
        const { massFlowKgS } = found(result.pipes, pipe.id);
        const [up, down] = massFlowKgS < 0 ? [pipe.to, pipe.from] : [pipe.from, pipe.to];
        if (up === id) outKgS += Math.abs(massFlowKgS);
        if (down !== id) continue;
        inKgS += Math.abs(massFlowKgS);
        inW += Math.abs(massFlowKgS) * found(result.nodes, up).enthalpyJKg;
      }
      expect(relativeError(outKgS, inKgS)).toBeLessThan(1e-9);
      expect(relativeError(inW / inKgS, found(result.nodes, id).enthalpyJKg)).toBeLessThan(1e-9);
    }
  });

  it('brings to the receiver what the traps give, with their heat', () => {
    const { massFlowKgS, enthalpyJKg } = found(result.nodes, 'R');
    let [load, heatW] = [0, 0];
    for (const node of network.nodes) {
      if (node.kind !== 'trap') continue;
      load += node.loadKgS;
      heatW += node.loadKgS * saturationState(node.inletPressurePa).liquidEnthalpyJKg;
    }
    expect(relativeError(massFlowKgS, load)).toBeLessThan(1e-12);
    expect(relativeError(enthalpyJKg, heatW / load)).toBeLessThan(1e-9);
  });

  it('gives each trap a walk along the largest outflows that adds up', () => {
    for (const trap of result.traps) {
      const steps = trap.walk.map((id) => found(result.pipes, id));
      const sum = steps.reduce((total, step) => total + step.staticPa + step.frictionPa + step.flashPa, 0);
      expect(Math.abs(trap.receiverPressurePa + sum - trap.backPressurePa)).toBeLessThan(1e-6);
      expect(trap.walk.at(-1)).toBe('lead');
    }
  });
});

/** Pressure lost around a mesh, from the pipes' own figures. */
function lossAround(mesh: readonly (readonly [string, number])[], { pipes }: SolveResult): number {
  return mesh.reduce((sum, [id, sign]) => {
    const { massFlowKgS, upstreamPressurePa, downstreamPressurePa } = found(pipes, id);
    return sum + sign * Math.sign(massFlowKgS) * (upstreamPressurePa - downstreamPressurePa);
  }, 0);
}

/**
 * Hardy Cross (University of Illinois Bulletin 286, 1936): mesh after mesh, the flow around it corrected by its loss over the sum of
 * the losses' slopes, until nothing moves. Darcy–Weisbach with Colebrook–White by its own fixed-point iteration; turbulent
 * throughout, which the test of the Reynolds numbers holds.
 */
function hardyCross(): Map<string, number> {
  // a pumped inlet has the enthalpy h_l(T); over the ring's few kPa density moves by some 1e-6: taken at one pressure within
  const { liquidEnthalpyJKg } = saturationState(saturationPressurePa(TEMPERATURE_K));
  const { densityKgM3, viscosityPaS } = liquidAtEnthalpy(RECEIVER_PA + 5000, liquidEnthalpyJKg);
  const lengthM = new Map<string, number>(RING.map((run) => [run.id, run.lengthM]));
  const areaM2 = (Math.PI * BORE_M ** 2) / 4;
  const lossPa = (id: string, flow: number): number => {
    const Re = (Math.abs(flow) * BORE_M) / (areaM2 * viscosityPaS);
    expect(Re).toBeGreaterThan(2300);
    let root = 7;
    for (let i = 0; i < 60; i++) root = -2 * Math.log10(ROUGHNESS_M / BORE_M / 3.7 + (2.51 / Re) * root);
    const velocityHead = flow ** 2 / (2 * densityKgM3 * areaM2 ** 2);
    return (Math.sign(flow) * (lengthM.get(id) ?? NaN) * velocityHead) / (root ** 2 * BORE_M);
  };
  // any division in balance to begin with: C and F over F, E and D to A
  const { B, C, D, E, F } = INFLOW_KG_S;
  const flows = new Map<string, number>([
    ['CF', F / 3],
    ['EF', (2 * F) / 3],
    ['BC', C + F / 3],
    ['BE', E],
    ['DE', (2 * F) / 3],
    ['AB', B + C + F / 3 + E],
    ['AD', D + (2 * F) / 3],
  ]);
  for (let sweep = 0; sweep < 200; sweep++) {
    for (const mesh of MESHES) {
      let [loss, slope] = [0, 0];
      for (const [id, sign] of mesh) {
        const flow = flows.get(id) ?? NaN;
        loss += sign * lossPa(id, flow);
        slope += (2 * Math.abs(lossPa(id, flow))) / Math.abs(flow);
      }
      for (const [id, sign] of mesh) flows.set(id, (flows.get(id) ?? NaN) - (sign * loss) / slope);
    }
  }
  return flows;
}
