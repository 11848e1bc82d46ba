import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';
import { found, networkFile, solved, trapOf } from '../fixtures/solver/small-networks';

const BAR_PA = 1e5;
/** Share of the difference over the line: asked for of the same model marched by somebody else. */
const WITHIN = 1e-3;
/** The integrator's own allowance, for lines that lose next to nothing. */
const MARCH_PA = 0.1;

const HOMOGENEOUS = { friction: 'homogeneous', staticLift: 'twoPhase', voidFraction: 'homogeneous', dropCredit: 1 };
const DRIFT_FLUX = { staticLift: 'twoPhase', voidFraction: 'rouhaniAxelsson', dropCredit: 1, acceleration: false };
const METHODS: readonly (readonly [column: string, method: object])[] = [
  ['homogeneous', { ...HOMOGENEOUS, acceleration: false }],
  ['accelerated', { ...HOMOGENEOUS, acceleration: true }],
  ['mullerSteinhagenHeck', { ...DRIFT_FLUX, friction: 'mullerSteinhagenHeck' }],
  ['friedel', { ...DRIFT_FLUX, friction: 'friedel' }],
  ['liquidFull', { ...HOMOGENEOUS, staticLift: 'liquidFull', acceleration: false }],
  ['noCredit', { ...HOMOGENEOUS, dropCredit: 0, acceleration: false }],
];

const statics = new Map(readFigures('../solver/flashing-lines-static.csv').map((row) => [row('id'), row]));
const lines = readFigures('flashing-lines.csv').map((row) => {
  const id = row('id');
  return { id, row: (column: string) => (column in { liquidFull: 0, noCredit: 0 } ? statics.get(id) : row)?.(column) };
});

// Independent marches of the same models; see the fixtures’ heads.
describe.each(METHODS)('a trap behind a sloped flashing line, %s', (column, method) => {
  it.each(lines)('line $id', ({ row }) => {
    const receiverPa = Number(row('receiverBar')) * BAR_PA;
    const lengthM = Number(row('lengthM'));
    const file = networkFile({
      method,
      nodes: [
        {
          id: 'T1',
          kind: 'trap',
          elevationM: 0,
          inletPressurePa: Number(row('trapInletBar')) * BAR_PA,
          loadKgS: Number(row('flowKgH')) / 3600,
        },
        { id: 'R1', kind: 'receiver', elevationM: Number(row('riseM')), pressurePa: receiverPa },
      ],
      pipes: [
        {
          id: 'L1',
          from: 'T1',
          to: 'R1',
          lengthM,
          insideDiameterM: Number(row('boreMm')) / 1000,
          roughnessM: Number(row('roughnessM')),
        },
      ],
    });
    const trap = trapOf(solved(file), 'T1');
    const expectedPa = Number(row(column)) * BAR_PA;
    const allowedPa = WITHIN * Math.abs(expectedPa - receiverPa) + MARCH_PA;
    expect(Math.abs(trap.backPressurePa - expectedPa)).toBeLessThan(allowedPa);
    const partsPa = trap.receiverPressurePa + trap.staticPa + trap.frictionPa + trap.flashPa;
    expect(Math.abs(trap.backPressurePa - partsPa)).toBeLessThan(1e-6);
  });
});

interface TreeFigures {
  readonly id: string;
  readonly receiver: { readonly p_bar_abs: number };
  readonly roughness_m: number;
  readonly pipes: readonly {
    readonly id: string;
    readonly from: string;
    readonly to: string;
    readonly L_m: number;
    readonly ID_mm: number;
    readonly rise_m: number;
  }[];
  readonly traps: readonly { readonly node: string; readonly p_inlet_bar_abs: number; readonly m_kgh: number }[];
  readonly expected_HEM_McAdams_no_acceleration: {
    readonly pipes: Readonly<Record<string, { readonly x_out: number; readonly v_out_ms: number }>>;
    readonly nodes: Readonly<Record<string, number>>;
  };
}

// Trees of traps on one return: an independent integration (Runge-Kutta, relative 1e-9) with independently computed IAPWS-IF97 properties; see
// the fixture’s head.
const { cases } = JSON.parse(
  readFileSync(new URL('../fixtures/solver/flashing-trees.json', import.meta.url), 'utf8'),
) as { cases: readonly TreeFigures[] };

describe.each(cases)('$id', (tree) => {
  const { nodes, pipes } = tree.expected_HEM_McAdams_no_acceleration;
  const receiverPa = tree.receiver.p_bar_abs * BAR_PA;
  const result = solved(networkOf(tree));

  it.each(Object.entries(nodes))('has the pressure of an independent integration at %s', (id, bar) => {
    const allowedPa = WITHIN * Math.abs(bar * BAR_PA - receiverPa) + MARCH_PA;
    expect(Math.abs(found(result.nodes, id).pressurePa - bar * BAR_PA)).toBeLessThan(allowedPa);
  });

  it.each(Object.entries(pipes))('has its flash and velocity at the end of %s', (id, { x_out, v_out_ms }) => {
    const pipe = found(result.pipes, id);
    expect(Math.abs(pipe.downstreamQuality / x_out - 1)).toBeLessThan(WITHIN);
    expect(Math.abs(pipe.mixtureVelocityMS / v_out_ms - 1)).toBeLessThan(WITHIN);
  });
});

function networkOf(tree: TreeFigures) {
  const elevations = new Map([['R', 0]]);
  // pipes stand in the file from the traps down, so the last leads to the receiver
  for (const { from, to, rise_m } of tree.pipes.toReversed()) elevations.set(from, (elevations.get(to) ?? 0) - rise_m);
  const traps = new Map(tree.traps.map((trap) => [trap.node, trap]));
  return networkFile({
    method: { ...HOMOGENEOUS, acceleration: false },
    nodes: [...elevations].map(([id, elevationM]) => {
      const trap = traps.get(id);
      if (id === 'R') return { id, kind: 'receiver', elevationM, pressurePa: tree.receiver.p_bar_abs * BAR_PA };
      if (trap === undefined) return { id, kind: 'junction', elevationM };
      const { p_inlet_bar_abs, m_kgh } = trap;
      return { id, kind: 'trap', elevationM, inletPressurePa: p_inlet_bar_abs * BAR_PA, loadKgS: m_kgh / 3600 };
    }),
    pipes: tree.pipes.map(({ id, from, to, L_m, ID_mm }) => ({
      id,
      from,
      to,
      lengthM: L_m,
      insideDiameterM: ID_mm / 1000,
      roughnessM: tree.roughness_m,
    })),
  });
}
