import { applyBatch, fromFile, NetworkFileShape, type NetworkDocument, toFile } from '@riseback/network';
import { beforeEach, describe, expect, it } from 'vitest';
import { caseChangeWords, changesOf, countChanges, freeKeys } from './case-changes';
import {
  type CaseEdit,
  clearChange,
  copyOfCase,
  deletionOfCase,
  newCase,
  renameCase,
  setChange,
  setFactor,
} from './case-edits';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
/** One pound is 0.45359237 kg by definition; one psi is 6894.757 Pa. */
const LB_PER_HOUR = 0.45359237 / 3600;
const PSI = 6_894.757;

const file = NetworkFileShape.parse({
  format: 'riseback-network',
  version: 1,
  name: 'Two cases',
  nodes: [
    {
      id: 'T1',
      kind: 'trap',
      tag: 'TR-1',
      elevationM: 0,
      inletPressurePa: 101_325 + 100 * PSI,
      loadKgS: 1_000 * LB_PER_HOUR,
    },
    {
      id: 'T2',
      kind: 'trap',
      tag: 'TR-2',
      elevationM: 0,
      inletPressurePa: 101_325 + 40 * PSI,
      loadKgS: 0.1,
      service: { kind: 'modulating', control: 'varyingInlet', secondaryInletK: 300, secondaryOutletK: 330 },
    },
    { id: 'V1', kind: 'flashVessel', tag: 'FV-1', elevationM: 0, pressurePa: 101_325 + 15 * PSI },
    { id: 'R1', kind: 'receiver', tag: 'VR-1', elevationM: 0, vented: true },
    { id: 'J1', kind: 'junction', elevationM: 0 },
  ],
  cases: [
    { id: 'design', name: 'Design', overrides: [] },
    {
      id: 'turndown',
      name: 'Turndown',
      loadFactor: 0.5,
      inletPressureFactor: 0.9,
      overrides: [
        { node: 'T1', loadKgS: 800 * LB_PER_HOUR, state: 'failedOpen', orificeDiameterM: 0.003175 },
        { node: 'V1', pressurePa: 101_325 + 10 * PSI },
      ],
    },
  ],
});

let document: NetworkDocument;
const after = ({ ops }: CaseEdit): NetworkDocument => {
  const applied = applyBatch(document, ops);
  if (!applied.ok) throw new Error(applied.errors.map(({ detail }) => detail).join('; '));
  return applied.document;
};
const taken = ({ ops }: CaseEdit): void => {
  const applied = applyBatch(document, ops);
  if (!applied.ok) throw new Error(applied.errors.map(({ detail }) => detail).join('; '));
  const back = applyBatch(applied.document, applied.inverse);
  expect(back.ok ? toFile(back.document) : back.errors).toEqual(toFile(document));
  document = applied.document;
};
const caseOf = (id: string) => {
  const found = document.cases.get(id)?.value;
  if (found === undefined) throw new Error(`no case ${id}`);
  return found;
};

beforeEach(() => {
  document = fromFile(file);
});

describe('edits of cases, each undone exactly by its inverse', () => {
  it('makes a case at full load under a free name and id', () => {
    const first = newCase(document);
    taken(first);
    const second = newCase(document);
    taken(second);
    expect([caseOf(first.id), caseOf(second.id)]).toEqual([
      { id: first.id, name: 'Case 3', loadFactor: 1, inletPressureFactor: 1 },
      { id: second.id, name: 'Case 4', loadFactor: 1, inletPressureFactor: 1 },
    ]);
  });

  it('copies factors and settings under a name of its own', () => {
    const copy = copyOfCase(document, caseOf('turndown'));
    taken(copy);
    expect(caseOf(copy.id)).toEqual({ ...caseOf('turndown'), id: copy.id, name: 'Turndown, copy' });
    expect(changesOf(document, caseOf(copy.id), units)).toEqual(changesOf(document, caseOf('turndown'), units));
    expect(copyOfCase(document, caseOf('turndown')).ops[0]).toMatchObject({ value: { name: 'Turndown, copy 2' } });
  });

  it('refuses a name that is empty, taken or too long, and takes any other', () => {
    expect(renameCase(document, caseOf('design'), undefined)).toHaveProperty('refusal');
    expect(renameCase(document, caseOf('design'), 'Turndown')).toHaveProperty('refusal');
    expect(renameCase(document, caseOf('design'), 'x'.repeat(81))).toHaveProperty('refusal');
    const renamed = renameCase(document, caseOf('design'), 'Start-up');
    if ('refusal' in renamed) throw new Error(renamed.refusal);
    taken(renamed);
    expect(caseOf('design').name).toBe('Start-up');
  });

  it('sets factors', () => {
    taken(setFactor(document, caseOf('design'), 'loadFactor', 0.5));
    taken(setFactor(document, caseOf('design'), 'inletPressureFactor', 1.1));
    expect(caseOf('design')).toMatchObject({ loadFactor: 0.5, inletPressureFactor: 1.1 });
  });

  it('sets a value where the case had none, and beside what it has', () => {
    taken(setChange(document, caseOf('design'), 'T2', 'state', 'isolated'));
    taken(setChange(document, caseOf('turndown'), 'V1', 'pressurePa', 150_000));
    taken(setChange(document, caseOf('design'), 'T2', 'loadKgS', 0.2));
    expect(document.overrides.get('design/T2')?.value).toEqual({ node: 'T2', state: 'isolated', loadKgS: 0.2 });
    expect(document.overrides.get('turndown/V1')?.value.pressurePa).toBe(150_000);
  });

  it('takes a value away, and the override with its last value', () => {
    taken(clearChange(document, caseOf('turndown'), 'T1', 'loadKgS'));
    expect(document.overrides.get('turndown/T1')?.value).toEqual({
      node: 'T1',
      state: 'failedOpen',
      orificeDiameterM: 0.003175,
    });
    taken(clearChange(document, caseOf('turndown'), 'V1', 'pressurePa'));
    expect(document.overrides.has('turndown/V1')).toBe(false);
  });

  it('deletes a case with its settings, and says so before', () => {
    const deletion = deletionOfCase(document, caseOf('turndown'));
    expect(deletion.along[0]).toBe('4 settings of its own');
    taken(deletion);
    expect([document.cases.size, document.overrides.size]).toEqual([1, 0]);
    expect(deletionOfCase(document, caseOf('design')).along.at(-1)).toMatch(/^The last case/);
  });
});

describe('what a case sets for itself', () => {
  it('lists every value with what would hold otherwise, by the case’s factors', () => {
    const rows = changesOf(document, caseOf('turndown'), units).map(({ tag, key, otherwise }) => [tag, key, otherwise]);
    expect(rows).toEqual([
      ['TR-1', 'loadKgS', '500 lb/h'],
      ['TR-1', 'orificeDiameterM', 'Not known'],
      ['TR-1', 'state', 'Normal'],
      ['FV-1', 'pressurePa', '15.0 psig'],
    ]);
    expect(countChanges(document, 'turndown')).toBe(4);
    expect(countChanges(document, 'design')).toBe(0);
  });

  it('applies the pressure factor to gauge pressure, leaves a modulated inlet to its load, and knows a vented receiver', () => {
    document = after(setChange(document, caseOf('turndown'), 'T1', 'inletPressurePa', 5e5));
    document = after(setChange(document, caseOf('turndown'), 'T2', 'inletPressurePa', 2e5));
    document = after(setChange(document, caseOf('turndown'), 'R1', 'pressurePa', 1.2e5));
    const otherwise = new Map(
      changesOf(document, caseOf('turndown'), units).map((change) => [`${change.tag} ${change.key}`, change.otherwise]),
    );
    expect(otherwise.get('TR-1 inletPressurePa')).toBe('90.0 psig');
    expect(otherwise.get('TR-2 inletPressurePa')).toBe('Follows its load');
    expect(otherwise.get('VR-1 pressurePa')).toBe('Vented');
  });

  it('says it short beside a result', () => {
    expect(caseChangeWords(document, 'turndown', 'T1', units).sort()).toEqual([
      'failed open',
      'load 800 lb/h',
      expect.stringMatching(/^orifice 0\.125 in$/),
    ]);
    expect(caseChangeWords(document, 'design', 'T1', units)).toEqual([]);
  });

  it('offers what fits the element and is not set yet', () => {
    const free = (nodeId: string, caseId = 'turndown') => {
      const node = document.nodes.get(nodeId)?.value;
      return node === undefined ? [] : freeKeys(document, caseId, node);
    };
    expect(free('T1')).toEqual(['inletPressurePa']);
    expect(free('T1', 'design')).toEqual(['loadKgS', 'inletPressurePa', 'orificeDiameterM', 'state']);
    expect(free('V1')).toEqual([]);
    expect(free('R1')).toEqual(['pressurePa']);
    expect(free('J1')).toEqual([]);
  });
});
