import { readNetworkFile, type NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { isRefusal, solveNetwork, type SolveResult } from './index';

const RULE_PA_M = 11_310.297;

const trap = (id: string, loadKgS: number, more: object = {}) => ({
  id,
  kind: 'trap',
  elevationM: 0,
  inletPressurePa: 6e5,
  loadKgS,
  ...more,
});
const junction = (id: string, elevationM = 0) => ({ id, kind: 'junction', elevationM });
const receiver = (id: string, pressurePa = 101_325, elevationM = 0) => ({
  id,
  kind: 'receiver',
  elevationM,
  pressurePa,
});
const pipe = (id: string, from: string, to: string, more: object = {}) => ({
  id,
  from,
  to,
  lengthM: 20,
  insideDiameterM: 0.04,
  ...more,
});

function file(nodes: readonly object[], pipes: readonly object[], more: object = {}): NetworkFile {
  const read = readNetworkFile({ format: 'riseback-network', version: 1, name: 'Test', nodes, pipes, ...more });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

function solve(network: NetworkFile): SolveResult {
  const outcome = solveNetwork(network, { partial: false });
  if (isRefusal(outcome)) throw new Error(outcome.problem.detail);
  return outcome;
}

const at = <T extends { readonly id: string }>(elements: readonly T[], id: string): T => {
  const element = elements.find((candidate) => candidate.id === id);
  if (element === undefined) throw new Error(`nothing is called ${id}`);
  return element;
};

describe('pipes side by side', () => {
  it('that are alike share evenly', () => {
    const nodes = [trap('T', 0.1), junction('A'), receiver('R')];
    const { converged, pipes } = solve(
      file(nodes, [pipe('t', 'T', 'A'), pipe('a', 'A', 'R'), pipe('b', 'A', 'R'), pipe('c', 'A', 'R')]),
    );
    expect(converged).toBe(true);
    for (const id of ['a', 'b', 'c']) expect(relativeError(at(pipes, id).massFlowKgS, 0.1 / 3)).toBeLessThan(1e-9);
  });

  it('the walk follows the largest flow', () => {
    const nodes = [trap('T', 0.1), junction('A'), receiver('R')];
    const { traps } = solve(
      file(nodes, [pipe('t', 'T', 'A'), pipe('a', 'A', 'R'), pipe('b', 'A', 'R', { insideDiameterM: 0.06 })]),
    );
    expect(at(traps, 'T').walk).toEqual(['t', 'b']);
  });
});

describe('a cross pipe between two ways down', () => {
  const nodes = [trap('T1', 0.05), trap('T2', 0.02), junction('A'), junction('B'), receiver('R1'), receiver('R2')];
  const pipes = [pipe('t', 'T1', 'A'), pipe('u', 'T2', 'B'), pipe('a', 'A', 'R1'), pipe('b', 'B', 'R2')];

  it('carries from the higher pressure to the lower', () => {
    const result = solve(file(nodes, [...pipes, pipe('x', 'B', 'A')]));
    // drawn from B to A, but A stands higher
    expect(at(result.pipes, 'x').massFlowKgS).toBeLessThan(0);
    expect(at(result.nodes, 'A').pressurePa).toBeGreaterThan(at(result.nodes, 'B').pressurePa);
    expect(result.warnings.map(({ code, element }) => `${code} ${element}`)).toContain('reversed x');
  });

  it('stands still where everything is even', () => {
    const even = nodes.map((node) => (node.id === 'T2' ? trap('T2', 0.05) : node));
    const result = solve(file(even, [...pipes, pipe('x', 'B', 'A')]));
    expect(Math.abs(at(result.pipes, 'x').massFlowKgS)).toBeLessThan(1e-9);
  });

  it('stands still where the difference does not lift it over its rise, and holds that difference', () => {
    const raised = nodes.map((node) => (node.id === 'B' ? junction('B', 2) : node));
    const result = solve(file(raised, [...pipes, pipe('x', 'A', 'B')]));
    const { massFlowKgS, staticPa, frictionPa, flashPa } = at(result.pipes, 'x');
    const difference = at(result.nodes, 'A').pressurePa - at(result.nodes, 'B').pressurePa;
    expect([massFlowKgS, frictionPa, flashPa]).toEqual([0, 0, 0]);
    expect(staticPa).toBe(difference);
    expect(Math.abs(difference)).toBeLessThan(2 * RULE_PA_M);
  });

  it('gives nothing through a check valve that the pressure beyond holds shut', () => {
    const result = solve(file(nodes, [...pipes, pipe('x', 'B', 'A', { checkValve: true })]));
    expect(at(result.pipes, 'x').massFlowKgS).toBe(0);
    expect(at(result.nodes, 'A').pressurePa).toBeGreaterThan(at(result.nodes, 'B').pressurePa);
    const finding = result.warnings.find(({ code }) => code === 'checkValveShut');
    expect([finding?.element, finding?.verdict]).toEqual(['x', 'watch']);
    // the same valve the other way round lets it pass as if there were none
    const open = solve(file(nodes, [...pipes, pipe('x', 'A', 'B', { checkValve: true })]));
    const none = solve(file(nodes, [...pipes, pipe('x', 'A', 'B')]));
    expect(relativeError(at(open.pipes, 'x').massFlowKgS, at(none.pipes, 'x').massFlowKgS)).toBeLessThan(1e-9);
  });
});

describe('receivers of different pressure', () => {
  const nodes = [trap('T1', 0.05), trap('T2', 0.02), junction('A'), junction('B'), receiver('R1')];
  const pipes = [pipe('t', 'T1', 'A'), pipe('u', 'T2', 'B'), pipe('x', 'A', 'B'), pipe('a', 'A', 'R1')];

  it('are named where the higher would feed the network: a receiver gives nothing', () => {
    const result = solve(file([...nodes, receiver('R2', 150_000)], [...pipes, pipe('b', 'B', 'R2')]));
    expect([result.converged, result.problem?.type]).toEqual([false, '/problems/no-solution']);
    expect(result.problem?.errors).toMatchObject([{ pointer: '/pipes/4' }]);
    expect(result.problem?.detail).toMatch(/R2 .* would feed the network .*check valve/);
  });

  it('are sound with a check valve: then everything goes to the lower', () => {
    const valved = pipe('b', 'B', 'R2', { checkValve: true });
    const result = solve(file([...nodes, receiver('R2', 150_000)], [...pipes, valved]));
    expect(result.converged).toBe(true);
    expect([at(result.nodes, 'R1').massFlowKgS, at(result.nodes, 'R2').massFlowKgS]).toEqual([0.05 + 0.02, 0]);
    const { upstreamPressurePa, downstreamPressurePa, staticPa } = at(result.pipes, 'b');
    expect(upstreamPressurePa).toBe(at(result.nodes, 'B').pressurePa);
    expect(downstreamPressurePa).toBe(150_000);
    expect(staticPa).toBe(upstreamPressurePa - downstreamPressurePa);
  });

  it('are both used where neither is too high', () => {
    const result = solve(file([...nodes, receiver('R2', 101_400)], [...pipes, pipe('b', 'B', 'R2')]));
    expect(at(result.nodes, 'R1').massFlowKgS).toBeGreaterThan(0);
    expect(at(result.nodes, 'R2').massFlowKgS).toBeGreaterThan(0);
  });
});

describe('flash vessels among meshes', () => {
  const vessel = { id: 'V', kind: 'flashVessel', elevationM: 0, pressurePa: 120_000 };
  const nodes = [trap('T', 0.2, { inletPressurePa: 8e5 }), junction('A'), junction('B'), vessel, receiver('R')];
  const around = [pipe('t', 'T', 'A'), pipe('in', 'A', 'V'), pipe('out', 'V', 'B'), pipe('b', 'B', 'R')];

  it('with a pipe around one: the vessel drains what it gets less its vapour', () => {
    const result = solve(file(nodes, [...around, pipe('by', 'A', 'B', { insideDiameterM: 0.02 })]));
    const { massFlowKgS, quality } = at(result.nodes, 'V');
    expect(quality).toBeGreaterThan(0.05);
    expect(at(result.pipes, 'in').massFlowKgS).toBe(massFlowKgS);
    expect(relativeError(at(result.pipes, 'out').massFlowKgS, massFlowKgS * (1 - quality))).toBeLessThan(1e-9);
    const bypass = at(result.pipes, 'by').massFlowKgS;
    expect(relativeError(bypass + massFlowKgS, 0.2)).toBeLessThan(1e-12);
  });

  it('whose liquid would come back to it are named', () => {
    const low = nodes.map((node) => (node.id === 'V' ? { ...vessel, pressurePa: 101_330 } : node));
    const back = around.map((run) => (run.id === 'out' ? pipe('out', 'V', 'A') : run));
    const result = solve(file(low, [...back, pipe('by', 'A', 'B', { insideDiameterM: 0.02 })]));
    expect(result.converged).toBe(false);
    expect(result.problem?.errors).toMatchObject([{ pointer: '/nodes/3' }]);
    expect(result.problem?.detail).toMatch(/liquid of this flash vessel comes back/);
  });
});

describe('water that weight alone would drive round', () => {
  it('is named, not answered', () => {
    // a hot riser and a cold fall side by side, with full credit for the fall
    const nodes = [
      trap('T', 0.05, { subcoolingK: 5, inletPressurePa: 9e5 }),
      { id: 'P', kind: 'pumpedInlet', elevationM: 0, flowKgS: 1e-3, temperatureK: 300 },
      junction('A'),
      junction('B', 8),
      receiver('R', 8e5),
    ];
    const pipes = [
      pipe('t', 'T', 'A'),
      pipe('p', 'P', 'B', { lengthM: 30 }),
      pipe('up', 'A', 'B', { lengthM: 9, insideDiameterM: 0.1 }),
      pipe('down', 'A', 'B', { lengthM: 9, insideDiameterM: 0.1, heatLossWM: 4000 }),
      pipe('r', 'A', 'R'),
    ];
    const outcome = solve(file(nodes, pipes, { method: { staticLift: 'liquidFull', dropCredit: 1 } }));
    expect([outcome.converged, outcome.problem?.errors[0]?.pointer]).toEqual([false, '/pipes/2']);
    expect(outcome.problem?.detail).toMatch(/round in a circle .* own weight/);
  });
});

it('a network in which nothing flows stands still, without NaN', () => {
  const nodes = [junction('A'), junction('B', 2), receiver('R1'), receiver('R2')];
  const result = solve(file(nodes, [pipe('x', 'A', 'B'), pipe('a', 'A', 'R1'), pipe('b', 'B', 'R2')]));
  expect(result.converged).toBe(true);
  expect(result.pipes.map(({ massFlowKgS }) => massFlowKgS)).toEqual([0, 0, 0]);
  expect(JSON.stringify(result)).not.toContain('null');
});
