import {
  bandsOfTrap,
  credibleAtEnd,
  credibleUpPipe,
  spreadAtEnd,
  spreadUpPipe,
  type BandStep,
  type CrediblePressures,
  type SpreadPressures,
  type TrapBands,
} from './bands';
import type { AverageRun, OwnRun } from './coincidence';
import { contendersOf, type Contenders } from './contenders';
import { ElementFailure } from './element-failure';
import type { PipeFlow } from './flow-and-energy';
import { networkState } from './network-state';
import type { PieceEnd } from './pipe-result';
import { flowInPipe } from './pressure-walk';
import { stepsFrom } from './steps-of-walk';

/** A solved network whose bands are asked for. */
export interface SolvedRun extends AverageRun {
  /** By pipe: how the flow stands at the ends of its pieces; undefined where nothing was marched. */
  readonly ends: readonly (readonly PieceEnd[] | undefined)[];
  readonly ownRuns: ReadonlyMap<number, OwnRun>;
}

/**
 * Both bands of every trap that reaches a node of fixed pressure, by node index.
 * A tree is walked once with all methods side by side. A network with meshes is solved anew by each method of the spread, since flows
 * divide otherwise by each; its credible band keeps the chosen method's flows. A trap with a run of its own has its bands along its
 * walk with the flows of that run. Live steam of open traps stays that of the chosen method.
 */
export function networkBands(run: SolvedRun): ReadonlyMap<number, TrapBands> {
  const contenders = contendersOf(run.prepared.file.method, run.march.tolerancePa);
  const { tree, walk } = run.state;
  const meshed = tree.chords.length > 0;
  const spreads = meshed ? spreadsOfMeshes(run, contenders) : undefined;
  const spreadPa = new Array<SpreadPressures | undefined>(tree.nodeCount);
  const credible = new Array<CrediblePressures | undefined>(tree.nodeCount);
  const bands = new Map<number, TrapBands>();
  for (const index of tree.downstreamFirst) {
    const pipe = tree.outPipe[index] as number;
    const chosenPa = walk.pressurePa[index] as number;
    if (pipe === -1) {
      spreadPa[index] = spreadAtEnd(contenders, chosenPa);
      credible[index] = credibleAtEnd(chosenPa);
      continue;
    }
    const own = run.ownRuns.get(index);
    if (own !== undefined) {
      bands.set(index, bandsAlong(run, contenders, index, own));
      continue;
    }
    const step = stepOf(run, pipe);
    const below = tree.drainsTo[index] as number;
    const belowSpread = spreadPa[below];
    const belowCredible = credible[below];
    if (step === undefined || belowSpread === undefined || belowCredible === undefined) continue;
    const spreadHere = spreads?.map((pressures) => pressures?.[index]) ?? spreadUpPipe(contenders, step, belowSpread);
    const credibleHere = credibleUpPipe(contenders, step, belowCredible, chosenPa - (walk.pressurePa[below] as number));
    spreadPa[index] = spreadHere;
    credible[index] = credibleHere;
    if (run.nodes[index]?.kind === 'trap')
      bands.set(index, bandsOfTrap(contenders, spreadHere, credibleHere, chosenPa));
  }
  return bands;
}

/** By contender of the spread: pressures by node; undefined where it has no solution. */
function spreadsOfMeshes(run: SolvedRun, { spread }: Contenders): readonly (Float64Array | undefined)[] {
  return spread.map(({ method }) => {
    try {
      return networkState(run.prepared, run.nodes, { ...run.march, method, undivided: true, onGradient: undefined })
        .walk.pressurePa;
    } catch (error) {
      if (error instanceof ElementFailure) return undefined;
      throw error;
    }
  });
}

function bandsAlong(run: SolvedRun, contenders: Contenders, trap: number, own: OwnRun): TrapBands {
  const { tree, walk } = run.state;
  const endPa = walk.pressurePa[tree.endOfWalk[trap] as number] as number;
  let spreadPa = spreadAtEnd(contenders, endPa);
  let credible = credibleAtEnd(endPa);
  const steps = stepsFrom(tree, trap);
  for (let i = steps.length - 1; i >= 0; i--) {
    const { node, pipe } = steps[i] as { node: number; pipe: number };
    const step = stepOf(run, pipe, own.flows[i]);
    if (step === undefined) continue;
    const risePa = (walk.pressurePa[node] as number) - (walk.pressurePa[tree.drainsTo[node] as number] as number);
    spreadPa = spreadUpPipe(contenders, step, spreadPa);
    credible = credibleUpPipe(contenders, step, credible, risePa);
  }
  return bandsOfTrap(contenders, spreadPa, credible, own.backPressurePa);
}

function stepOf({ prepared, state, ends }: SolvedRun, pipe: number, ownFlow?: PipeFlow): BandStep | undefined {
  const geometry = prepared.geometries[pipe];
  const endsOfPipe = ends[pipe];
  if (geometry === undefined || endsOfPipe === undefined) return undefined;
  const flow = ownFlow ?? flowInPipe(state.tree, pipe, geometry, state.flows);
  return { geometry, flow, withArrow: state.tree.arrow[pipe] === 1, ends: endsOfPipe };
}
