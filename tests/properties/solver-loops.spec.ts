import { compareIds, type NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { isRefusal, solveNetwork, type SolveResult } from '@riseback/solver';
import { saturationPressurePa, saturationState } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { EXTREME, loopedNetworks, USUAL } from './looped-networks';

/** A few hundred in npm test, ten thousand in the long form. */
const IS_FULL = process.env.RISEBACK_TEST_FULL === '1';
const RUNS = IS_FULL ? 5000 : 200;
const TIMEOUT_MS = IS_FULL ? 900_000 : 60_000;
const SEED = 20_260_601;
const LONGEST_MS = 2000;
/** Every mesh closes within this. */
const CLOSED_PA = 1;
/** Mass and energy balance to this share of what passes a node. */
const BALANCE = 1e-9;

/** What a result may be refused for, each by name and with its place. */
const PROBLEMS = ['/problems/no-solution', '/problems/unsolvable-network'];

describe.each([
  ['as plants have them', USUAL],
  ['of extreme sizes and loads', EXTREME],
] as const)('random networks with several ways down, %s', (_name, reach) => {
  it(
    'close every mesh and balance every node, or are refused by name; none hangs, none answers NaN',
    () => {
      let solved = 0;
      fc.assert(
        fc.property(loopedNetworks(reach), (file) => {
          const start = performance.now();
          const outcome = solveNetwork(file, { partial: false });
          expect(performance.now() - start).toBeLessThan(LONGEST_MS);
          if (isRefusal(outcome) || !outcome.converged) {
            const { problem } = outcome;
            expect(PROBLEMS).toContain(problem?.type);
            expect(problem?.errors[0]?.pointer).toMatch(/^\/(nodes|pipes)\/\d+/);
            return;
          }
          solved++;
          expect(JSON.stringify(outcome)).not.toContain('null');
          expectClosed(file, outcome);
          expectBalanced(file, outcome);
          expectLargestOutflows(file, outcome);
        }),
        { numRuns: RUNS, seed: SEED },
      );
      // most of them: else the rest would say little
      expect(solved).toBeGreaterThan(RUNS * 0.6);
    },
    TIMEOUT_MS,
  );
});

/** Each pipe meets the pressures of its two nodes, and its parts add up; a check valve holds. */
function expectClosed(file: NetworkFile, { nodes, pipes, traps }: SolveResult): void {
  const pressurePa = new Map(nodes.map(({ id, pressurePa: pressure }) => [id, pressure]));
  const vessels = new Set(file.nodes.flatMap(({ id, kind }) => (kind === 'flashVessel' ? [id] : [])));
  const drawn = new Map(file.pipes.map((pipe) => [pipe.id, pipe]));
  for (const pipe of pipes) {
    const { from = '', to = '' } = drawn.get(pipe.id) ?? {};
    const [up, down] = pipe.massFlowKgS < 0 ? [to, from] : [from, to];
    // a vessel's leaving pipe reports the pressure that it needs
    if (!vessels.has(up) && pipe.massFlowKgS !== 0) {
      expect(Math.abs(pipe.upstreamPressurePa - (pressurePa.get(up) ?? NaN))).toBeLessThan(CLOSED_PA);
    }
    if (pipe.massFlowKgS !== 0) expect(pipe.downstreamPressurePa).toBe(pressurePa.get(down));
    const sum = pipe.staticPa + pipe.frictionPa + pipe.flashPa;
    expect(Math.abs(pipe.upstreamPressurePa - pipe.downstreamPressurePa - sum)).toBeLessThan(CLOSED_PA);
    expect(pipe.frictionPa).toBeGreaterThanOrEqual(0);
  }
  for (const trap of traps) {
    const sum = trap.receiverPressurePa + trap.staticPa + trap.frictionPa + trap.flashPa;
    expect(Math.abs(trap.backPressurePa - sum)).toBeLessThan(CLOSED_PA);
  }
}

/** One pipe by its flow: where it begins and ends, and how much runs. */
interface Run {
  readonly id: string;
  readonly up: string;
  readonly down: string;
  readonly flow: number;
  readonly lostW: number;
}

function runsOf(file: NetworkFile, { pipes }: SolveResult): Run[] {
  const drawn = new Map(file.pipes.map((pipe) => [pipe.id, pipe]));
  return pipes.flatMap(({ id, massFlowKgS }) => {
    const pipe = drawn.get(id);
    if (pipe === undefined || massFlowKgS === 0) return [];
    const { from, to, heatLossWM, lengthM } = pipe;
    const [up, down] = massFlowKgS < 0 ? [to, from] : [from, to];
    return [{ id, up, down, flow: Math.abs(massFlowKgS), lostW: heatLossWM * lengthM }];
  });
}

/** What comes to a node leaves it, less a vessel's vapour, and brings the energy that the node has. */
function expectBalanced(file: NetworkFile, result: SolveResult): void {
  const results = new Map(result.nodes.map((node) => [node.id, node]));
  const kinds = new Map(file.nodes.map(({ id, kind }) => [id, kind]));
  const coldJKg = saturationState(saturationPressurePa(file.site.ambientTemperatureK)).liquidEnthalpyJKg;
  const [inKgS, outKgS, inW] = [new Map<string, number>(), new Map<string, number>(), new Map<string, number>()];
  const add = (to: Map<string, number>, id: string, value: number): void => void to.set(id, (to.get(id) ?? 0) + value);
  for (const { up, down, flow, lostW } of runsOf(file, result)) {
    const { enthalpyJKg = NaN, pressurePa = NaN } = results.get(up) ?? {};
    const leaves =
      kinds.get(up) === 'flashVessel'
        ? Math.min(enthalpyJKg, saturationState(pressurePa).liquidEnthalpyJKg)
        : enthalpyJKg;
    add(outKgS, up, flow);
    add(inKgS, down, flow);
    add(inW, down, flow * Math.max(leaves - lostW / flow, Math.min(leaves, coldJKg)));
  }
  for (const [id, kind] of kinds) {
    const { massFlowKgS = NaN, enthalpyJKg = NaN, quality = NaN } = results.get(id) ?? {};
    const [entered, left] = [inKgS.get(id) ?? 0, outKgS.get(id) ?? 0];
    if (kind !== 'receiver') {
      const leaving = kind === 'flashVessel' ? massFlowKgS * (1 - quality) : massFlowKgS;
      expect(Math.abs(left - leaving)).toBeLessThanOrEqual(BALANCE * massFlowKgS);
    }
    if (kind === 'trap' || kind === 'pumpedInlet' || entered === 0) continue;
    expect(Math.abs(entered - massFlowKgS)).toBeLessThanOrEqual(BALANCE * entered);
    expect(relativeError((inW.get(id) ?? NaN) / entered, enthalpyJKg)).toBeLessThan(BALANCE);
  }
}

function expectLargestOutflows(file: NetworkFile, result: SolveResult): void {
  const runs = runsOf(file, result);
  const byId = new Map(runs.map((run) => [run.id, run]));
  const largest = new Map<string, number>();
  for (const { up, flow } of runs) largest.set(up, Math.max(largest.get(up) ?? 0, flow));
  for (const { walk } of result.traps) {
    for (const id of walk) {
      const run = byId.get(id);
      if (run !== undefined) expect(run.flow).toBeGreaterThanOrEqual((largest.get(run.up) ?? NaN) * (1 - BALANCE));
    }
  }
}

describe('the order of elements in the file', () => {
  // the same arithmetic in the same order: sorted by id before anything is added up
  it('changes no result of a network with loops, to the bit', () => {
    fc.assert(
      fc.property(loopedNetworks(USUAL), fc.infiniteStream(fc.nat()), (file, dice) => {
        const shuffled = { ...file, nodes: shuffle(file.nodes, dice), pipes: shuffle(file.pipes, dice) };
        expect(sortedResult(shuffled)).toEqual(sortedResult(file));
      }),
      { numRuns: 60, seed: SEED },
    );
  });
});

function shuffle<T>(items: readonly T[], dice: fc.Stream<number>): T[] {
  const rolls = [...dice.take(items.length)];
  return items
    .map((item, i) => ({ item, roll: rolls[i] ?? 0 }))
    .sort((a, b) => a.roll - b.roll)
    .map(({ item }) => item);
}

function sortedResult(file: NetworkFile): object {
  const outcome = solveNetwork(file, { partial: false });
  if (isRefusal(outcome)) return { refused: outcome.problem.type };
  const sorted = <T extends { id: string }>(items: readonly T[]): T[] =>
    [...items].sort((a, b) => compareIds(a.id, b.id));
  const { converged, nodes, pipes, traps } = outcome;
  return { converged, nodes: sorted(nodes), pipes: sorted(pipes), traps: sorted(traps) };
}
