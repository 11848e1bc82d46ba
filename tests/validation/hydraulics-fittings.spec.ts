import { FITTINGS, fittingLossCoefficient, turbulentFrictionFactorCrane, type FittingName } from '@riseback/hydraulics';
import { FITTING_KINDS } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';

// All figures here are table values, so agreement is exact but for the last bit; 0.5 % is what the figures are worth.
const TOLERANCE = 0.005;

describe('fittings against Crane TP-410', () => {
  it('has figures for every kind of the file format, and no others', () => {
    expect(Object.keys(FITTINGS).sort()).toEqual([...FITTING_KINDS].sort());
  });

  // Crane TP-410, appendix A, f_T by nominal size.
  it.each(readFigures('crane-turbulent-friction.csv').map((row) => [row('nps'), row] as const))(
    'f_T of %s in',
    (_nps, row) => {
      const frictionFactor = turbulentFrictionFactorCrane(Number(row('boreMm')) / 1000);
      expect(relativeError(frictionFactor, Number(row('frictionFactor')))).toBeLessThan(TOLERANCE);
    },
  );

  // Crane TP-410, appendix A, K = (L/D) f_T.
  it.each(readFigures('crane-loss-coefficients.csv').map((row) => [row('kind'), row('nps'), row] as const))(
    'K of %s in %s in',
    (kind, _nps, row) => {
      const K = fittingLossCoefficient(kind as FittingName, Number(row('boreMm')) / 1000);
      expect(relativeError(K, Number(row('lossCoefficient')))).toBeLessThan(TOLERANCE);
    },
  );

  // Crane TP-410M, example 7.2: a valve of L/D 240 in 150 mm pipe of 154 mm bore has K 3.6.
  it('example 7.2: K 3.6 at L/D 240 and 154 mm', () => {
    expect(relativeError(240 * turbulentFrictionFactorCrane(0.154), 3.6)).toBeLessThan(TOLERANCE);
  });

  // Crane TP-410, appendix A (from memory): butterfly valves by size, 45 to 8 in, 35 from 10 to 14 in, 25 from 16 to 24 in.
  it.each([
    { nominalInches: 8, boreM: 0.20274, lossCoefficient: 45 * 0.014 },
    { nominalInches: 10, boreM: 0.25446, lossCoefficient: 35 * 0.014 },
    { nominalInches: 14, boreM: 0.33334, lossCoefficient: 35 * 0.013 },
    { nominalInches: 16, boreM: 0.381, lossCoefficient: 25 * 0.013 },
  ])('butterfly valve of $nominalInches in', ({ boreM, lossCoefficient }) => {
    expect(relativeError(fittingLossCoefficient('butterflyValve', boreM), lossCoefficient)).toBeLessThan(TOLERANCE);
  });

  // Crane TP-410, appendix A: sharp-edged entrance 0.5 (from memory), exit 1 (also Borda-Carnot), whatever the bore.
  it('entrance and exit do not depend on the bore', () => {
    for (const boreM of [0.01, 0.05, 0.5]) {
      expect(fittingLossCoefficient('entrance', boreM)).toBe(0.5);
      expect(fittingLossCoefficient('exit', boreM)).toBe(1);
    }
  });
});
