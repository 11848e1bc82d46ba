import { DRAINING_QUALITY } from '@riseback/hydraulics';
import { compareIds, type NetworkFile } from '@riseback/network';
import { isRefusal, solveNetwork, type SolveResult } from '@riseback/solver';
import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { networkFile, solved, trapOf } from '../fixtures/solver/small-networks';
import { returnNetworks, type NetworkChoices } from './return-networks';

const anyMethod: fc.Arbitrary<NetworkChoices> = fc.record({
  staticLift: fc.constantFrom('rule', 'liquidFull'),
  dropCredit: fc.constantFrom(0, 0.5, 1),
});
/** Steps of the march differ between two solves; the sum of their errors stays well below this. */
const MARCH_SLACK_PA = 1;
/** A few hundred of each property in npm test; with the long forms of loops and extremes, ten thousand networks and more. */
const IS_FULL = process.env.RISEBACK_TEST_FULL === '1';
const RUNS = IS_FULL ? { numRuns: 1500 } : { numRuns: 150, seed: 20_260_301 };
const TIMEOUT_MS = IS_FULL ? 900_000 : 60_000;

// refused trees are rare: else the rest would say little
afterAll(() => {
  expect(drawn.refused).toBeLessThan(0.02 * drawn.trees);
});

describe('trees of returns', { timeout: TIMEOUT_MS }, () => {
  it('contributions add up within 1 Pa at each trap and each pipe, and friction is never negative', () => {
    fc.assert(
      fc.property(returnNetworks(anyMethod), (file) => {
        const { traps, pipes } = solvedTree(file);
        for (const trap of traps) {
          const sum = trap.receiverPressurePa + trap.staticPa + trap.frictionPa + trap.flashPa;
          expect(Math.abs(trap.backPressurePa - sum)).toBeLessThan(1e-3);
        }
        for (const pipe of pipes) {
          const sum = pipe.staticPa + pipe.frictionPa + pipe.flashPa;
          expect(Math.abs(pipe.upstreamPressurePa - pipe.downstreamPressurePa - sum)).toBeLessThan(1e-3);
          expect(pipe.frictionPa).toBeGreaterThanOrEqual(0);
        }
      }),
      RUNS,
    );
  });

  it('mass and energy balance at the receiver but for what the pipes lose', () => {
    fc.assert(
      fc.property(returnNetworks(), (file) => {
        const result = solvedTree(file);
        const load = file.nodes.reduce((sum, node) => sum + (node.kind === 'trap' ? node.loadKgS : 0), 0);
        const receiver = result.nodes.find(({ id }) => id === 'R');
        expect(Math.abs((receiver?.massFlowKgS ?? NaN) - load)).toBeLessThan(1e-12);
        const lostW = file.pipes.reduce((sum, pipe) => sum + pipe.heatLossWM * pipe.lengthM, 0);
        const enteringW = result.nodes.reduce((sum, node) => {
          const isTrap = file.nodes.some(({ id, kind }) => id === node.id && kind === 'trap');
          return sum + (isTrap ? node.massFlowKgS * node.enthalpyJKg : 0);
        }, 0);
        const leavingW = (receiver?.massFlowKgS ?? NaN) * (receiver?.enthalpyJKg ?? NaN);
        expect(leavingW).toBeLessThan(enteringW + 1e-3);
        // where a pipe cools to ambient it loses less than its rate
        expect(leavingW).toBeGreaterThan(enteringW - lostW - 1e-3);
      }),
      RUNS,
    );
  });

  it('raising the receiver never lowers a trap', () => {
    fc.assert(
      fc.property(returnNetworks(anyMethod), fc.double({ min: 100, max: 2e5, noNaN: true }), (file, raisePa) => {
        const before = solvedTree(file);
        const after = solved({
          ...file,
          nodes: file.nodes.map((node) =>
            node.kind === 'receiver' ? { ...node, pressurePa: (node.pressurePa ?? NaN) + raisePa } : node,
          ),
        });
        for (const trap of before.traps) {
          expect(trapOf(after, trap.id).backPressurePa).toBeGreaterThan(trap.backPressurePa - MARCH_SLACK_PA);
        }
      }),
      RUNS,
    );
  });

  it('adding load of the same enthalpy never lowers a back pressure', () => {
    fc.assert(
      fc.property(returnNetworks(anyMethod), fc.double({ min: 1, max: 3, noNaN: true }), (file, share) => {
        // all loads alike, so that every mixture keeps its enthalpy; a pipe that loses heat would lose less of it per kilogram
        const adiabatic = { ...file, pipes: file.pipes.map((pipe) => ({ ...pipe, heatLossWM: 0 })) };
        const before = solvedTree(adiabatic);
        const after = solved({ ...adiabatic, nodes: adiabatic.nodes.map((node) => scaled(node, share)) });
        for (const trap of before.traps) {
          expect(trapOf(after, trap.id).backPressurePa).toBeGreaterThan(trap.backPressurePa - MARCH_SLACK_PA);
        }
      }),
      RUNS,
    );
  });

  // Where every pipe is well into flashing. Below x = 0.005 the method itself hands the line over from running full to draining,
  // and hotter condensate may then cost up to the pitch it drains by less (docs/methods/network-walk.md).
  it('adding hotter load to flashing returns never lowers a back pressure', () => {
    fc.assert(
      fc.property(returnNetworks(anyMethod), fc.double({ min: 1e-3, max: 0.1, noNaN: true }), (file, loadKgS) => {
        const headed = withHead(file);
        const before = solvedTree(networkFile(headed));
        fc.pre(before.pipes.every(({ upstreamQuality }) => upstreamQuality > 2 * DRAINING_QUALITY));
        // hotter than any trap of these networks, at the receiver end so that all walks share its way
        const hot = { id: 'HOT', kind: 'trap', elevationM: 0, inletPressurePa: 13e5, loadKgS };
        const lead = { id: 'P-HOT', from: 'HOT', to: 'HEAD', lengthM: 1, insideDiameterM: 0.05 };
        const after = solved(networkFile({ ...headed, nodes: [...headed.nodes, hot], pipes: [...headed.pipes, lead] }));
        for (const trap of before.traps) {
          expect(trapOf(after, trap.id).backPressurePa).toBeGreaterThan(trap.backPressurePa - MARCH_SLACK_PA);
        }
      }),
      RUNS,
    );
  });

  it('the order of elements in the file changes no result, to the bit', () => {
    fc.assert(
      fc.property(returnNetworks(anyMethod), fc.infiniteStream(fc.nat()), (file, dice) => {
        const shuffled = { ...file, nodes: shuffle(file.nodes, dice), pipes: shuffle(file.pipes, dice) };
        expect(sortedResult(shuffled)).toEqual(sortedResult(file));
      }),
      RUNS,
    );
  });

  it('a tenfold tighter march moves no trap by more than 5 Pa', () => {
    fc.assert(
      fc.property(returnNetworks(anyMethod), (file) => {
        const usual = solvedTree(file);
        const tight = solved(file, { marchTolerancePa: 0.01 });
        for (const trap of usual.traps) {
          expect(Math.abs(trapOf(tight, trap.id).backPressurePa - trap.backPressurePa)).toBeLessThan(5);
        }
      }),
      RUNS,
    );
  });
});

const drawn = { trees: 0, refused: 0 };

/**
 * A fall credited in full may pull a vacuum below the steam properties: such a tree is refused by name, with its place, and another is
 * drawn in its stead.
 */
function solvedTree(file: NetworkFile): SolveResult {
  const outcome = solveNetwork(file, { partial: false });
  if (isRefusal(outcome)) throw new Error(`refused: ${outcome.problem.detail}`);
  drawn.trees++;
  if (!outcome.converged) {
    drawn.refused++;
    expect(outcome.problem?.type).toBe('/problems/no-solution');
    expect(outcome.problem?.errors[0]?.pointer).toMatch(/^\/(nodes|pipes)\/\d+$/);
  }
  fc.pre(outcome.converged);
  return outcome;
}

/** The same without heat loss, all of it through one more pipe before the receiver, and each trap hot enough to flash. */
function withHead(file: NetworkFile) {
  const nodes = file.nodes.map((node) =>
    node.kind === 'trap' ? { ...node, inletPressurePa: node.inletPressurePa / 2 + 6e5, subcoolingK: 0 } : node,
  );
  const pipes = file.pipes.map((pipe) => ({ ...pipe, heatLossWM: 0, ...(pipe.to === 'R' ? { to: 'HEAD' } : {}) }));
  return {
    method: file.method,
    nodes: [...nodes, { id: 'HEAD', kind: 'junction', elevationM: 0 }],
    pipes: [...pipes, { id: 'P-HEAD', from: 'HEAD', to: 'R', lengthM: 20, insideDiameterM: 0.06 }],
  };
}

function scaled(node: NetworkFile['nodes'][number], share: number): NetworkFile['nodes'][number] {
  return node.kind === 'trap' ? { ...node, loadKgS: node.loadKgS * share } : node;
}

function shuffle<T>(items: readonly T[], dice: fc.Stream<number>): T[] {
  const rolls = [...dice.take(items.length)];
  return items
    .map((item, i) => ({ item, roll: rolls[i] ?? 0 }))
    .sort((a, b) => a.roll - b.roll)
    .map(({ item }) => item);
}

function sortedResult(file: NetworkFile): object {
  const { nodes, pipes, traps } = solvedTree(file);
  const sorted = <T extends { id: string }>(items: readonly T[]): T[] =>
    [...items].sort((a, b) => compareIds(a.id, b.id));
  return { nodes: sorted(nodes), pipes: sorted(pipes), traps: sorted(traps) };
}
