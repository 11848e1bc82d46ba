import { describe, expect, it } from 'vitest';
import { ELEMENT_LISTS } from '../list-definitions';
import { trialContext } from '../testing/trial-document';
import { arrangeColumns, choiceOf, moveColumn } from './column-choice';

const columns = ELEMENT_LISTS[0]?.table(trialContext()).columns ?? [];
const shownKeys = (choice: Parameters<typeof arrangeColumns>[1]) =>
  arrangeColumns(columns, choice).flatMap(({ column, shown }) => (shown ? [column.key] : []));

describe('columns of a list', () => {
  it('show the main ones at first, the name before all', () => {
    expect(shownKeys(null)).toEqual(columns.filter(({ minor }) => !minor).map(({ key }) => key));
    expect(
      arrangeColumns(columns, null)
        .filter(({ fixed }) => fixed)
        .map(({ column }) => column.key),
    ).toEqual(['tag', 'drawing']);
  });

  it('move within their group and no farther', () => {
    const at = (keys: readonly { column: { key: string } }[], key: string) =>
      keys.findIndex(({ column }) => column.key === key);
    const start = arrangeColumns(columns, null);
    const moved = moveColumn(start, 'loadKgS', -1);
    expect(at(moved, 'loadKgS')).toBe(at(moved, 'inletPressurePa') - 1);
    expect(arrangeColumns(columns, choiceOf(moved))).toEqual(moved);
    expect(moveColumn(moved, 'loadKgS', -1)).toBe(moved);
    expect(moveColumn(start, 'area', -1)).toBe(start);
    expect(moveColumn(start, 'tag', 1)).toBe(start);
  });

  it('keep what was hidden hidden, and show a column that came later where it belongs', () => {
    const old = choiceOf(arrangeColumns(columns, null).filter(({ column }) => column.key !== 'elevationM'));
    const keys = shownKeys({ ...old, hidden: [...old.hidden, 'area'] });
    expect(keys).not.toContain('area');
    expect(keys.indexOf('elevationM')).toBe(keys.indexOf('sizingFactor') + 1);
  });

  it('never hide the name, nor mind keys that are gone', () => {
    expect(shownKeys({ order: ['tag', 'gone'], hidden: ['tag', 'gone'] })).toContain('tag');
  });
});
