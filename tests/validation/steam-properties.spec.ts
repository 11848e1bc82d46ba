import { describe, expect, it } from 'vitest';
import { relativeError } from '@riseback/numerics';
import {
  liquidAtEnthalpy,
  liquidAtTemperature,
  region1,
  region2,
  saturationPressurePa,
  saturationState,
  saturationStateDirect,
  saturationTemperatureK,
  surfaceTensionNM,
  vapourAtEnthalpy,
  viscosityPaS,
} from '@riseback/steam';
import { column, readSteamNumbers } from './steam-fixtures';

// The fixtures come from another implementation of the same releases (iapws 1.5.2, see their headers) with ten digits.
const TOLERANCE = 1e-6;

describe.each([
  {
    name: 'region 1, liquid',
    fixture: 'if97_region1.csv',
    rowCount: 100,
    region: region1,
    atEnthalpy: liquidAtEnthalpy,
  },
  { name: 'region 2, steam', fixture: 'if97_region2.csv', rowCount: 91, region: region2, atEnthalpy: vapourAtEnthalpy },
])('$name, against an independent implementation', ({ fixture, rowCount, region, atEnthalpy }) => {
  const rows = readSteamNumbers(fixture);

  it(`reads ${rowCount} rows`, () => {
    expect(rows).toHaveLength(rowCount);
  });

  it.each(rows)('agrees at $p_MPa MPa and $T_K K', (row) => {
    const temperatureK = column(row, 'T_K');
    const pressurePa = column(row, 'p_MPa') * 1e6;
    const state = region(pressurePa, temperatureK);
    expectAgreement(state.enthalpyJKg, column(row, 'h_kJkg') * 1e3);
    expectAgreement(state.entropyJKgK, column(row, 's_kJkgK') * 1e3);
    expectAgreement(state.densityKgM3, column(row, 'rho_kgm3'));
    expectAgreement(state.specificHeatJKgK, column(row, 'cp_kJkgK') * 1e3);
    expectAgreement(state.speedOfSoundMS, column(row, 'w_ms'));
    expectAgreement(viscosityPaS(temperatureK, state.densityKgM3), column(row, 'mu_Pas'));
  });

  it.each(rows)('finds $T_K K again from the enthalpy at $p_MPa MPa', (row) => {
    const state = atEnthalpy(column(row, 'p_MPa') * 1e6, column(row, 'h_kJkg') * 1e3);
    expectAgreement(state.temperatureK, column(row, 'T_K'));
    expectAgreement(state.densityKgM3, column(row, 'rho_kgm3'));
    expectAgreement(state.viscosityPaS, column(row, 'mu_Pas'));
  });
});

describe('saturation, against an independent implementation', () => {
  const rows = readSteamNumbers('if97_saturation.csv');

  it('reads 66 rows', () => {
    expect(rows).toHaveLength(66);
  });

  it.each(rows)('agrees at $p_MPa MPa, by the equations and by the table', (row) => {
    const pressurePa = column(row, 'p_MPa') * 1e6;
    for (const state of [saturationStateDirect(pressurePa), saturationState(pressurePa)]) {
      expectAgreement(state.temperatureK, column(row, 'Tsat_K'));
      expectAgreement(state.liquidDensityKgM3, column(row, 'rho_f_kgm3'));
      expectAgreement(state.vapourDensityKgM3, column(row, 'rho_g_kgm3'));
      expectAgreement(state.liquidEnthalpyJKg, column(row, 'h_f_kJkg') * 1e3);
      expectAgreement(state.vapourEnthalpyJKg, column(row, 'h_g_kJkg') * 1e3);
      expectAgreement(state.vapourEnthalpyJKg - state.liquidEnthalpyJKg, column(row, 'h_fg_kJkg') * 1e3);
      expectAgreement(state.liquidViscosityPaS, column(row, 'mu_f_Pas'));
      expectAgreement(state.vapourViscosityPaS, column(row, 'mu_g_Pas'));
      expectAgreement(state.surfaceTensionNM, column(row, 'sigma_Nm'));
    }
    expectAgreement(saturationPressurePa(column(row, 'Tsat_K')), pressurePa);
    expectAgreement(surfaceTensionNM(saturationTemperatureK(pressurePa)), column(row, 'sigma_Nm'));
  });
});

describe('common practice', () => {
  it('150 psig saturates at 366 °F', () => {
    const pressurePa = (150 + 14.696) * 6894.757; // psi to Pa: NIST SP 811
    const fahrenheit = (saturationState(pressurePa).temperatureK - 273.15) * 1.8 + 32;
    expect(Math.round(fahrenheit)).toBe(366);
  });

  it('water boils at 100 °C at one atmosphere', () => {
    // 99.97 °C on the present temperature scale
    expect(Math.round(saturationState(101_325).temperatureK - 273.15)).toBe(100);
  });

  it('cold water weighs 1000 kg/m³ and boiling water 4 % less', () => {
    expect(relativeError(liquidAtTemperature(101_325, 277.15).densityKgM3, 1000)).toBeLessThan(1e-3);
    expect(relativeError(saturationState(101_325).liquidDensityKgM3, 960)).toBeLessThan(5e-3);
  });
});

function expectAgreement(actual: number, expected: number): void {
  expect(relativeError(actual, expected)).toBeLessThan(TOLERANCE);
}
