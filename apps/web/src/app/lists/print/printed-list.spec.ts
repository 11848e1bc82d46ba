import { describe, expect, it } from 'vitest';
import type { ListTable, TableColumn } from '../list-table';
import { printTitle } from './print-title';
import { printedList } from './printed-list';

const COLUMN: TableColumn = {
  key: '',
  title: '',
  unit: '',
  group: 'inputs',
  widthPx: 80,
  numeric: false,
  minor: false,
  editable: false,
  face: 'text',
  bulk: false,
};

function table(rows: number): ListTable {
  const ids = Array.from({ length: rows }, (_, i) => `T${String(i)}`);
  return {
    columns: [
      { ...COLUMN, key: 'tag', title: 'Tag' },
      { ...COLUMN, key: 'loadKgS', title: 'Load', unit: 'lb/h', numeric: true },
      { ...COLUMN, key: 'staff', title: 'Staff', group: 'result', face: 'staff' },
      { ...COLUMN, key: 'finding', title: 'Verdict', group: 'result', face: 'verdict' },
    ],
    ids,
    nameOf: (id) => id,
    cell: (id, key) => ({
      text: key === 'finding' ? 'Capacity' : `${key} of ${id}`,
      derived: false,
      waiting: false,
      sentences: [],
      ...(key === 'finding' ? { status: 'fail' as const } : {}),
    }),
    editor: () => null,
    sortValue: () => undefined,
  };
}

describe('a list on paper', () => {
  it('has every row in the order shown, however many are in sight', () => {
    const ids = table(2_000).ids.toReversed();
    const { rows } = printedList(table(2_000), ['tag', 'loadKgS'], ids);
    expect(rows.map(({ id }) => id)).toEqual(ids);
    expect(rows[0]?.cells).toEqual(['tag of T1999', 'loadKgS of T1999']);
  });

  it('has the columns shown in their order, units in the heads, verdicts in words, no pictures', () => {
    const { columns, rows } = printedList(table(1), ['finding', 'tag', 'staff', 'loadKgS'], ['T0']);
    expect(columns.map(({ head }) => head)).toEqual(['Verdict', 'Tag', 'Load lb/h']);
    expect(rows[0]?.cells[0]).toBe('Fail: Capacity');
    expect(columns[0]?.opensResults).toBe(true);
  });

  it('says what it is of, which rows are left out, and that its results are old', () => {
    const facts = {
      list: 'Traps',
      network: 'Tern Quay Cannery',
      site: 'Quay',
      caseName: 'Design',
      filter: '',
      solved: true,
    };
    expect(printTitle(facts)).toBe('Traps of Tern Quay Cannery, Quay; case Design');
    expect(printTitle({ ...facts, caseName: '', filter: 'hall', solved: false })).toBe(
      'Traps of Tern Quay Cannery, Quay; only those with “hall”; results are those of an earlier state',
    );
  });
});
