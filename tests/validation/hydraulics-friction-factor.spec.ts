import {
  darcyFrictionFactor,
  darcyGradient,
  fittingLossCoefficient,
  turbulentFrictionFactorCrane,
} from '@riseback/hydraulics';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';

const FOOT_M = 0.3048;
const INCH_M = 0.0254;
const PSI_PA = 6894.757293;
const LB_FT3_KG_M3 = 16.01846337;

describe('Darcy friction factor against print', () => {
  // Colebrook, J. Inst. Civ. Eng. 11 (1939); figures to nine digits in the fixture, hence 1e-8.
  it('agrees with Colebrook-White and 64/Re over the whole table', () => {
    const rows = readFigures('friction-factor.csv');
    expect(rows.length).toBeGreaterThan(250);
    for (const row of rows) {
      const f = darcyFrictionFactor(Number(row('Re')), Number(row('relativeRoughness')));
      expect(relativeError(f, Number(row('f'))), `Re ${row('Re')}, k ${row('relativeRoughness')}`).toBeLessThan(1e-8);
    }
  });

  // Any Moody chart (from memory): f = 0.0222 at Re 1e5, k 0.001. Three printed digits, hence half of the last.
  it('reads 0.0222 off the Moody chart', () => {
    expect(Math.abs(darcyFrictionFactor(1e5, 0.001) - 0.0222)).toBeLessThan(5e-5);
  });

  // Crane TP-410M, example 7.1: smooth pipe at Re 100 600, f 0.0179 read off its chart; a chart is read within 1.5 %.
  it('agrees with the smooth pipe of Crane example 7.1', () => {
    expect(relativeError(darcyFrictionFactor(100_600, 0), 0.0179)).toBeLessThan(0.015);
  });
});

describe('pressure drop against worked examples', () => {
  // Crane TP-410, example 7.9, laminar flow: SAE 30 oil, 400 US gal/min in 300 ft of 5 in schedule 40, gate valve, angle
  // valve, a bend of 20 f_T, rise 50 ft. Printed Re 1676, f 0.0382; an evaluation of the example gives 26.06 psi.
  // Three digits are printed for the inputs, hence 0.5 %.
  it('Crane example 7.9: laminar oil through valves and a rise', () => {
    const insideDiameterM = 5.047 * INCH_M;
    const densityKgM3 = 0.87 * 62.364 * LB_FT3_KG_M3;
    const massFlowKgS = ((400 * 3.785411784e-3) / 60) * densityKgM3;
    const fittings =
      fittingLossCoefficient('gateValve', insideDiameterM) +
      fittingLossCoefficient('angleValve', insideDiameterM) +
      20 * turbulentFrictionFactorCrane(insideDiameterM);
    const lengthM = 300 * FOOT_M;
    const friction = darcyGradient({
      massFlowKgS,
      densityKgM3,
      viscosityPaS: 0.13,
      insideDiameterM,
      roughnessM: 4.57e-5,
      lossCoefficientPerM: fittings / lengthM,
    });
    const dropPa = friction * lengthM + densityKgM3 * 9.80665 * 50 * FOOT_M;
    expect(relativeError(dropPa / PSI_PA, 26.06)).toBeLessThan(0.005);
  });

  // White, Fluid Mechanics, inclined-pipe example (from memory): 0.2 m3/s of oil, 900 kg/m3, 1e-5 m2/s, through 500 m of
  // 200 mm cast iron of roughness 0.26 mm loses 117 m of head. The text reads f off the chart, hence 1 %.
  it('White: oil in a cast-iron main', () => {
    const gradient = darcyGradient({
      massFlowKgS: 0.2 * 900,
      densityKgM3: 900,
      viscosityPaS: 900 * 1e-5,
      insideDiameterM: 0.2,
      roughnessM: 0.26e-3,
      lossCoefficientPerM: 0,
    });
    expect(relativeError((gradient * 500) / (900 * 9.80665), 117)).toBeLessThan(0.01);
  });
});
