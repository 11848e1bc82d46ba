import { describe, expect, it } from 'vitest';
import { plainName } from '../../shared/save-file';
import { ledgerRows } from './ledger-file';
import type { LedgerModel, LedgerRow } from '@riseback/figures';

const row = (no: number, change: Partial<LedgerRow>): LedgerRow => ({
  no,
  pipeId: `L${String(no)}`,
  element: `CR-${String(no)}`,
  place: '',
  bore: '2″',
  length: '1,200',
  rise: '–',
  up: '',
  down: '',
  flow: '812',
  flash: '–',
  static: '–',
  friction: '0.01',
  flashSteam: '0.33',
  running: '15.34',
  handAdds: '–',
  handRunning: '15.00',
  lifts: false,
  bar: { before: 0, parts: [], after: 0 },
  ...change,
});
const model = {
  rows: [row(1, {}), row(2, { element: '=1+1', rise: '+22 −1', up: '22', down: '1', static: '−11.00' })],
  opening: '15.00',
  closing: {
    length: '2,400',
    rise: '+22 −1',
    up: '22',
    down: '1',
    static: '−11.00',
    friction: '0.02',
    flashSteam: '0.66',
    running: '4.68',
    handAdds: '11.00',
    handRunning: '26.00',
  },
  titles: { length: 'Length ft', rise: 'Rise ft', flow: 'Flow lb/h', adds: 'psi', running: 'psig' },
} as unknown as LedgerModel;

describe('the ledger as rows of a spreadsheet', () => {
  const rows = ledgerRows(model, {
    trapName: 'TR-1',
    endName: 'VR-1',
    openingWords: 'receiver, vented',
    notes: [['Case', 'Design']],
  });

  it('has as many cells in every line of the table as it has headings', () => {
    const [head = []] = rows;
    expect(rows.slice(0, -1).map(({ length }) => length)).toEqual(rows.slice(0, -1).map(() => head.length));
  });

  it('gives numbers as numbers with their sign, and nothing where there is nothing', () => {
    expect(rows[3]?.slice(4, 10)).toEqual([1200, 22, 1, 812, undefined, -11]);
    expect(rows[2]?.slice(5, 7)).toEqual([undefined, undefined]);
  });

  it('adds up in the spreadsheet as on paper', () => {
    const column = (at: number) => rows.slice(2, 4).map((line) => Number(line[at] ?? 0));
    const total = (at: number) => Number(rows[4]?.[at]);
    for (const at of [4, 9, 10, 11]) expect(column(at).reduce((a, b) => a + b, 0)).toBeCloseTo(total(at), 9);
  });
});

it('names files plainly', () => {
  expect(plainName('Tern Quay Cannery TR-101 Design ledger', 'ledger')).toBe('tern-quay-cannery-tr-101-design-ledger');
});
