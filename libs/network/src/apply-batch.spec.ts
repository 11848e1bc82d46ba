import { describe, expect, it } from 'vitest';
import { applyBatch, touchedCollections } from './apply-batch';
import { EditBatch, type EditOp } from './edit-batch';
import { setNetworkOp, setOp } from './edit-ops';
import type { NetworkDocument } from './network-document';
import { documentOf, junction, pipe, smallJson, trap } from './spec-network';

const document = documentOf(
  smallJson({
    trapModels: [{ id: 'M1', name: 'M' }],
    cases: [{ id: 'design', name: 'Design', overrides: [{ node: 'T1', loadKgS: 1 }] }],
    gauges: [{ id: 'G1', pipe: 'L2', distanceM: 1, elevationM: 0 }],
  }),
);

function applied(ops: readonly EditOp[]): { document: NetworkDocument; inverse: EditOp[] } {
  const result = applyBatch(document, ops);
  if (!result.ok) throw new Error(JSON.stringify(result.errors));
  return result;
}

function refusal(ops: readonly EditOp[]): unknown[] {
  const result = applyBatch(document, ops);
  if (result.ok) throw new Error('accepted');
  return result.errors.map(({ opIndex, element, key }) => [opIndex, element, key]);
}

const add = (collection: 'nodes' | 'pipes', value: Record<string, unknown>): EditOp => ({
  op: 'add',
  in: collection,
  ordinal: 9,
  value,
});

describe('an accepted batch', () => {
  it('sets a key and gives back the way there', () => {
    const { document: next, inverse } = applied([setOp(document, 'nodes', 'T1', 'elevationM', 3.048)]);
    expect(next.nodes.get('T1')?.value.elevationM).toBe(3.048);
    expect(document.nodes.get('T1')?.value.elevationM).toBe(0);
    expect(inverse).toEqual([{ op: 'set', in: 'nodes', id: 'T1', key: 'elevationM', from: 3.048, to: 0 }]);
  });

  it('copies only what it touches', () => {
    const { document: next } = applied([setOp(document, 'nodes', 'T1', 'elevationM', 1)]);
    expect(next.pipes).toBe(document.pipes);
    expect(next.nodes.get('J1')).toBe(document.nodes.get('J1'));
  });

  it('an absent key is neither from nor to', () => {
    const { document: next, inverse } = applied([setOp(document, 'nodes', 'J1', 'note', 'steep')]);
    expect(inverse).toStrictEqual([{ op: 'set', in: 'nodes', id: 'J1', key: 'note', from: 'steep' }]);
    const back = applyBatch(next, inverse);
    expect(back.ok && Object.keys(back.document.nodes.get('J1')?.value ?? {})).not.toContain('note');
  });

  it('may pass through what would not do by itself, in any order', () => {
    const { document: next } = applied([
      setOp(document, 'nodes', 'R1', 'vented', undefined),
      setOp(document, 'nodes', 'R1', 'pressurePa', 120_000),
      add('pipes', pipe('L3', 'T2', 'J1')),
      add('nodes', trap('T2', { trapType: 'invertedBucket' })),
    ]);
    expect(next.nodes.get('R1')?.value).toEqual({ id: 'R1', kind: 'receiver', elevationM: 3, pressurePa: 120_000 });
    expect(next.nodes.get('T2')).toMatchObject({ ordinal: 9, value: { peakFactor: 2 } });
  });

  it('a removed default comes back, and the inverse knows what stood there', () => {
    const first = applied([setOp(document, 'pipes', 'L1', 'lossCoefficient', 5)]).document;
    const second = applyBatch(first, [setOp(first, 'pipes', 'L1', 'lossCoefficient', undefined)]);
    expect(second.ok && second.document.pipes.get('L1')?.value.lossCoefficient).toBe(0);
    expect(second.ok && second.inverse).toEqual([
      { op: 'set', in: 'pipes', id: 'L1', key: 'lossCoefficient', from: 0, to: 5 },
    ]);
  });

  it('sets what belongs to the network itself', () => {
    const { document: next } = applied([setNetworkOp(document, 'method', { ...document.method, dropCredit: 0.5 })]);
    expect(next.method.dropCredit).toBe(0.5);
  });
});

describe('a refused batch', () => {
  it('starts from another value than the present one', () => {
    expect(refusal([{ op: 'set', in: 'nodes', id: 'T1', key: 'elevationM', from: 1, to: 2 }])).toEqual([
      [0, 'T1', 'elevationM'],
    ]);
    expect(refusal([{ op: 'set', in: 'nodes', id: 'T1', key: 'tag', to: 'x' }])).toEqual([[0, 'T1', 'tag']]);
    expect(refusal([{ op: 'set', in: 'network', key: 'name', from: 'Other', to: 'x' }])).toEqual([
      [0, undefined, 'name'],
    ]);
  });

  it('touches what is not there, or adds what is', () => {
    expect(refusal([{ op: 'remove', in: 'pipes', id: 'L9' }, add('nodes', junction('J1'))])).toEqual([
      [0, 'L9', undefined],
      [1, 'J1', undefined],
    ]);
  });

  it('changes an id, a kind or the node of an override', () => {
    const ops: EditOp[] = [
      setOp(document, 'nodes', 'T1', 'id', 'T9'),
      setOp(document, 'nodes', 'T1', 'kind', 'junction'),
      setOp(document, 'overrides', 'design/T1', 'node', 'J1'),
    ];
    expect(refusal(ops).length).toBe(3);
  });

  it('leaves an element out of shape, at the operation that did it', () => {
    const ops = [
      setOp(document, 'nodes', 'T1', 'elevationM', 1),
      setOp(document, 'nodes', 'T1', 'loadKgS', -1),
      setOp(document, 'nodes', 'T1', '__proto__', {}),
      setOp(document, 'pipes', 'L1', 'insideDiameterM', undefined),
    ];
    expect(refusal(ops)).toEqual([
      [1, 'T1', 'loadKgS'],
      [2, 'T1', '__proto__'],
      [3, 'L1', undefined],
    ]);
  });

  it('gives a node the id of a pipe', () => {
    expect(refusal([add('nodes', junction('L1'))])).toEqual([[0, 'L1', 'id']]);
  });

  it('refers to what is not there', () => {
    expect(
      refusal([
        add('pipes', pipe('L3', 'T1', 'T9')),
        setOp(document, 'nodes', 'T1', 'trapModel', 'M9'),
        { op: 'add', in: 'overrides', id: 'gone/T1', ordinal: 0, value: { node: 'T1' } },
        { op: 'add', in: 'overrides', id: 'design/R1', ordinal: 0, value: { node: 'J1' } },
        { op: 'add', in: 'overrides', id: 'design/J1', ordinal: 0, value: { node: 'J1', loadKgS: 1 } },
      ]),
    ).toEqual([
      [0, 'L3', 'to'],
      [1, 'T1', 'trapModel'],
      [2, 'gone/T1', undefined],
      [3, 'design/R1', 'node'],
      [4, 'design/J1', 'loadKgS'],
    ]);
  });

  it('removes what others refer to', () => {
    const withModel = applied([setOp(document, 'nodes', 'T1', 'trapModel', 'M1')]).document;
    const removal = (collection: 'nodes' | 'pipes' | 'trapModels' | 'cases', id: string): EditOp => ({
      op: 'remove',
      in: collection,
      id,
    });
    for (const [collection, id] of [
      ['nodes', 'T1'],
      ['pipes', 'L2'],
      ['trapModels', 'M1'],
      ['cases', 'design'],
    ] as const) {
      expect(applyBatch(withModel, [removal(collection, id)]), id).toMatchObject({ ok: false });
    }
  });

  it('puts a node of another kind where a case still changes the old one', () => {
    expect(refusal([{ op: 'remove', in: 'nodes', id: 'T1' }, add('nodes', junction('T1'))])).toEqual([
      [1, 'T1', 'kind'],
    ]);
  });
});

describe('the schema of a batch', () => {
  const batch = (op: unknown): unknown => ({
    batchId: '7e1bfa8c-2a6c-4d2e-9d0c-0a1b2c3d4e5f',
    label: 'move',
    ops: [op],
  });

  it('takes the three operations', () => {
    for (const op of [
      add('nodes', junction('J9')),
      ...[{ op: 'remove', in: 'nodes', id: 'J9' }],
      setNetworkOp(document, 'name', 'x'),
    ]) {
      expect(EditBatch.safeParse(batch(op)).success).toBe(true);
    }
  });

  it('refuses values nested without end instead of exhausting the stack', () => {
    const deep: unknown = JSON.parse(`${'['.repeat(100_000)}${']'.repeat(100_000)}`);
    expect(EditBatch.safeParse(batch({ op: 'set', in: 'nodes', id: 'T1', key: 'note', to: deep })).success).toBe(false);
    expect(EditBatch.safeParse(batch(add('nodes', { id: 'T1', deep }))).success).toBe(false);
  });
});

it('touchedCollections names what needs a permission', () => {
  const ops: EditOp[] = [setNetworkOp(document, 'name', 'x'), { op: 'remove', in: 'gauges', id: 'G1' }];
  expect([...touchedCollections(ops)]).toEqual(['network', 'gauges']);
});

it('one operation on 2,000 elements costs well under 5 ms', () => {
  const nodes = Array.from({ length: 1_000 }, (_, i) => junction(`J${i}`));
  const pipes = Array.from({ length: 999 }, (_, i) => pipe(`L${i}`, `J${i + 1}`, `J${i}`));
  const large = documentOf(smallJson({ nodes, pipes }));
  const started = Date.now();
  for (let i = 0; i < 200; i++) applyBatch(large, [setOp(large, 'pipes', `L${i}`, 'lengthM', 1)]);
  expect((Date.now() - started) / 200).toBeLessThan(5);
});
