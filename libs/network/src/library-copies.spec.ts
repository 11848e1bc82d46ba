import { describe, expect, it } from 'vitest';
import { applyBatch } from './apply-batch';
import { fromFile, toFile } from './document-file';
import type { EditOp } from './edit-batch';
import type { NetworkDocument } from './network-document';
import { readNetworkFile } from './read-network-file';
import { solverInputText } from './solver-input';

const LIBRARY_ID = '7b0f6d1e-52a8-4f4e-9a2b-0f1d7c1f6a01';
const FILE = {
  format: 'riseback-network',
  version: 1,
  name: 'Copies',
  nodes: [{ id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05, trapModel: 'M1' }],
  trapModels: [{ id: 'M1', name: 'Marl B15' }],
};

function read(file: unknown): NetworkDocument {
  const result = readNetworkFile(file);
  if (!result.ok) throw new Error(JSON.stringify(result.errors));
  return fromFile(result.file);
}

const set = (key: string, to: unknown): EditOp => ({ op: 'set', in: 'trapModels', id: 'M1', key, to });

describe('a trap model copied from a library', () => {
  it('says which version it is of, takes it back on undo, and changes no result by it', () => {
    const document = read(FILE);
    const applied = applyBatch(document, [set('libraryId', LIBRARY_ID), set('libraryVersion', 2)]);
    if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
    expect(applied.document.trapModels.get('M1')?.value).toMatchObject({ libraryId: LIBRARY_ID, libraryVersion: 2 });
    expect(solverInputText(applied.document)).toBe(solverInputText(document));
    const undone = applyBatch(applied.document, applied.inverse);
    expect(undone.ok && undone.document).toEqual(document);
  });

  it('says both which model and which version, or neither', () => {
    const applied = applyBatch(read(FILE), [set('libraryVersion', 2)]);
    expect(applied).toMatchObject({ ok: false, errors: [{ element: 'M1', key: 'libraryVersion' }] });
    expect(applyBatch(read(FILE), [set('libraryId', LIBRARY_ID)]).ok).toBe(false);
    expect(applyBatch(read(FILE), [set('libraryId', 'not a uuid'), set('libraryVersion', 2)]).ok).toBe(false);
  });

  it('leaves its origin behind in a file, which refuses such keys as before', () => {
    const applied = applyBatch(read(FILE), [set('libraryId', LIBRARY_ID), set('libraryVersion', 2)]);
    if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
    expect(toFile(applied.document)).toEqual(toFile(read(FILE)));
    const refused = readNetworkFile({ ...FILE, trapModels: [{ id: 'M1', name: 'Marl B15', libraryVersion: 2 }] });
    expect(refused).toMatchObject({ ok: false, errors: [{ pointer: '/trapModels/0/libraryVersion' }] });
  });
});
