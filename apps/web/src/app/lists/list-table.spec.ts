import { applyBatch, type EditOp, type NetworkDocument } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { arrangeRows, nextSorting } from './arrange-rows';
import { ELEMENT_LISTS, type ListId } from './list-definitions';
import type { CellEditor } from './cell-editor';
import type { ListTable } from './list-table';
import { trialContext, trialDocument } from './testing/trial-document';

const document = trialDocument();

function table(list: ListId, system: 'us' | 'si' = 'us'): ListTable {
  const found = ELEMENT_LISTS.find(({ id }) => id === list);
  if (found === undefined) throw new Error(list);
  return found.table(trialContext(document, system));
}

function editor(list: ListId, id: string, key: string): Exclude<CellEditor, { by: 'dialog' }> {
  const found = table(list).editor(id, key);
  if (found === null || found.by === 'dialog') throw new Error(`${key} is not typed`);
  return found;
}

function opsOf(list: ListId, id: string, key: string, text: string): readonly EditOp[] {
  const proposal = editor(list, id, key).propose(text);
  if (!proposal.ok) throw new Error(proposal.reason);
  return proposal.ops;
}

function reasonFor(list: ListId, id: string, key: string, text: string): string {
  const proposal = editor(list, id, key).propose(text);
  return proposal.ok ? '' : proposal.reason;
}

function after(ops: readonly EditOp[]): NetworkDocument {
  const applied = applyBatch(document, ops);
  if (!applied.ok) throw new Error('refused');
  return applied.document;
}

describe('typed cells', () => {
  // the foot is 0.3048 m by definition; a kilogram an hour is 1/3600 kg/s
  it.each([
    ['elevationM', '10 ft', 3.048],
    ['loadKgS', '36 kg/h', 0.01],
    ['subcoolingK', '9', 5],
  ] as const)('%s takes "%s"', (key, text, si) => {
    const [op] = opsOf('traps', 'T1', key, text);
    expect(op).toMatchObject({ op: 'set', in: 'nodes', id: 'T1', key });
    expect(op?.op === 'set' ? op.to : undefined).toBeCloseTo(si, 12);
  });

  it('say how a unit is understood and refuse another quantity in words, with what was probably meant', () => {
    const load = editor('traps', 'T1', 'loadKgS');
    // 40 kg/h × 2.20462 lb/kg
    expect(load.by === 'quantity' ? load.echo('40 kg/h') : '').toBe('40 kg/h is 88.2 lb/h');
    expect(editor('traps', 'T1', 'inletPressurePa').propose('75 ft')).toEqual({
      ok: false,
      reason: expect.stringContaining('ft is a length') as string,
      suggestion: '75 psig',
    });
  });

  it('leave an untouched value alone to the last bit', () => {
    const load = editor('traps', 'T1', 'loadKgS');
    expect(load.by === 'quantity' ? load.propose(load.initial) : null).toEqual({ ok: true, ops: [] });
  });

  it('drop an optional key that is emptied and keep a required one', () => {
    const ops = opsOf('traps', 'T1', 'maximumPressurePa', '');
    expect(after(ops).nodes.get('T1')?.value).not.toHaveProperty('maximumPressurePa');
    expect(reasonFor('traps', 'T1', 'inletPressurePa', ' ')).toBe('Inlet cannot be empty.');
  });

  it('say a bound of the file in the words of the column and the unit of the person', () => {
    // 300 K of subcooling are 540 °F of difference
    expect(reasonFor('traps', 'T1', 'subcoolingK', '600')).toBe('Subcooling must be at most 540 °F.');
  });

  it('take a date only as year, month and day', () => {
    expect(opsOf('gauges', 'G1', 'calibratedOn', '2026-3-1')).toMatchObject([{ to: '2026-03-01' }]);
    for (const text of ['3/1/2026', '2026-02-30', '1 March'])
      expect(reasonFor('gauges', 'G1', 'calibratedOn', text)).toContain('is not a date');
  });

  it('find the ends of a pipe by tag or id', () => {
    expect(opsOf('pipes', 'L1', 'from', 'tr-10')).toMatchObject([{ key: 'from', from: 'T1', to: 'T2' }]);
    expect(opsOf('pipes', 'L1', 'to', 'R1')).toMatchObject([{ key: 'to', to: 'R1' }]);
    expect(reasonFor('pipes', 'L1', 'to', 'nowhere')).toContain('Nothing in this network is called nowhere');
  });
});

describe('keys that exclude each other change in one batch', () => {
  it('a gauge between an element and a pipe', () => {
    const onPipe = after(opsOf('gauges', 'G1', 'place', 'cr-2')).gauges.get('G1')?.value;
    expect(onPipe).toMatchObject({ pipe: 'L2', distanceM: 0 });
    expect(onPipe).not.toHaveProperty('node');
    expect(reasonFor('gauges', 'G1', 'distanceM', '3 ft')).toContain('Put it on a pipe first');
    expect(reasonFor('gauges', 'G1', 'place', 'XX')).toContain('Nothing in this network is called XX');
  });

  it('a receiver between its pressure and its vent', () => {
    const closed = after(opsOf('vessels', 'R1', 'pressurePa', '5 psig')).nodes.get('R1')?.value;
    expect(closed).not.toHaveProperty('vented');
    expect(closed).toHaveProperty('pressurePa');
    const stillVented = opsOf('vessels', 'R1', 'vented', 'yes');
    expect(stillVented).toEqual([]);
    expect(after(opsOf('vessels', 'R1', 'vented', 'no')).nodes.get('R1')?.value).toHaveProperty('pressurePa', 101_325);
    expect(reasonFor('vessels', 'V1', 'vented', 'yes')).toContain('Only a receiver');
    expect(reasonFor('vessels', 'V1', 'pressurePa', '')).toContain('always has a pressure');
  });

  it('a pipe between its size and its bore', () => {
    const bored = after(opsOf('pipes', 'L1', 'insideDiameterM', '1 in')).pipes.get('L1')?.value;
    expect(bored).toMatchObject({ insideDiameterM: 0.0254 });
    expect(bored).not.toHaveProperty('size');
    const sized = after(opsOf('pipes', 'L2', 'nps', '2')).pipes.get('L2')?.value;
    expect(sized).toMatchObject({ size: { nps: '2', schedule: '80' } });
    expect(sized).not.toHaveProperty('insideDiameterM');
    expect(reasonFor('pipes', 'L2', 'schedule', '40')).toContain('given by its bore');
    expect(reasonFor('pipes', 'L1', 'schedule', 'unknown')).toBe(
      '1 in is not made in schedule unknown. Choose another size or schedule.',
    );
  });
});

describe('printed cells', () => {
  it('show the unit once, in the head', () => {
    expect(table('traps').columns.find(({ key }) => key === 'inletPressurePa')).toMatchObject({ unit: 'psig' });
    expect(table('traps', 'si').columns.find(({ key }) => key === 'inletPressurePa')).toMatchObject({ unit: 'kPa g' });
    // (618,432 − 101,325) Pa / 6,894.757 Pa/psi
    expect(table('traps').cell('T1', 'inletPressurePa').text).toBe('75.0');
  });

  it('say why there is no result once in a row', () => {
    const traps = table('traps');
    expect(traps.cell('T1', 'staff')).toMatchObject({ text: 'Waiting for the solve', waiting: true });
    expect(traps.cell('T1', 'backPressurePa').text).toBe('');
  });

  it('name what has no tag by its id', () => {
    expect(table('junctions').cell('J1', 'tag')).toMatchObject({ text: 'J1', derived: true });
    // 3.048 m is 10 ft
    expect(table('pipes').cell('L1', 'rise')).toMatchObject({ text: '10', derived: true });
  });
});

describe('the order of rows', () => {
  it('counts numbers in tags as numbers, then turns round, then goes back to the file', () => {
    const traps = table('traps');
    const ascending = nextSorting(null, 'tag');
    const descending = nextSorting(ascending, 'tag');
    expect(arrangeRows(traps, '', ascending)).toEqual(['T1', 'T2']);
    expect(arrangeRows(traps, '', descending)).toEqual(['T2', 'T1']);
    expect(nextSorting(descending, 'tag')).toBeNull();
  });

  it('puts empty cells last both ways', () => {
    const traps = table('traps');
    expect(arrangeRows(traps, '', { key: 'trapType', direction: 'ascending' })).toEqual(['T2', 'T1']);
    expect(arrangeRows(traps, '', { key: 'trapType', direction: 'descending' })).toEqual(['T2', 'T1']);
  });

  it('keeps rows that hold every word of the filter', () => {
    expect(arrangeRows(table('traps'), 'hall tr', null)).toEqual(['T1']);
    expect(arrangeRows(table('traps'), 'float', null)).toEqual(['T2']);
    expect(arrangeRows(table('traps'), 'hall float', null)).toEqual([]);
  });
});

it('names the case of each result only while elements show their own worst', () => {
  const titles = (change: object) => {
    const traps = ELEMENT_LISTS.find(({ id }) => id === 'traps');
    return traps?.table({ ...trialContext(document), ...change }).columns.map(({ title }) => title);
  };
  expect(titles({})).not.toContain('Case');
  expect(titles({ caseNameOf: () => 'Design' })).toContain('Case');
});
