import { GRAVITY_M_S2 } from '@riseback/hydraulics';
import { relativeError } from '@riseback/numerics';
import { liquidAtTemperature } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';

const PSI_PER_FOOT_PA_M = 6894.757293 / 0.3048;

describe('static head of a full riser', () => {
  // IAPWS-IF97 densities computed independently, seven printed digits; the temperatures are printed to 1e-6 K. Hence 1e-6.
  it.each(readFigures('static-head.csv').map((row) => [row('temperatureC'), row] as const))(
    'water at %s °C',
    (celsius, row) => {
      const { densityKgM3 } = liquidAtTemperature(101_325, Number(celsius) + 273.15);
      const headPaM = densityKgM3 * GRAVITY_M_S2;
      expect(relativeError(densityKgM3, Number(row('densityKgM3')))).toBeLessThan(1e-6);
      expect(relativeError(headPaM / PSI_PER_FOOT_PA_M, Number(row('psiPerFt')))).toBeLessThan(1e-6);
      expect(relativeError(headPaM / 1e5, Number(row('barPerM')))).toBeLessThan(1e-6);
    },
  );

  // Handbook round figures for cold water: 0.433 psi/ft, 2.31 ft/psi; and the condensate-lift rule 0.1 bar per m (common
  // practice). Three digits, hence half of the last; the rule is meant to be on the safe side by a few per cent.
  it('agrees with the round figures', () => {
    const coldPsiPerFoot = (liquidAtTemperature(101_325, 288.706).densityKgM3 * GRAVITY_M_S2) / PSI_PER_FOOT_PA_M;
    expect(Math.abs(coldPsiPerFoot - 0.433)).toBeLessThan(0.0005);
    expect(Math.abs(1 / coldPsiPerFoot - 2.31)).toBeLessThan(0.005);
    const hotBarPerM = (liquidAtTemperature(101_325, 372.15).densityKgM3 * GRAVITY_M_S2) / 1e5;
    expect(hotBarPerM).toBeLessThan(0.1);
    expect(hotBarPerM).toBeGreaterThan(0.09);
  });
});
