import { readNetworkFile, type NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { liquidAtTemperature, saturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { ledger, liftProfile, isRefusal, solveNetwork, type SolveOptions, type SolveResult } from './index';

const RULE_PA_M = 11_310.297;
const GRAVITY = 9.80665;

const trap = { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 6e5, loadKgS: 0.05 };
const receiver = { id: 'R1', kind: 'receiver', elevationM: 3, pressurePa: 120_000 };
const riser = { id: 'L1', from: 'T1', to: 'R1', lengthM: 5, insideDiameterM: 0.05 };

function file(parts: Record<string, unknown> = {}): NetworkFile {
  const json = {
    format: 'riseback-network',
    version: 1,
    name: 'Test',
    nodes: [trap, receiver],
    pipes: [riser],
    ...parts,
  };
  const read = readNetworkFile(json);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

function solved(network: NetworkFile, options: Partial<SolveOptions> = {}): SolveResult {
  const outcome = solveNetwork(network, { partial: false, ...options });
  if (isRefusal(outcome)) throw new Error(outcome.problem.detail);
  return outcome;
}

function refusedAt(network: NetworkFile, options: Partial<SolveOptions> = {}) {
  const outcome = solveNetwork(network, { partial: false, ...options });
  if (!isRefusal(outcome)) throw new Error('not refused');
  return outcome.problem.errors;
}

const at = <T extends { readonly id: string }>(elements: readonly T[], id: string): T => {
  const element = elements.find((candidate) => candidate.id === id);
  if (element === undefined) throw new Error(`nothing is called ${id}`);
  return element;
};

describe('static lift', () => {
  const boat = {
    nodes: [trap, { ...receiver, elevationM: 1 }],
    pipes: [
      {
        ...riser,
        lengthM: 20,
        route: [
          { lengthM: 8, riseM: 6 },
          { lengthM: 12, riseM: -5 },
        ],
      },
    ],
  };

  it('is the rule times every rise of a route, falls not credited', () => {
    const { staticPa } = at(solved(file(boat)).traps, 'T1');
    expect(relativeError(staticPa, 6 * RULE_PA_M)).toBeLessThan(1e-9);
  });

  it('credits falls by dropCredit with no more than the liquid’s weight, whatever the rule', () => {
    const { staticPa } = at(solved(file({ ...boat, method: { dropCredit: 0.5 } })).traps, 'T1');
    // boiling water at 1.2 bar takes 0.0010473 m³/kg (steam tables), 0.3 % less at the 0.97 bar of the fall's upper end
    expect(relativeError(staticPa, 6 * RULE_PA_M - (0.5 * 5 * GRAVITY) / 0.0010473)).toBeLessThan(2e-3);
  });

  it('is half a psi per foot in the hand check, whatever the network’s basis', () => {
    const method = { staticLift: 'liquidFull', liftRulePaM: 9000 };
    const { handCheck, receiverPressurePa } = at(solved(file({ ...boat, method })).traps, 'T1');
    expect(relativeError(handCheck.staticPa, 6 * RULE_PA_M)).toBeLessThan(1e-9);
    expect(handCheck.backPressurePa).toBe(receiverPressurePa + handCheck.staticPa);
  });

  it('of liquid takes its own density where it is colder than boiling', () => {
    const pumped = { id: 'T1', kind: 'pumpedInlet', elevationM: 0, flowKgS: 1e-4, temperatureK: 300 };
    const result = solved(file({ nodes: [pumped, receiver], method: { staticLift: 'liquidFull' } }));
    const { densityKgM3 } = liquidAtTemperature(135_000, 300);
    expect(relativeError(at(result.pipes, 'L1').staticPa, 3 * densityKgM3 * GRAVITY)).toBeLessThan(1e-4);
  });
});

describe('energy', () => {
  const junction = { id: 'J1', kind: 'junction', elevationM: 0 };

  it('mixes by flow', () => {
    const second = { ...trap, id: 'T2', inletPressurePa: 2e5, loadKgS: 0.15 };
    const network = file({
      nodes: [trap, second, junction, receiver],
      pipes: [
        { ...riser, to: 'J1' },
        { ...riser, id: 'L2', from: 'T2', to: 'J1' },
        { ...riser, id: 'L3', from: 'J1' },
      ],
    });
    const expected =
      (0.05 * saturationState(6e5).liquidEnthalpyJKg + 0.15 * saturationState(2e5).liquidEnthalpyJKg) / 0.2;
    expect(relativeError(at(solved(network).nodes, 'R1').enthalpyJKg, expected)).toBeLessThan(1e-12);
  });

  it('falls with the heat lost, and stops at liquid of ambient temperature', () => {
    const enthalpyAfter = (heatLossWM: number): number =>
      at(solved(file({ pipes: [{ ...riser, heatLossWM }] })).nodes, 'R1').enthalpyJKg;
    const inlet = saturationState(6e5).liquidEnthalpyJKg;
    expect(relativeError(enthalpyAfter(100), inlet - (100 * 5) / 0.05)).toBeLessThan(1e-12);
    // water at 20 °C: 83.9 kJ/kg (steam tables)
    expect(relativeError(enthalpyAfter(50_000), 83_900)).toBeLessThan(1e-3);
  });
});

describe('flash vessel', () => {
  const vessel = { id: 'V1', kind: 'flashVessel', elevationM: 3, pressurePa: 150_000 };
  const network = (changes: object = {}, drain: object = {}) =>
    file({
      nodes: [receiver, trap, { ...vessel, ...changes }],
      // out of order on purpose: the drain stands before what feeds the vessel
      pipes: [
        { ...riser, id: 'L2', from: 'V1', to: 'R1', ...drain },
        { ...riser, to: 'V1' },
      ],
    });

  it('lets its vapour go and sends its liquid on at its own boiling point', () => {
    const result = solved(network());
    const atVessel = saturationState(150_000);
    const x =
      (saturationState(6e5).liquidEnthalpyJKg - atVessel.liquidEnthalpyJKg) /
      (atVessel.vapourEnthalpyJKg - atVessel.liquidEnthalpyJKg);
    expect(relativeError(at(result.nodes, 'V1').quality, x)).toBeLessThan(1e-9);
    expect(relativeError(at(result.pipes, 'L2').massFlowKgS, 0.05 * (1 - x))).toBeLessThan(1e-9);
    expect(relativeError(at(result.nodes, 'R1').enthalpyJKg, atVessel.liquidEnthalpyJKg)).toBeLessThan(1e-12);
  });

  it('ends the walk of what drains into it', () => {
    const { receiverPressurePa, walk } = at(solved(network()).traps, 'T1');
    expect([receiverPressurePa, walk]).toEqual([150_000, ['L1']]);
  });

  it('that cannot drain is named with the pressure it needs', () => {
    const result = solved(network({ elevationM: -1 }));
    const warning = result.warnings.find(({ code }) => code === 'vesselCannotDrain');
    expect([warning?.element, warning?.verdict, warning?.limit]).toEqual(['V1', 'fail', 150_000]);
    expect(warning?.value).toBe(at(result.pipes, 'L2').upstreamPressurePa);
    // raised to the receiver's height it drains
    expect(solved(network()).warnings.filter(({ code }) => code === 'vesselCannotDrain')).toEqual([]);
  });
});

describe('direction', () => {
  const nodes = [
    trap,
    { id: 'J1', kind: 'junction', elevationM: 3 },
    { id: 'J2', kind: 'junction', elevationM: 3 },
    receiver,
  ];
  const line = (middle: object) =>
    file({
      nodes,
      pipes: [
        { ...riser, to: 'J1' },
        { ...riser, id: 'L2', from: 'J2', to: 'J1', ...middle },
        { ...riser, id: 'L3', from: 'J2' },
      ],
    });

  it('against the arrow is negative, and named', () => {
    const result = solved(line({}));
    expect(at(result.pipes, 'L2').massFlowKgS).toBe(-0.05);
    expect(result.warnings.map(({ code, element, verdict }) => [code, element, verdict])).toContainEqual([
      'reversed',
      'L2',
      'watch',
    ]);
  });

  it('against a check valve fails', () => {
    const { warnings } = solved(line({ checkValve: true }));
    expect(warnings.find(({ code }) => code === 'reversed')?.verdict).toBe('fail');
  });

  it('turns a route round with it', () => {
    const route = [
      { lengthM: 2, riseM: 1 },
      { lengthM: 3, riseM: -1 },
    ];
    // the flow meets the fall first, backwards: a rise of 1 m
    expect(relativeError(at(solved(line({ route })).traps, 'T1').staticPa, 4 * RULE_PA_M)).toBeLessThan(1e-9);
  });
});

describe('a pipe that stands still', () => {
  const other = { ...trap, id: 'T2' };
  const network = file({
    nodes: [trap, other, { id: 'J1', kind: 'junction', elevationM: 1 }, receiver],
    pipes: [
      { ...riser, to: 'J1' },
      { ...riser, id: 'L2', from: 'T2', to: 'J1' },
      { ...riser, id: 'L3', from: 'J1' },
    ],
    cases: [{ id: 'c', name: 'One shut off', overrides: [{ node: 'T2', state: 'isolated' }] }],
  });

  it('has its static head and no friction, never NaN, and its isolated trap is not checked', () => {
    const result = solved(network);
    const still = at(result.pipes, 'L2');
    expect([still.massFlowKgS, still.frictionPa, still.flashPa, still.mixtureVelocityMS]).toEqual([0, 0, 0, 0]);
    expect(relativeError(still.staticPa, RULE_PA_M)).toBeLessThan(1e-9);
    const isolated = at(result.traps, 'T2');
    expect([isolated.checks, isolated.notChecked.length]).toEqual([[], 5]);
    expect(JSON.stringify(result)).not.toContain('null');
  });

  it('weighs what cold water weighs in a liquid-full riser', () => {
    const still = at(solved({ ...network, method: { ...network.method, staticLift: 'liquidFull' } }).pipes, 'L2');
    // 998.2 kg/m³ at 20 °C (steam tables)
    expect(relativeError(still.staticPa, 998.2 * GRAVITY)).toBeLessThan(1e-3);
  });
});

describe('operating cases', () => {
  const network = file({
    cases: [
      { id: 'half', name: 'Half', loadFactor: 0.5, inletPressureFactor: 0.8 },
      {
        id: 'own',
        name: 'Own',
        loadFactor: 0.5,
        overrides: [
          { node: 'T1', loadKgS: 0.07, inletPressurePa: 5e5 },
          { node: 'R1', pressurePa: 2e5 },
        ],
      },
    ],
  });

  it('factors work on loads and on gauge pressure', () => {
    const result = solved(network, { caseId: 'half' });
    const { backPressurePa, differentialPa } = at(result.traps, 'T1');
    expect(relativeError(backPressurePa + differentialPa, 101_325 + 0.8 * (6e5 - 101_325))).toBeLessThan(1e-12);
    expect(at(result.nodes, 'T1').massFlowKgS).toBe(0.025);
  });

  it('overrides stand as they are', () => {
    const result = solved(network, { caseId: 'own' });
    const { backPressurePa, differentialPa, receiverPressurePa } = at(result.traps, 'T1');
    expect([at(result.nodes, 'T1').massFlowKgS, receiverPressurePa]).toEqual([0.07, 2e5]);
    expect(relativeError(backPressurePa + differentialPa, 5e5)).toBeLessThan(1e-12);
  });

  it('are the first by default, and the plain network by an empty name', () => {
    expect([solved(network).case, solved(network, { caseId: '' }).case, solved(file()).case]).toEqual(['half', '', '']);
  });
});

describe('what is refused by name', () => {
  it('a case that the file does not have, with those it has', () => {
    expect(refusedAt(file({ cases: [{ id: 'a', name: 'A' }] }), { caseId: 'z' })).toEqual([
      { pointer: '/cases', detail: 'There is no case "z"; there are a.' },
    ]);
  });
});

describe('ledger and lift profile of a trap', () => {
  const network = file({
    nodes: [trap, { id: 'J1', kind: 'junction', elevationM: 4 }, receiver],
    pipes: [
      {
        ...riser,
        to: 'J1',
        tag: 'CR-1',
        lengthM: 10,
        route: [
          { lengthM: 5, riseM: 4.5 },
          { lengthM: 5, riseM: -0.5 },
        ],
      },
      { ...riser, id: 'L2', from: 'J1', lossCoefficient: 2 },
    ],
  });
  const result = solved(network);
  const { backPressurePa, receiverPressurePa, handCheck } = at(result.traps, 'T1');

  it('adds up from the receiver to the trap, line by line', () => {
    const lines = ledger(network, result, 'T1');
    expect(lines.map(({ pipeId }) => pipeId)).toEqual(['L2', 'L1']);
    let running = receiverPressurePa;
    for (const line of lines) {
      running += line.staticPa + line.frictionPa + line.flashPa;
      expect(Math.abs(line.runningPressurePa - running)).toBeLessThan(1e-6);
    }
    expect(lines.at(-1)?.runningPressurePa).toBe(backPressurePa);
    expect(lines.at(-1)?.handCheckRunningPa).toBe(handCheck.backPressurePa);
    expect(lines.map(({ tag, riseM, fallM }) => [tag, riseM, fallM])).toEqual([
      [undefined, 0, 1],
      ['CR-1', 4.5, 0.5],
    ]);
  });

  it('goes from the trap to the receiver, through each bend of the route', () => {
    const points = liftProfile(network, result, 'T1');
    expect(points.map(({ distanceM, elevationM, pipeId }) => [distanceM, elevationM, pipeId])).toEqual([
      [0, 0, 'L1'],
      [5, 4.5, 'L1'],
      [10, 4, 'L1'],
      [15, 3, 'L2'],
    ]);
    expect([points[0]?.pressurePa, points.at(-1)?.pressurePa]).toEqual([backPressurePa, receiverPressurePa]);
    expect(points[2]?.pressurePa).toBe(at(result.nodes, 'J1').pressurePa);
    // all of the lift of the first pipe stands below its bend
    expect((points[0]?.pressurePa ?? NaN) - (points[1]?.pressurePa ?? NaN)).toBeGreaterThan(4.5 * RULE_PA_M);
  });

  it('is empty for a trap that is not there', () => {
    expect([ledger(network, result, 'T9'), liftProfile(network, result, 'T9')]).toEqual([[], []]);
  });
});
