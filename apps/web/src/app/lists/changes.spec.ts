import { applyBatch } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { bulkProposal, fillDownProposal, namesOf } from './bulk-bar/bulk-edit';
import { deletionOf } from './deletion';
import type { FieldValues } from './dialogs/field';
import { ELEMENT_LISTS, type NewKind } from './list-definitions';
import { newElementForm } from './new-element';
import { trialContext, trialDocument } from './testing/trial-document';

const document = trialDocument();

function list(id: string) {
  const found = ELEMENT_LISTS.find((each) => each.id === id);
  if (found === undefined) throw new Error(id);
  return found;
}

describe('one property in many rows', () => {
  const traps = list('traps').table(trialContext(document));

  it('is one batch', () => {
    const proposal = bulkProposal(traps, ['T1', 'T2'], 'loadKgS', '36 kg/h');
    expect(proposal).toMatchObject({
      ok: true,
      ops: [
        { id: 'T1', to: 0.01 },
        { id: 'T2', to: 0.01 },
      ],
    });
  });

  it('is refused as a whole, with the row that cannot take it', () => {
    const proposal = bulkProposal(traps, ['T2', 'T1'], 'secondaryInletK', '100 F');
    expect(proposal).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/^TR-2: Only a modulating service/) as string,
    });
  });

  it('is filled down from the first row, as one batch over the others', () => {
    const proposal = fillDownProposal(traps, ['T2', 'T1'], 'loadKgS');
    if (!proposal.ok) throw new Error(proposal.reason);
    expect(proposal.ops).toHaveLength(1);
    const [op] = proposal.ops;
    // as typed in pounds an hour, which reads back to a part in 1e12
    expect(op).toMatchObject({ id: 'T1', key: 'loadKgS', from: 0.05 });
    expect(Math.abs(Number(op?.op === 'set' ? op.to : NaN) - 0.02)).toBeLessThan(1e-13);
    expect(fillDownProposal(traps, ['T2', 'T1'], 'trapType')).toMatchObject({
      ok: true,
      ops: [{ id: 'T1', key: 'trapType', to: 'floatThermostatic' }],
    });
  });

  it('is not filled down into names, into results, nor into nothing', () => {
    for (const key of ['tag', 'backPressurePa', 'service'])
      expect(fillDownProposal(traps, ['T2', 'T1'], key)).toMatchObject({ ok: false });
    expect(fillDownProposal(traps, ['T2'], 'loadKgS')).toMatchObject({ ok: false });
  });

  it('names the rows it is for', () => {
    expect(namesOf(traps, ['T1', 'T2'])).toBe('TR-2 to TR-10');
    expect(namesOf(traps, ['T2'])).toBe('TR-10');
  });
});

describe('deleting rows', () => {
  it('says what goes along and takes it', () => {
    const deletion = deletionOf(document, list('junctions'), ['J1']);
    expect(deletion.title).toBe('Delete junction J1?');
    expect(deletion.along).toEqual(['2 pipes CR-1, CR-2', '1 gauge']);
    expect(applyBatch(document, deletion.ops).ok).toBe(true);
  });

  it('does not count a gauge as going along with itself', () => {
    expect(deletionOf(document, list('gauges'), ['G1'])).toMatchObject({ title: 'Delete gauge G1?', along: [] });
  });

  it('tells of traps that lose their model', () => {
    const { along, ops } = deletionOf(document, list('trap-models'), ['M1']);
    expect(along).toEqual(['1 trap then has no model: TR-2']);
    expect(applyBatch(document, ops).ok).toBe(true);
  });
});

describe('a new element', () => {
  it.each<[NewKind, FieldValues]>([
    ['trap', { tag: 'TR-11', elevationM: 1, inletPressurePa: 4e5, loadKgS: 0.1 }],
    ['junction', { elevationM: 1 }],
    ['receiver', { tag: 'VR-2', elevationM: 1 }],
    ['receiver', { elevationM: 1, pressurePa: 2e5 }],
    ['flashVessel', { elevationM: 1, pressurePa: 2e5 }],
    ['pumpedInlet', { elevationM: 1, flowKgS: 1, temperatureK: 350 }],
    ['pipe', { from: 'TR-10', to: 'J1', lengthM: 5, nps: '1', schedule: '80' }],
    ['trapModel', { name: 'Pell F20', orificeDiameterM: 0.006 }],
    ['gauge', { tag: 'PI-2', place: 'TR-10', elevationM: 2, rangeLowPa: 0, rangeHighPa: 7e5, accuracy: 0.01 }],
    ['gauge', { place: 'cr-1', distanceM: 3, elevationM: 2 }],
  ])('%s is taken by the reducer with %o', (kind, values) => {
    const form = newElementForm(kind, document);
    expect(form.judge(values)).toBe('');
    const { op, label } = form.make(values);
    const applied = applyBatch(document, [op]);
    expect(applied).toMatchObject({ ok: true });
    expect(label.length).toBeLessThanOrEqual(120);
  });

  it('lies clear of all others on the drawing', () => {
    const { op } = newElementForm('trap', document).make({ elevationM: 0, inletPressurePa: 4e5, loadKgS: 0.1 });
    const applied = applyBatch(document, [op]);
    expect(applied.ok && applied.document.nodes.get('T3')?.value.position).toMatchObject({
      x: expect.any(Number) as number,
    });
  });

  it('takes the next tag, and a pipe the size of the last', () => {
    expect(newElementForm('trap', document).values).toMatchObject({ tag: 'TR-11' });
    expect(newElementForm('pipe', document).values).toMatchObject({ tag: 'CR-3', nps: '1', schedule: '80' });
  });

  it('does not lead a pipe to something that is not there', () => {
    const form = newElementForm('pipe', document);
    expect(form.judge({ from: 'TR-10', to: 'X', lengthM: 1, nps: '1', schedule: '80' })).toContain('called X');
    expect(form.judge({ from: 'TR-10', to: 'J1', lengthM: 1, nps: '1/8', schedule: '120' })).toContain('not made');
  });
});
