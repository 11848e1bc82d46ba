import { applyBatch, emptyDocument, type NetworkDocument } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { type Clip, clipText, partOf, readClip } from './clip';
import { clearOffset } from './clear-offset';
import { drawnNetwork } from './drawn-network';
import { pasteOps } from './paste';
import { sampleDocument, samplePipe } from './sample-network';

const LIBRARY = { libraryId: '7b0f6d1e-52a8-4f4e-9a2b-0f1d7c1f6a01', libraryVersion: 2 };

/** The sample with a trap model at T1, a copy from the library. */
function withModel(): NetworkDocument {
  const applied = applyBatch(sampleDocument(), [
    { op: 'add', in: 'trapModels', ordinal: 0, value: { id: 'M1', name: 'Marl B15', ...LIBRARY } },
    { op: 'set', in: 'nodes', id: 'T1', key: 'trapModel', to: 'M1' },
  ]);
  if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
  return applied.document;
}
function clipOf(document: NetworkDocument, ids: readonly string[], cut = false, siteId = 'here'): Clip {
  const read = readClip(clipText({ part: partOf(document, new Set(ids)).part, siteId, cut }));
  if (!read.ok) throw new Error(read.why);
  return read.clip;
}
function pasted(into: NetworkDocument, clip: Clip) {
  const made = pasteOps(into, clip, { x: 40, y: 40 }, 'here');
  const applied = applyBatch(into, made.ops);
  if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
  return { ...made, document: applied.document, inverse: applied.inverse };
}

describe('a copied part', () => {
  it('has the pipes between its elements and says how many it leaves behind', () => {
    const { part, leftBehind } = partOf(sampleDocument(), new Set(['T1', 'J1', 'L4']));
    expect([...part.nodes.keys()]).toEqual(['T1', 'J1']);
    expect([...part.pipes.keys()]).toEqual(['L1']);
    // L3 leaves J1 for an element outside; L4 was selected without its ends
    expect(leftBehind).toBe(2);
  });

  it('comes back from its text as it was, ties to the library included', () => {
    const document = withModel();
    const valuesOf = (part: NetworkDocument) =>
      [...part.nodes.values(), ...part.pipes.values()].map(({ value }) => value);
    const back = clipOf(document, ['T1', 'J1']).part;
    expect(valuesOf(back)).toEqual(valuesOf(partOf(document, new Set(['T1', 'J1'])).part));
    expect(clipOf(document, ['T1']).part.trapModels.get('M1')?.value).toMatchObject(LIBRARY);
  });

  it.each(['', 'TR-101\t0.05', '{"format":"riseback-piece"', '[]', 'null', '{"a":"riseback-piece"}'])(
    'is told from other text: %s',
    (text) => {
      expect(readClip(text)).toMatchObject({
        ok: false,
        why: expect.stringContaining('nothing that was copied') as string,
      });
    },
  );

  it('is refused with words when it is damaged or of another version', () => {
    const text = clipText({ part: partOf(sampleDocument(), new Set(['T1'])).part, siteId: '', cut: false });
    expect(readClip(text.replace('"inletPressurePa":618000', '"inletPressurePa":-1'))).toMatchObject({ ok: false });
    expect(readClip(text.replace('"version":1,"siteId"', '"version":9,"siteId"'))).toMatchObject({
      ok: false,
      why: expect.stringContaining('another version') as string,
    });
  });
});

describe('pasting', () => {
  it('gives new ids and the next free tags, joins the copies as the originals are joined, and undoes whole', () => {
    const before = sampleDocument();
    const { document, nodes, pipes, inverse } = pasted(before, clipOf(before, ['T1', 'J1']));
    expect(nodes).toEqual(['T3', 'J3']);
    const trap = document.nodes.get('T3')?.value;
    expect(trap).toMatchObject({ kind: 'trap', tag: 'TR-103', position: { x: 40, y: 40 }, loadKgS: 0.05 });
    expect(document.nodes.get('J3')?.value.tag).toBeUndefined();
    expect(document.pipes.get(pipes[0] ?? '')?.value).toMatchObject({ from: 'T3', to: 'J3', tag: 'CR-3' });
    for (const [id, placed] of before.nodes) expect(document.nodes.get(id)).toBe(placed);
    const undone = applyBatch(document, inverse);
    expect(undone.ok && undone.document).toEqual(before);
  });

  it('keeps tags that are free after a cut, once', () => {
    const clip = clipOf(sampleDocument(), ['T1'], true);
    const empty = emptyDocument('Other');
    const first = pasted(empty, clip);
    expect(first.document.nodes.get('T1')?.value.tag).toBe('TR-101');
    const second = pasted(first.document, clip);
    expect(second.document.nodes.get('T2')?.value.tag).toBe('TR-102');
  });

  it('matches trap models with those there, and takes missing ones along', () => {
    const here = withModel();
    const same = pasted(here, clipOf(here, ['T1']));
    expect([...same.document.trapModels.keys()]).toEqual(['M1']);
    expect(same.document.nodes.get('T3')?.value).toMatchObject({ trapModel: 'M1' });
    const elsewhere = pasted(sampleDocument(), clipOf(here, ['T1']));
    expect(elsewhere.document.trapModels.get('M1')?.value).toMatchObject({ name: 'Marl B15', ...LIBRARY });
    expect(elsewhere.document.nodes.get('T3')?.value).toMatchObject({ trapModel: 'M1' });
  });

  it('leaves the tie to a library behind that belongs to another site', () => {
    const { document } = pasted(sampleDocument(), clipOf(withModel(), ['T1'], false, 'elsewhere'));
    expect(document.trapModels.get('M1')?.value).toEqual({ id: 'M1', name: 'Marl B15' });
  });

  it('shifts bends with their pipes', () => {
    const base = sampleDocument();
    const bent = { ...samplePipe('L1', 'T1', 'J1'), bends: [{ x: 20, y: 0 }] };
    const document = { ...base, pipes: new Map(base.pipes).set('L1', { ordinal: 0, value: bent }) };
    const made = pasted(document, clipOf(document, ['T1', 'J1']));
    expect(made.document.pipes.get(made.pipes[0] ?? '')?.value.bends).toEqual([{ x: 60, y: 40 }]);
  });
});

describe('the place of a pasted part', () => {
  it('hits neither symbols nor pipes', () => {
    const network = drawnNetwork(sampleDocument());
    const shape = {
      nodes: [...network.nodes.values()].map(({ at }) => at),
      lines: [...network.pipes.values()].map(({ points }) => points),
    };
    const by = clearOffset(shape, shape, { x: 40, y: 40 });
    for (const a of shape.nodes) {
      for (const b of shape.nodes) {
        const [dx, dy] = [Math.abs(a.x + by.x - b.x), Math.abs(a.y + by.y - b.y)];
        expect(dx >= 80 || dy >= 80).toBe(true);
      }
    }
    expect(by.x % 20).toBe(0);
    expect(by.y % 20).toBe(0);
  });

  it('is the wish itself on an empty sheet', () => {
    const one = { nodes: [{ x: 0, y: 0 }], lines: [] };
    expect(clearOffset({ nodes: [], lines: [] }, one, { x: 40, y: 40 })).toEqual({ x: 40, y: 40 });
  });
});
