import type { Position } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { gripsOf, shiftGrip, shiftNodes, withoutBend, withoutBends } from './displacement';
import { drawnNetwork, withDisplaced } from './drawn-network';
import { documentOf, sampleDocument, samplePipe, sampleTrap } from './sample-network';

const NETWORK = drawnNetwork(sampleDocument());
const at = (x: number, y: number): Position => ({ x, y });

/** T1 (0,0) down to a bend (0,60), along to (80,60), down to J1 (80,120). */
const BENT = drawnNetwork(
  documentOf(
    [sampleTrap('T1', at(0, 0)), { id: 'J1', kind: 'junction', elevationM: 0, position: at(80, 120) }],
    [samplePipe('L1', 'T1', 'J1', { bends: [at(0, 60), at(80, 60)] })],
  ),
);
const pipeOf = (network: typeof BENT, id: string) => {
  const pipe = network.pipes.get(id);
  if (pipe === undefined) throw new Error(`no pipe ${id}`);
  return pipe;
};
const pointsAfter = (displaced: Parameters<typeof withDisplaced>[1], network = BENT, id = 'L1') =>
  pipeOf(withDisplaced(network, displaced), id).points;

describe('moving elements', () => {
  it('moves what is moved and leaves everything else the very same', () => {
    const moved = withDisplaced(NETWORK, shiftNodes(NETWORK, ['J1', 'L1', 'unknown'], 40, -20));
    expect(moved.nodes.get('J1')?.at).toEqual(at(40, 80));
    for (const id of ['T1', 'T2', 'J2', 'R1']) expect(moved.nodes.get(id)).toBe(NETWORK.nodes.get(id));
    for (const id of ['L2', 'L4']) expect(moved.pipes.get(id)).toBe(NETWORK.pipes.get(id));
  });

  it('takes the ends of pipes along at right angles', () => {
    expect(pointsAfter(shiftNodes(NETWORK, ['J1'], 40, 0), NETWORK)).toEqual([at(0, 0), at(0, 100), at(40, 100)]);
  });

  it('lets the bend beside a moved end follow in one coordinate only', () => {
    expect(pointsAfter(shiftNodes(BENT, ['T1'], 20, -40))).toEqual([at(20, -40), at(20, 60), at(80, 60), at(80, 120)]);
    expect(pointsAfter(shiftNodes(BENT, ['J1'], 20, 40))).toEqual([at(0, 0), at(0, 60), at(100, 60), at(100, 160)]);
  });

  it('takes all bends of a pipe along whose both ends move', () => {
    expect(pointsAfter(shiftNodes(BENT, ['T1', 'J1'], 20, 20))).toEqual([
      at(20, 20),
      at(20, 80),
      at(100, 80),
      at(100, 140),
    ]);
  });
});

describe('bending pipes', () => {
  it('moves a corner with what adjoins it, and gives a pipe a corner where its end would have to follow', () => {
    const pipe = pipeOf(BENT, 'L1');
    expect(pointsAfter(shiftGrip(pipe, { kind: 'corner', index: 0 }, 20, 20))).toEqual([
      at(0, 0),
      at(20, 0),
      at(20, 80),
      at(80, 80),
      at(80, 120),
    ]);
  });

  it('moves a straight piece across itself, and back into line without a trace', () => {
    const pipe = pipeOf(NETWORK, 'L3');
    const aside = shiftGrip(pipe, { kind: 'piece', index: 0, split: null }, 30, 60);
    const bent = withDisplaced(NETWORK, aside);
    expect(pipeOf(bent, 'L3').points).toEqual([at(0, 100), at(0, 160), at(200, 160), at(200, 100)]);
    const back = shiftGrip(pipeOf(bent, 'L3'), { kind: 'piece', index: 1, split: null }, 0, -60);
    expect(back.bends.get('L3')).toEqual([]);
  });

  it('splits a piece: what lies behind the point moves, what lies before it stays', () => {
    const pipe = pipeOf(NETWORK, 'L3');
    const split = shiftGrip(pipe, { kind: 'piece', index: 0, split: at(100, 100) }, 20, -40);
    expect(split.bends.get('L3')).toEqual([at(120, 100), at(120, 60), at(200, 60)]);
  });

  it('has a straight pipe itself for a grip, else its corners', () => {
    expect(gripsOf(pipeOf(NETWORK, 'L3'))).toEqual([{ kind: 'piece', index: 0, split: null }]);
    expect(gripsOf(pipeOf(BENT, 'L1')).map((grip) => grip.kind)).toEqual(['corner', 'corner']);
  });

  it('takes a bend out, or says that it cannot', () => {
    const short = withoutBend(BENT, pipeOf(BENT, 'L1'), 0);
    expect(short && pointsAfter(short)).toHaveLength(3);
    const straight = withoutBends(pipeOf(BENT, 'L1'));
    const bent = withDisplaced(BENT, straight);
    expect(withoutBend(bent, pipeOf(bent, 'L1'), 0)).toBeNull();
  });
});
