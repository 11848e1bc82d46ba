import type { AverageRun } from './coincidence';
import type { LimitsInForce } from './check-limits';
import { blankFlow, enthalpyAlong } from './flow-and-energy';
import { temperatureAtK, vapourFraction } from './fluid-state';
import { blankMarch } from './marched-pipes';
import type { NodeQualities } from './node-qualities';
import { checkPipe, type PipeUnderCheck } from './pipe-checks';
import { NO_GEOMETRY } from './pipe-geometry';
import { pipeResult, type PieceEnd, type PipeAfterMarch } from './pipe-result';
import { fillFlow } from './pressure-walk';
import { inletNode, outletNode } from './return-tree';
import type { PipeResult, SolveWarning } from './solve-result';
import { MeetingStreams } from './thermal-shock';
import { blankSaturation, fillSaturation } from '@riseback/steam';

/** What is told of the pipes of a solved network. */
export interface ToldPipes {
  readonly results: readonly PipeResult[];
  readonly warnings: readonly SolveWarning[];
  /** By pipe; of none unless bands are asked for. */
  readonly ends: readonly (readonly PieceEnd[] | undefined)[];
  /** What flows into junctions. */
  readonly streams: MeetingStreams;
  readonly leftOut: readonly string[];
}

type PipeAtHand = {
  -readonly [Key in keyof (PipeAfterMarch & PipeUnderCheck)]: (PipeAfterMarch & PipeUnderCheck)[Key];
};

/** What flows into a pipe, what the march gave for it, and the state at its end: filled in anew for each. */
const flow = blankFlow();
const marched = blankMarch();
const downstream = blankSaturation();

/**
 * @param keepsEnds whether `ends` is asked for
 * @throws ElementFailure where what leaves a pipe is outside the steam properties
 */
export function tellPipes(
  { prepared: { file, geometries }, nodes, state: { tree, flows, walk } }: AverageRun,
  limits: LimitsInForce,
  { quality }: NodeQualities,
  keepsEnds: boolean,
): ToldPipes {
  const results: PipeResult[] = [];
  const warnings: SolveWarning[] = [];
  const ends = new Array<readonly PieceEnd[] | undefined>(keepsEnds ? file.pipes.length : 0);
  const streams = new MeetingStreams(file.nodes.length);
  const leftOut: string[] = [];
  // one record for result and checks of all pipes: made for each, it would be a tenth of what a solve leaves to the garbage collector
  const at: PipeAtHand = {
    pipe: { id: '' },
    index: -1,
    geometry: NO_GEOMETRY,
    marched,
    flow,
    arrow: 0,
    upstreamQuality: NaN,
    downstream,
    ends: [],
    checkValve: false,
    friction: file.method.friction,
    limits,
  };
  file.pipes.forEach((pipe, index) => {
    const geometry = geometries[index];
    if (geometry === undefined || !walk.marched.has(index)) {
      leftOut.push(pipe.id);
      return;
    }
    const below = outletNode(tree, index);
    fillFlow(flow, tree, index, geometry, flows);
    walk.marched.fill(marched, index);
    fillSaturation(downstream, walk.pressurePa[below] as number);
    at.pipe = pipe;
    at.index = index;
    at.geometry = geometry;
    at.arrow = tree.arrow[index] as number;
    at.upstreamQuality = vapourFraction(quality[inletNode(tree, index)] as number);
    at.checkValve = pipe.checkValve;
    if (keepsEnds) ends[index] = at.ends = [];
    const result = pipeResult(at);
    results.push(result);
    if (flow.massFlowKgS > 0 && nodes[below]?.kind === 'junction') {
      streams.add(below, index, temperatureAtK(downstream, enthalpyAlong(flow, geometry.lengthM)));
    }
    for (const warning of checkPipe(result, at)) warnings.push(warning);
  });
  return { results, warnings, ends, streams, leftOut };
}
