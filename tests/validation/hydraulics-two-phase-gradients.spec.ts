import {
  friedelGradient,
  homogeneousGradient,
  lockhartMartinelliGradient,
  mullerSteinhagenHeckGradient,
  type FlashingFlow,
} from '@riseback/hydraulics';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';
import { flowOfRow } from '../fixtures/hydraulics/saturated-row';

const METHODS: readonly (readonly [string, (flow: FlashingFlow) => number])[] = [
  ['homogeneous', homogeneousGradient],
  ['lockhartMartinelli', lockhartMartinelliGradient],
  ['friedel', friedelGradient],
  ['mullerSteinhagenHeck', mullerSteinhagenHeckGradient],
];

// Correlations evaluated independently; see the fixture's head. Properties are printed to six digits and used as printed; gradients to nine:
// 1e-5 leaves room for the friction factor's own solution there. Rows with a Reynolds number between 1900 and 4200 cross
// laminar flow at once where this program bridges, and Chisholm's C by steps where it runs: so within a factor of two, no closer.
describe('friction gradients of two-phase flow', () => {
  const rows = readFigures('two-phase-gradients.csv').map((row) => ({
    row,
    flow: flowOfRow(row, Number(row('roughnessM'))),
    transitional: row('transitional') === '1',
  }));

  it('has rows of both kinds', () => {
    expect(rows).toHaveLength(200);
    expect(rows.filter(({ transitional }) => !transitional).length).toBeGreaterThan(120);
  });

  it.each(METHODS)('%s, clear of the transition, within 1e-5', (name, gradient) => {
    for (const { row, flow, transitional } of rows) {
      if (transitional) continue;
      expect(relativeError(gradient(flow), Number(row(name))), row('id')).toBeLessThan(1e-5);
    }
  });

  it.each(METHODS)('%s in the transition within half', (name, gradient) => {
    for (const { row, flow, transitional } of rows) {
      if (transitional) expect(relativeError(gradient(flow), Number(row(name))), row('id')).toBeLessThan(0.5);
    }
  });
});
