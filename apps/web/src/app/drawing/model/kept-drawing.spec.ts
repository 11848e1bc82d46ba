import { applyBatch, type EditOp, type NetworkDocument } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { type DrawnNetwork, drawnNetwork } from './drawn-network';
import { keptDrawing } from './kept-drawing';
import { sampleDocument } from './sample-network';

function afterEdit(document: NetworkDocument, op: EditOp): { before: DrawnNetwork; kept: DrawnNetwork } {
  const applied = applyBatch(document, [op]);
  if (!applied.ok) throw new Error('the edit was refused');
  const before = drawnNetwork(document);
  const now = drawnNetwork(applied.document);
  const kept = keptDrawing(now, before);
  expect(kept).toEqual(now);
  return { before, kept };
}

describe('keptDrawing', () => {
  it('keeps every object but that of the element that was edited, and all pipes where none is drawn otherwise', () => {
    const { before, kept } = afterEdit(sampleDocument(), {
      op: 'set',
      in: 'nodes',
      id: 'T1',
      key: 'elevationM',
      from: 1.2192,
      to: 2,
    });
    expect(kept.nodes.get('T1')).not.toBe(before.nodes.get('T1'));
    expect(kept.nodes.get('T2')).toBe(before.nodes.get('T2'));
    expect(kept.pipes).toBe(before.pipes);
  });

  it('draws the pipes of a node that was moved anew, and no others', () => {
    const { before, kept } = afterEdit(sampleDocument(), {
      op: 'set',
      in: 'nodes',
      id: 'T1',
      key: 'position',
      from: { x: 0, y: 0 },
      to: { x: 0, y: -40 },
    });
    expect(kept.pipes.get('L1')).not.toBe(before.pipes.get('L1'));
    expect(kept.pipes.get('L2')).toBe(before.pipes.get('L2'));
  });
});
