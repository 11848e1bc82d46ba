import { describe, expect, it } from 'vitest';
import {
  region1,
  region2,
  saturationPressurePa,
  saturationTemperatureK,
  surfaceTensionNM,
  viscosityPaS,
  type PhaseProperties,
} from '@riseback/steam';
import { readSteamFixture } from './steam-fixtures';

// Check values as printed in IAPWS R7-97(2012) Tables 5, 15, 35 and 36, R12-08 Table 4 and R1-76(2014) Table 1.
const rows = readSteamFixture('iapws_verification.csv');

describe('the check values IAPWS prints', () => {
  it('are all there', () => {
    expect(rows).toHaveLength(73);
  });

  it.each(rows)(
    '$release_table at $inputs: $quantity = $listed $unit',
    ({ release_table, inputs, quantity, listed }) => {
      const computed = inPrintedUnit(release_table ?? '', inputs ?? '', quantity ?? '');
      // To the last printed digit: half a unit of it either way.
      expect(Math.abs(computed - Number(listed))).toBeLessThanOrEqual(halfLastDigit(listed ?? ''));
    },
  );
});

/** 0.5e-11 for 0.100215168e-2; 0.005 for 58.91. */
function halfLastDigit(printed: string): number {
  const [, decimals, exponent] = /^\d*\.(\d+)(?:e(-?\d+))?$/.exec(printed) ?? [];
  return 0.5 * 10 ** (Number(exponent ?? 0) - (decimals?.length ?? NaN));
}

function inPrintedUnit(table: string, inputs: string, quantity: string): number {
  const input = (name: string): number => Number(new RegExp(`\\b${name}=([\\d.]+)`).exec(inputs)?.[1] ?? NaN);
  const pressurePa = input('p') * 1e6;
  if (table.includes('region 1')) return ofPhase(region1(pressurePa, input('T')), quantity);
  if (table.includes('region 2')) return ofPhase(region2(pressurePa, input('T')), quantity);
  switch (quantity) {
    case 'psat':
      return saturationPressurePa(input('T')) / 1e6;
    case 'Tsat':
      return saturationTemperatureK(pressurePa);
    case 'mu':
      return viscosityPaS(input('T'), input('rho')) * 1e6;
    case 'sigma':
      return surfaceTensionNM(input('t') + 273.15) * 1e3;
    default:
      return NaN;
  }
}

function ofPhase(properties: PhaseProperties, quantity: string): number {
  switch (quantity) {
    case 'v':
      return properties.specificVolumeM3Kg;
    case 'h':
      return properties.enthalpyJKg / 1e3;
    case 'u':
      return properties.internalEnergyJKg / 1e3;
    case 's':
      return properties.entropyJKgK / 1e3;
    case 'cp':
      return properties.specificHeatJKgK / 1e3;
    case 'w':
      return properties.speedOfSoundMS;
    default:
      return NaN;
  }
}
