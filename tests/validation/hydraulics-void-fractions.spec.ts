import {
  twoPhaseDensityKgM3,
  voidFractionChisholm,
  voidFractionHomogeneous,
  voidFractionRouhaniAxelsson,
  voidFractionZivi,
  type VoidFraction,
} from '@riseback/hydraulics';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';
import { flowOfRow } from '../fixtures/hydraulics/saturated-row';

const METHODS: readonly (readonly [string, VoidFraction])[] = [
  ['homogeneous', voidFractionHomogeneous],
  ['zivi', voidFractionZivi],
  ['chisholm', voidFractionChisholm],
  ['rouhaniAxelsson', voidFractionRouhaniAxelsson],
];

// Evaluated independently; see the fixture's head. Printed to nine digits from the properties as printed.
describe('void fractions', () => {
  const rows = readFigures('void-fractions.csv').map((row) => ({ row, flow: flowOfRow(row, 0) }));

  it.each(METHODS)('%s within 1e-5', (name, voidFraction) => {
    expect(rows.length).toBeGreaterThan(50);
    for (const { row, flow } of rows) {
      expect(relativeError(voidFraction(flow), Number(row(name))), row('id')).toBeLessThan(1e-5);
    }
  });

  it('density of the mixture with the drift-flux void fraction within 1e-5', () => {
    for (const { row, flow } of rows) {
      const density = twoPhaseDensityKgM3(flow, voidFractionRouhaniAxelsson(flow));
      expect(relativeError(density, Number(row('rouhaniDensity'))), row('id')).toBeLessThan(1e-5);
    }
  });
});
