import type { Position } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { applyBatch, removalOps } from '@riseback/network';
import { bendsBeside, drawnNetwork } from './drawn-network';
import { keepingLanes } from './keep-lanes';
import { setOff } from '@riseback/figures';
import { documentOf, samplePipe } from './sample-network';

const at = (x: number, y: number): Position => ({ x, y });
const ENDS = [
  { id: 'J1', kind: 'junction', elevationM: 0, position: at(0, 0) },
  { id: 'J2', kind: 'junction', elevationM: 0, position: at(200, 0) },
] as const;

describe('parallel pipes', () => {
  it('stand apart, whichever way each runs, and the first keeps its place', () => {
    const pipes = [samplePipe('A', 'J1', 'J2'), samplePipe('B', 'J2', 'J1'), samplePipe('C', 'J1', 'J2')];
    const { pipes: drawn } = drawnNetwork(documentOf(ENDS, pipes));
    expect(drawn.get('A')?.points).toEqual([at(0, 0), at(200, 0)]);
    expect(drawn.get('B')?.points).toEqual([at(200, 0), at(200, 40), at(0, 40), at(0, 0)]);
    expect(drawn.get('C')?.points).toEqual([at(0, 0), at(0, -40), at(200, -40), at(200, 0)]);
  });

  it('stay where they are when the one they stand aside from is deleted', () => {
    const document = documentOf(ENDS, [samplePipe('A', 'J1', 'J2'), samplePipe('B', 'J1', 'J2')]);
    const before = drawnNetwork(document);
    const applied = applyBatch(document, keepingLanes(before, document, removalOps(document, { pipes: ['A'] })));
    if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
    expect(drawnNetwork(applied.document).pipes.get('B')?.points).toEqual(before.pipes.get('B')?.points);
  });

  it('find the first free way for one more', () => {
    const none = drawnNetwork(documentOf(ENDS));
    expect(bendsBeside(none, 'J1', 'J2')).toEqual([]);
    const two = drawnNetwork(documentOf(ENDS, [samplePipe('A', 'J1', 'J2'), samplePipe('B', 'J1', 'J2')]));
    expect(bendsBeside(two, 'J2', 'J1')).toEqual([at(200, 40), at(0, 40)].map(({ x, y }) => at(x, -y)));
  });

  it('keep right angles at corners', () => {
    expect(setOff([at(0, 0), at(0, 100), at(100, 100)], 10)).toEqual([
      at(0, 0),
      at(-10, 0),
      at(-10, 110),
      at(100, 110),
      at(100, 100),
    ]);
  });
});
