import { relativeError } from '@riseback/numerics';
import type { CapacityPoint } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { readCapacityText } from './capacity-text';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const SI = { system: 'si', atmosphericPressurePa: 101_325 } as const;
/** Exact by definition: 1 lb = 0.45359237 kg, 1 in = 25.4 mm, g = 9.80665 m/s². */
const PSI = (0.45359237 * 9.80665) / 0.0254 ** 2;
const LB_H = 0.45359237 / 3600;

function read(text: string, units: typeof US | typeof SI = US) {
  const reading = readCapacityText(text, units);
  if (reading === null) throw new Error('nothing was read');
  return reading;
}

function expectPoints(points: readonly CapacityPoint[] | null, wanted: readonly (readonly [number, number])[]): void {
  expect(points).toHaveLength(wanted.length);
  points?.forEach((point, i) => {
    const [differentialPa, flowKgS] = wanted[i] ?? [NaN, NaN];
    expect(relativeError(point.differentialPa, differentialPa)).toBeLessThan(1e-12);
    expect(relativeError(point.flowKgS, flowKgS)).toBeLessThan(1e-12);
  });
}

describe('a block of capacities', () => {
  it.each([
    ['from a spreadsheet, units in brackets', 'Differential (psi)\tCapacity (lb/h)\n5\t250\n20\t510\n'],
    ['with units after a comma, quoted', '"Differential, psi","Capacity, lb/h"\r\n5,250\r\n20,510'],
    ['with semicolons and a line of units', 'Differential;Capacity\npsi;lb/h\n5;250\n20;510'],
    ['with the columns the other way round', 'Capacity [lb/h]\tDifferential [psi]\n250\t5\n510\t20'],
    ['without headings, in the person’s units', '5 250\n20 510'],
    ['from the greatest down', '20\t510\n5\t250'],
    ['with units in the cells', '5 psi\t250 lb/h\n20 psi\t510 lb/h'],
    ['with empty lines between', '\n5\t250\n\n20\t510\n\n'],
  ])('%s', (_how, text) => {
    expectPoints(read(text).points, [
      [5 * PSI, 250 * LB_H],
      [20 * PSI, 510 * LB_H],
    ]);
  });

  it('in other units than the person’s', () => {
    const { points, differential, flow } = read('Δp in bar\tflow in kg/h\n0.5\t90\n"1"\t1,270', US);
    expectPoints(points, [
      [5e4, 90 / 3600],
      [1e5, 1270 / 3600],
    ]);
    expect([differential.unit, flow.unit, differential.note, flow.note]).toEqual(['bar', 'kg/h', '', '']);
  });

  it('says which units were assumed', () => {
    const { differential, flow } = read('Differential\tCapacity\n50\t100', SI);
    expect(differential).toMatchObject({ unit: 'kPa', wrong: false });
    expect(differential.note).toContain('taken as kPa');
    expect(flow.note).toContain('The heading “Capacity” names no unit');
    expect(read('50\t100').flow.note).toBe('Capacity: No heading names a unit: numbers are taken as lb/h.');
  });

  it.each([
    ['a volume flow', 'Differential (psi)\tCapacity (gpm)\n5\t250', 'gpm'],
    [
      'a gauge pressure for a difference',
      'Differential psig\tCapacity lb/h\n5\t250',
      'psig counts from the atmosphere',
    ],
  ])('does not guess at a heading: %s', (_what, text, words) => {
    const { points, differential, flow } = read(text);
    expect(points).toBeNull();
    expect([differential, flow].find(({ wrong }) => wrong)?.note).toContain(words);
  });

  it.each([
    ['a word for a number', '5\t250\n10\tmany', 2, '“many”'],
    ['a decimal comma', '5\t250\n7,5\t300', 2, 'Did you mean 7.5'],
    ['a cell too few', '5\t250\n10\t', 2, '1 value in the row'],
    ['a cell too many', '5\t250\t99', 1, '3 values in the row'],
    ['nothing passed', '5\t250\n10\t0', 2, 'above nothing'],
    ['one differential twice', '5\t250\n\n5\t260', 3, 'stands in line 1 already'],
    ['a wrong dimension', '5 ft\t250', 1, 'ft is a length'],
  ])('names the line of %s', (_what, text, line, words) => {
    const { points, rows } = read(text);
    expect(points).toBeNull();
    const bad = rows.filter(({ complaint }) => complaint !== '');
    expect(bad.map((row) => row.line)).toEqual([line]);
    expect(bad[0]?.complaint).toContain(words);
  });

  it('of nothing is nothing', () => {
    expect(readCapacityText(' \n\t\n', US)).toBeNull();
    expect(read('Differential (psi)\tCapacity (lb/h)').points).toBeNull();
  });
});
