import { applyBatch, emptyDocument, type PipeRun } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { trialDocument } from '../testing/trial-document';
import { arrangingOps, newlyJoined, placesBelow } from './new-places';

const document = trialDocument();

function pipe(id: string, from: string, to: string): PipeRun {
  const rest = { roughnessM: 0, fittings: [], lossCoefficient: 0, heatLossWM: 0, checkValve: false };
  return { id, from, to, lengthM: 1, size: { nps: '1', schedule: '80' }, ...rest };
}

describe('places for pasted elements', () => {
  it('are apart, in rows, below all that is drawn', () => {
    const [first, second, ...rest] = placesBelow(emptyDocument('New'), 40);
    expect(first).toEqual({ x: 0, y: 0 });
    expect(second?.y).toBe(0);
    expect(new Set([first, second, ...rest].map((at) => JSON.stringify(at))).size).toBe(40);
    const applied = applyBatch(document, [
      { op: 'set', in: 'nodes', id: 'R1', key: 'position', to: { x: 100, y: 5_005 } },
    ]);
    if (!applied.ok) throw new Error('refused');
    for (const { y } of placesBelow(applied.document, 10)) expect(y).toBeGreaterThan(5_005);
  });

  it('along new pipes are given only to what had no pipe yet', () => {
    const pipes = [pipe('X1', 'T2', 'J1'), pipe('X2', 'P1', 'V1')];
    expect(newlyJoined(document, pipes).map(({ id }) => id)).toEqual(['T2', 'V1', 'P1']);
    const placed = placesBelow(document, document.nodes.size);
    const here = applyBatch(
      document,
      [...document.nodes.keys()].map((id, i) => ({
        op: 'set' as const,
        in: 'nodes' as const,
        id,
        key: 'position',
        to: placed[i],
      })),
    );
    if (!here.ok) throw new Error('refused');
    const moved = arrangingOps(here.document, pipes).flatMap((op) => (op.op === 'set' && 'id' in op ? [op.id] : []));
    expect(moved.sort()).toEqual(['P1', 'T2', 'V1']);
  });
});
