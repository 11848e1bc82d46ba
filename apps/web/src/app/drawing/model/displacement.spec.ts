import { describe, expect, it } from 'vitest';
import { movableBends, shiftBend, shiftNodes } from './displacement';
import { drawnNetwork } from './drawn-network';
import { sampleDocument } from './sample-network';

const DOCUMENT = sampleDocument();
const NETWORK = drawnNetwork(DOCUMENT);

describe('moving', () => {
  it('moves what is moved and nothing else', () => {
    const moved = drawnNetwork(DOCUMENT, shiftNodes(NETWORK, ['J1', 'L1', 'unknown'], 40, -20));
    expect(moved.nodes.get('J1')?.at).toEqual({ x: 40, y: 80 });
    for (const id of ['T1', 'T2', 'J2', 'R1']) expect(moved.nodes.get(id)?.at).toEqual(NETWORK.nodes.get(id)?.at);
  });

  it('takes the ends of pipes along at right angles', () => {
    const moved = drawnNetwork(DOCUMENT, shiftNodes(NETWORK, ['J1'], 40, 0));
    expect(moved.pipes.get('L1')?.points).toEqual([
      { x: 0, y: 0 },
      { x: 0, y: 100 },
      { x: 40, y: 100 },
    ]);
  });

  it('gives a straight pipe its first bend at its middle', () => {
    const pipe = NETWORK.pipes.get('L3');
    expect(pipe && movableBends(pipe)).toEqual([{ x: 100, y: 100 }]);
    expect(pipe && shiftBend(pipe, 0, 0, 60).bends.get('L3')).toEqual([{ x: 100, y: 160 }]);
  });
});
