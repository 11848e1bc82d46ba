import { describe, expect, it } from 'vitest';
import { drawnNetwork } from './drawn-network';
import {
  downstreamOf,
  endOfWalk,
  findByTag,
  nearestInDirection,
  nextEntering,
  trapAbove,
  upstreamOf,
} from './navigation';
import { documentOf, sampleDocument, sampleTrap } from './sample-network';

const NETWORK = drawnNetwork(sampleDocument());
const AS_DRAWN = () => false;

describe('nearestInDirection', () => {
  it('goes to the nearest element that way, pipes included', () => {
    expect(nearestInDirection(NETWORK, 'T1', 'down')).toBe('L1');
    expect(nearestInDirection(NETWORK, 'L1', 'down')).toBe('J1');
    expect(nearestInDirection(NETWORK, 'J1', 'right')).toBe('L3');
    expect(nearestInDirection(NETWORK, 'J2', 'up')).toBe('L2');
  });

  it('finds nothing where nothing lies within 45 degrees', () => {
    expect(nearestInDirection(NETWORK, 'R1', 'right')).toBeUndefined();
    const aside = drawnNetwork(documentOf([sampleTrap('A', { x: 0, y: 0 }), sampleTrap('B', { x: 50, y: 51 })]));
    expect(nearestInDirection(aside, 'A', 'right')).toBeUndefined();
    expect(nearestInDirection(aside, 'A', 'down')).toBe('B');
  });

  it('takes the lower id of two at the same distance', () => {
    const tie = drawnNetwork(
      documentOf([
        sampleTrap('M', { x: 0, y: 0 }),
        sampleTrap('Z', { x: 40, y: 20 }),
        sampleTrap('B', { x: 40, y: -20 }),
      ]),
    );
    expect(nearestInDirection(tie, 'M', 'right')).toBe('B');
  });
});

describe('with and against the flow', () => {
  it('goes element to pipe to element', () => {
    expect(['T1', 'L1', 'J1', 'L3', 'J2', 'L4'].map((id) => downstreamOf(NETWORK, id, AS_DRAWN))).toEqual([
      'L1',
      'J1',
      'L3',
      'J2',
      'L4',
      'R1',
    ]);
    expect(downstreamOf(NETWORK, 'R1', AS_DRAWN)).toBeUndefined();
    expect(upstreamOf(NETWORK, 'L4', AS_DRAWN)).toBe('J2');
    expect(upstreamOf(NETWORK, 'J2', AS_DRAWN)).toBe('L2');
  });

  it('goes round the pipes that enter a node', () => {
    expect(nextEntering(NETWORK, 'L2', AS_DRAWN)).toBe('L3');
    expect(nextEntering(NETWORK, 'L3', AS_DRAWN)).toBe('L2');
  });

  it('follows what the solver found where a pipe flows against its arrow', () => {
    const reversed = (id: string) => id === 'L3';
    expect(downstreamOf(NETWORK, 'L3', reversed)).toBe('J1');
    expect(downstreamOf(NETWORK, 'J1', reversed)).toBeUndefined();
    expect(upstreamOf(NETWORK, 'J1', reversed)).toBe('L1');
  });

  it('ends at the receiver and comes back to a trap', () => {
    expect(endOfWalk(NETWORK, 'L1', AS_DRAWN)).toBe('R1');
    expect(endOfWalk(NETWORK, undefined, AS_DRAWN)).toBe('R1');
    expect(trapAbove(NETWORK, 'L4', AS_DRAWN)).toBe('T2');
    expect(trapAbove(NETWORK, 'L3', AS_DRAWN)).toBe('T1');
  });

  it('does not run round a loop for ever', () => {
    const round = (id: string) => id === 'L4';
    expect(endOfWalk(NETWORK, 'J2', round)).toBe('R1');
  });
});

describe('findByTag', () => {
  const elements = [{ id: 'T1', tag: 'TR-101' }, { id: 'T10', tag: 'TR-10' }, { id: 'J1' }];

  it('prefers the whole tag to a beginning, in any case of letters', () => {
    expect(findByTag(elements, 'tr-10')).toBe('T10');
    expect(findByTag(elements, 'TR-1')).toBe('T1');
    expect(findByTag(elements, 'j')).toBe('J1');
    expect(findByTag(elements, 'x')).toBeUndefined();
    expect(findByTag(elements, ' ')).toBeUndefined();
  });
});
