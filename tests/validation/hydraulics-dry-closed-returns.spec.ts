import { flashVapourGradient, pipeBore } from '@riseback/hydraulics';
import { findRootBracketed } from '@riseback/numerics';
import { saturationState, type SaturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { readFigures, type FigureRow } from '../fixtures/hydraulics/read-figures';

const PSI_PA = 6894.757293;
const ATMOSPHERE_PA = 14.696 * PSI_PA;
const POUND_PER_HOUR_KG_S = 0.45359237 / 3600;
const HUNDRED_FEET_M = 30.48;
/** Steel pipe of the handbook's chapter, 0.0018 in. */
const ROUGHNESS_M = 0.0018 * 0.0254;

// ASHRAE Handbook, Fundamentals, pipe sizing: flow of condensate (lb/h) in dry-closed returns, by supply and return
// pressure, gradient and size; some cells from memory, marked in the fixture. The vapour's part alone is compared: the
// table counts no liquid. Small flows are printed to two or three digits (95 lb/h is ± 0.5 %), and the handbook's own bores
// are in inches: hence the wider band below 2 in.
describe('flash method against the dry-closed-return table', () => {
  const cells = readFigures('ashrae-dry-closed-returns.csv').map((row) => ({
    name: `${row('supplyPsig')}/${row('returnPsig')} psig, ${row('gradientPsiPer100Ft')} psi/100 ft, ${row('nps')} in`,
    nominalInches: Number(row('nps')),
    error: flowAtGradientLbH(row) / Number(row('flowLbH')) - 1,
  }));

  it('holds the whole table within 3.5 % in flow', () => {
    expect(cells).toHaveLength(103);
    for (const { name, error } of cells) expect(Math.abs(error), name).toBeLessThan(0.035);
  });

  it('holds it within 1.1 % rms', () => {
    const meanSquare = cells.reduce((sum, { error }) => sum + error * error, 0) / cells.length;
    expect(Math.sqrt(meanSquare)).toBeLessThan(0.011);
  });

  it('holds sizes from 2 in up within 1.6 %', () => {
    const large = cells.filter(({ nominalInches }) => nominalInches >= 2);
    expect(large.length).toBeGreaterThan(40);
    for (const { name, error } of large) expect(Math.abs(error), name).toBeLessThan(0.016);
  });
});

/** The flow at which the vapour's part reaches the gradient of the table's column. */
function flowAtGradientLbH(row: FigureRow): number {
  const saturation = saturationState(Number(row('returnPsig')) * PSI_PA + ATMOSPHERE_PA);
  const supply = saturationState(Number(row('supplyPsig')) * PSI_PA + ATMOSPHERE_PA);
  const insideDiameterM = schedule40BoreM(row('nps'));
  const gradientPaM = (Number(row('gradientPsiPer100Ft')) * PSI_PA) / HUNDRED_FEET_M;
  const quality = flashQuality(supply, saturation);
  const excess = (flowLbH: number): number =>
    flashVapourGradient({
      massFlowKgS: flowLbH * POUND_PER_HOUR_KG_S,
      quality,
      saturation,
      insideDiameterM,
      roughnessM: ROUGHNESS_M,
      lossCoefficientPerM: 0,
      fallSlope: 1 / 240,
    }).flashPaM - gradientPaM;
  return findRootBracketed(excess, 1, 1e6, { where: 'dry-closed return', xTolerance: 1e-6 });
}

function flashQuality(supply: SaturationState, atReturn: SaturationState): number {
  return (
    (supply.liquidEnthalpyJKg - atReturn.liquidEnthalpyJKg) / (atReturn.vapourEnthalpyJKg - atReturn.liquidEnthalpyJKg)
  );
}

function schedule40BoreM(decimalInches: string): number {
  const nps =
    { '0.5': '1/2', '0.75': '3/4', '1.25': '1-1/4', '1.5': '1-1/2', '2.5': '2-1/2' }[decimalInches] ?? decimalInches;
  const bore = pipeBore({ nps, schedule: '40' });
  if (bore === undefined) throw new Error(`No schedule 40 pipe of ${nps} in`);
  return bore.insideDiameterM;
}
