import type { PipeResult } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { colourScale } from '@riseback/figures';
import { drawnNetwork } from './drawn-network';
import { pipeView, type PipeView } from './element-views';
import { sampleDocument } from './sample-network';

const units = { system: 'si', atmosphericPressurePa: 101_325 } as const;
const RESULT: PipeResult = {
  id: 'L4',
  massFlowKgS: 0.1,
  upstreamPressurePa: 200_000,
  downstreamPressurePa: 101_325,
  staticPa: 0,
  frictionPa: 0,
  flashPa: 98_675,
  upstreamQuality: 0.1,
  downstreamQuality: 0.12,
  liquidVelocityMS: 1,
  mixtureVelocityMS: 100,
};

/** L4 runs level from J2 at x = 200 to the receiver at x = 400. */
function viewOf(result: PipeResult): PipeView | null {
  const network = drawnNetwork(sampleDocument());
  const drawn = network.pipes.get('L4');
  const results = {
    traps: new Map(),
    nodes: new Map(),
    pipes: new Map([['L4', result]]),
    warnings: new Map(),
    isolated: new Set<string>(),
    caseNameOf: () => '',
  };
  return drawn === undefined
    ? null
    : pipeView(drawn, network, results, colourScale('pressure', [], units), units, false);
}

describe('pipeView', () => {
  it('bars a choked outlet before the receiver, at the end to which the flow goes', () => {
    expect(viewOf({ ...RESULT, choked: true })?.choked).toMatchObject({ x: 342, y: 100 });
    expect(viewOf({ ...RESULT, choked: true, massFlowKgS: -0.1 })?.choked).toMatchObject({ x: 258, y: 100 });
    expect(viewOf({ ...RESULT, choked: false })?.choked).toBeNull();
  });
});
