import type { LibraryModel } from '@riseback/contracts';
import { applyBatch, type EditOp, fromFile, type NetworkDocument, readNetworkFile } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { chooseFromLibraryOps, chooseOps, newsOfCopies, notCopied, takeVersionOps } from './library-copies';

const trap = (id: string) => ({ id, kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 });
const FILE = {
  format: 'riseback-network',
  version: 1,
  name: 'Copies',
  nodes: [trap('T1'), trap('T2')],
  trapModels: [{ id: 'M1', name: 'Our own' }],
};
const MARL: LibraryModel = {
  id: '7b0f6d1e-52a8-4f4e-9a2b-0f1d7c1f6a01',
  version: 2,
  name: 'Marl B15',
  trapType: 'invertedBucket',
  orificeDiameterM: 0.0032,
  capacity: [{ differentialPa: 50_000, flowKgS: 0.06 }],
  createdBy: 'Ines Kallan',
  createdAt: '2026-03-02T08:00:00.000Z',
};

function plain(): NetworkDocument {
  const read = readNetworkFile(FILE);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return fromFile(read.file);
}

function after(document: NetworkDocument, ops: readonly EditOp[]): NetworkDocument {
  const applied = applyBatch(document, ops);
  if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
  return applied.document;
}

const copied = () => after(plain(), chooseFromLibraryOps(plain(), 'T1', MARL));
const modelOf = (document: NetworkDocument, id: string) => document.trapModels.get(id)?.value;
const chosenBy = (document: NetworkDocument, id: string) => {
  const node = document.nodes.get(id)?.value;
  return node?.kind === 'trap' ? node.trapModel : undefined;
};

describe('choosing a model of the library', () => {
  it('makes the network its own copy, which says what it is of, and gives it to the trap', () => {
    const document = copied();
    expect(modelOf(document, 'M2')).toEqual({
      id: 'M2',
      name: 'Marl B15',
      orificeDiameterM: 0.0032,
      capacity: MARL.capacity,
      libraryId: MARL.id,
      libraryVersion: 2,
    });
    expect([chosenBy(document, 'T1'), chosenBy(document, 'T2')]).toEqual(['M2', undefined]);
  });

  it('takes the copy that is there for the next trap, though the library has moved on', () => {
    const document = after(
      copied(),
      chooseFromLibraryOps(copied(), 'T2', { ...MARL, version: 3, name: 'Marl B15 mk 2' }),
    );
    expect(document.trapModels.size).toBe(2);
    expect(chosenBy(document, 'T2')).toBe('M2');
    expect(modelOf(document, 'M2')?.libraryVersion).toBe(2);
  });

  it('of the same model again is no edit', () => {
    expect(chooseOps(copied(), 'T1', 'M2')).toEqual([]);
    expect(chooseFromLibraryOps(copied(), 'T1', MARL)).toEqual([]);
  });

  it('offers what the network has no copy of and the site still wants', () => {
    const others = [
      { ...MARL, id: '7b0f6d1e-52a8-4f4e-9a2b-0f1d7c1f6a02', name: 'Pell F50' },
      { ...MARL, id: '7b0f6d1e-52a8-4f4e-9a2b-0f1d7c1f6a03', name: 'Old', retired: true as const },
    ];
    expect(notCopied(copied(), [MARL, ...others]).map(({ name }) => name)).toEqual(['Pell F50']);
  });
});

describe('a newer version in the library', () => {
  const { capacity: _, ...withoutCapacity } = MARL;
  const newer: LibraryModel = { ...withoutCapacity, version: 4, name: 'Marl B15 mk 2', bodyPressurePa: 1_800_000 };

  it('is told with the traps that it would reach', () => {
    const [news] = newsOfCopies(copied(), [newer]);
    expect(news).toMatchObject({ kind: 'newer', copy: { id: 'M2' }, newest: { version: 4 } });
    expect(news?.traps.map(({ id }) => id)).toEqual(['T1']);
    expect(newsOfCopies(copied(), [MARL])).toEqual([]);
    expect(newsOfCopies(plain(), [newer])).toEqual([]);
    expect(newsOfCopies(copied(), [])).toEqual([]);
  });

  it('that changes nothing in the network is none', () => {
    expect(newsOfCopies(copied(), [{ ...MARL, version: 3, trapType: 'orifice' }])).toEqual([]);
  });

  it('is taken whole as one edit, what it leaves out taken away, and undone as one', () => {
    const before = copied();
    const copy = modelOf(before, 'M2');
    if (copy === undefined) throw new Error('no copy');
    const ops = takeVersionOps(before, copy, newer);
    const taken = applyBatch(before, ops);
    if (!taken.ok) throw new Error(JSON.stringify(taken.errors));
    expect(modelOf(taken.document, 'M2')).toEqual({
      id: 'M2',
      name: 'Marl B15 mk 2',
      orificeDiameterM: 0.0032,
      bodyPressurePa: 1_800_000,
      libraryId: MARL.id,
      libraryVersion: 4,
    });
    expect(newsOfCopies(taken.document, [newer])).toEqual([]);
    expect(after(taken.document, taken.inverse)).toEqual(before);
  });

  it('says when the site has retired it', () => {
    expect(newsOfCopies(copied(), [{ ...MARL, version: 3, retired: true }])).toMatchObject([{ kind: 'retired' }]);
  });
});
