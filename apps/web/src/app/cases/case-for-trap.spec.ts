import { applyBatch, fromFile, NetworkFileShape, type NetworkDocument, toFile, type Trap } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { caseForTrap } from './case-for-trap';

function networkWith(cases: unknown[]): NetworkDocument {
  return fromFile(
    NetworkFileShape.parse({
      format: 'riseback-network',
      version: 1,
      name: 'One trap',
      nodes: [
        { id: 'T1', kind: 'trap', tag: 'TR-1', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.1 },
        { id: 'R1', kind: 'receiver', elevationM: 2, vented: true },
      ],
      pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 5, insideDiameterM: 0.05 }],
      cases,
    }),
  );
}

const TURNDOWN = {
  id: 'turndown',
  name: 'Turndown',
  loadFactor: 0.5,
  overrides: [{ node: 'R1', pressurePa: 1.3e5 }],
};

function made(document: NetworkDocument, fromId: string | null, setting: Parameters<typeof caseForTrap>[3]) {
  const trap = document.nodes.get('T1')?.value as Trap;
  const from = fromId === null ? null : (document.cases.get(fromId)?.value ?? null);
  const edit = caseForTrap(document, from, trap, setting);
  const applied = applyBatch(document, edit.ops);
  if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
  const back = applyBatch(applied.document, applied.inverse);
  expect(back.ok ? toFile(back.document) : back.errors).toEqual(toFile(document));
  return { edit, document: applied.document, cases: toFile(applied.document).cases };
}

describe('a case made for one trap', () => {
  it('takes the present case along and sets the trap apart, as one edit', () => {
    const { edit, cases } = made(networkWith([TURNDOWN]), 'turndown', 'failedOpen');
    expect(edit.label).toBe('case TR-1 failed open made');
    expect(cases[1]).toEqual({
      id: edit.id,
      name: 'TR-1 failed open',
      loadFactor: 0.5,
      inletPressureFactor: 1,
      overrides: [
        { node: 'R1', pressurePa: 1.3e5 },
        { node: 'T1', state: 'failedOpen' },
      ],
    });
  });

  it('begins its own load with what it is in the present case', () => {
    const { cases } = made(networkWith([TURNDOWN]), 'turndown', 'load');
    // half of 0.1 kg/s
    expect(cases[1]?.overrides).toContainEqual({ node: 'T1', loadKgS: 0.05 });
    const own = { ...TURNDOWN, overrides: [{ node: 'T1', loadKgS: 0.2 }] };
    expect(made(networkWith([own]), 'turndown', 'load').cases[1]?.overrides).toEqual([{ node: 'T1', loadKgS: 0.2 }]);
  });

  it('finds a name of its own', () => {
    const first = made(networkWith([TURNDOWN]), 'turndown', 'isolated');
    expect(made(first.document, 'turndown', 'isolated').cases[2]?.name).toBe('TR-1 isolated 2');
  });

  it('keeps the network as drawn as a case of its own where there was none', () => {
    const { cases } = made(networkWith([]), null, 'isolated');
    expect(cases).toMatchObject([
      { name: 'As drawn', loadFactor: 1 },
      { name: 'TR-1 isolated', overrides: [{ node: 'T1', state: 'isolated' }] },
    ]);
  });
});
