import { describe, expect, it } from 'vitest';
import { extendRows, keepShown, NO_ROWS, toggleAllRows, toggleRow } from './row-selection';

const order = ['a', 'b', 'c', 'd', 'e'];

describe('ticked rows', () => {
  it('are ticked and unticked one by one', () => {
    const ticked = toggleRow(toggleRow(NO_ROWS, 'b'), 'd');
    expect([...ticked.ids]).toEqual(['b', 'd']);
    expect([...toggleRow(ticked, 'b').ids]).toEqual(['d']);
  });

  it('extend from the last ticked row in either direction', () => {
    expect([...extendRows(toggleRow(NO_ROWS, 'b'), order, 'd').ids]).toEqual(['b', 'c', 'd']);
    expect([...extendRows(toggleRow(NO_ROWS, 'd'), order, 'b').ids]).toEqual(['d', 'b', 'c']);
    expect([...extendRows(NO_ROWS, order, 'c').ids]).toEqual(['c']);
  });

  it('are all, then none', () => {
    const all = toggleAllRows(NO_ROWS, order);
    expect(all.ids.size).toBe(5);
    expect(toggleAllRows(all, order)).toBe(NO_ROWS);
  });

  it('lose what is no longer shown', () => {
    const ticked = toggleAllRows(NO_ROWS, order);
    expect([...keepShown(ticked, ['b', 'c']).ids]).toEqual(['b', 'c']);
    expect(keepShown(ticked, ['b', 'c']).anchor).toBeNull();
    expect(keepShown(ticked, order)).toBe(ticked);
  });
});
