import { describe, expect, it } from 'vitest';
import { applyBatch } from './apply-batch';
import { newElementId, nextOrdinal, removalOps, setOp, withDependents } from './edit-ops';
import { documentOf, pipe, smallJson, trap } from './spec-network';

const { nodes } = smallJson() as { nodes: unknown[] };
const document = documentOf(
  smallJson({
    nodes: [...nodes, trap('T7', { trapModel: 'M1' }), trap('T0042x')],
    pipes: [pipe('L1', 'T1', 'J1'), pipe('L2', 'J1', 'R1'), pipe('L5', 'T7', 'J1')],
    trapModels: [{ id: 'M1', name: 'M' }],
    cases: [{ id: 'design', name: 'Design', overrides: [{ node: 'T1', loadKgS: 1 }, { node: 'T7' }] }],
    gauges: [
      { id: 'G1', pipe: 'L2', distanceM: 1, elevationM: 0 },
      { id: 'G2', node: 'T7', elevationM: 0 },
    ],
  }),
);

describe('a deletion', () => {
  it('takes along the pipes, overrides and gauges of a node', () => {
    expect(withDependents(document, { nodes: ['J1'] })).toEqual({
      nodes: ['J1'],
      pipes: ['L1', 'L2', 'L5'],
      trapModels: [],
      cases: [],
      overrides: [],
      gauges: ['G1'],
    });
    expect(withDependents(document, { nodes: ['T7'] })).toMatchObject({ overrides: ['design/T7'], gauges: ['G2'] });
    expect(withDependents(document, { cases: ['design'] })).toMatchObject({ overrides: ['design/T1', 'design/T7'] });
  });

  it('is always accepted, and a trap outlives its model', () => {
    const all = { nodes: ['J1', 'T1'], trapModels: ['M1'], cases: ['design'] };
    const applied = applyBatch(document, removalOps(document, all));
    expect(applied.ok && [...applied.document.nodes.keys()]).toEqual(['R1', 'T7', 'T0042x']);
    expect(applied.ok && applied.document.nodes.get('T7')?.value).not.toHaveProperty('trapModel');
    expect(applied.ok && applied.document.pipes.size).toBe(0);
  });
});

describe('what comes next', () => {
  it('a new id counts on from the highest number behind its prefix, and past those given out', () => {
    expect(newElementId(document, 'T')).toBe('T8');
    expect(newElementId(document, 'L')).toBe('L6');
    expect(newElementId(document, 'L', ['L6', 'L7'])).toBe('L8');
    expect(newElementId(document, 'P')).toBe('P1');
  });

  it('a new element stands behind the last', () => {
    expect(nextOrdinal(document, 'pipes')).toBe(3);
    expect(nextOrdinal(documentOf(smallJson({ nodes: [], pipes: [] })), 'nodes')).toBe(0);
  });
});

it('setOp leaves out what is absent and throws for an element that is not there', () => {
  expect(setOp(document, 'nodes', 'T1', 'note', 'n')).toStrictEqual({
    op: 'set',
    in: 'nodes',
    id: 'T1',
    key: 'note',
    to: 'n',
  });
  expect(setOp(document, 'nodes', 'T1', 'tag', undefined)).toStrictEqual({
    op: 'set',
    in: 'nodes',
    id: 'T1',
    key: 'tag',
    from: 'TR-1',
  });
  expect(() => setOp(document, 'nodes', 'T9', 'tag', 'x')).toThrow(RangeError);
});
