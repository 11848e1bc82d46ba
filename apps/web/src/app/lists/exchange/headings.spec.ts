import { describe, expect, it } from 'vitest';
import { type BlockField, isHeadingRow, matchHeadings, withHeadingUnit } from './headings';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const FIELDS: readonly BlockField[] = [
  { key: 'tag', title: 'Tag', readable: true, result: false },
  { key: 'pressurePa', title: 'Pressure', quantity: 'pressure', readable: true, result: false },
  { key: 'loadKgS', title: 'Load', quantity: 'massFlow', readable: true, result: false },
  { key: 'loadTolerance', title: 'Load tolerance', quantity: 'fraction', readable: true, result: false },
  { key: 'resultPressurePa', title: 'Pressure', quantity: 'pressure', readable: false, result: true },
];

describe('headings', () => {
  it.each([
    ['Load', { key: 'loadKgS', unit: '' }],
    ['  LOAD  ', { key: 'loadKgS', unit: '' }],
    ['Load, lb/h', { key: 'loadKgS', unit: '' }],
    ['Load (kg/h)', { key: 'loadKgS', unit: 'kg/h' }],
    ['Load [kg/s]', { key: 'loadKgS', unit: 'kg/s' }],
    ['load t/h', { key: 'loadKgS', unit: 't/h' }],
    ['loadKgS', { key: 'loadKgS', unit: 'kg/s' }],
    ['Load tolerance, %', { key: 'loadTolerance', unit: '' }],
    ['Pressure, bar a', { key: 'pressurePa', unit: 'bar a' }],
    ['Result: Pressure, psig', { key: 'resultPressurePa', unit: '' }],
    ['Load, ft', null],
    ['Loader', null],
    ['', null],
  ])('%j', (heading, match) => {
    expect(matchHeadings([heading], FIELDS, units)).toEqual([match]);
  });

  it('name a column once', () => {
    expect(matchHeadings(['Pressure', 'Pressure'], FIELDS, units)).toEqual([{ key: 'pressurePa', unit: '' }, null]);
  });

  it('are told from cells', () => {
    const told = (cells: string[]) => isHeadingRow(cells, matchHeadings(cells, FIELDS, units));
    expect(told(['Tag', 'Load', 'Remarks'])).toBe(true);
    expect(told(['TR-1', '40', 'Load'])).toBe(false);
    expect(told(['', ''])).toBe(false);
  });

  it('give their unit to bare numbers only', () => {
    for (const text of ['40', '-3.5', '1,040', '1e-3', '1 1/2', '1/2'])
      expect(withHeadingUnit(text, 'm')).toBe(`${text} m`);
    for (const text of ['40 kg/h', '12 ft 6 in', 'abc', '']) expect(withHeadingUnit(text, 'm')).toBe(text);
    expect(withHeadingUnit('40', '')).toBe('40');
  });
});
