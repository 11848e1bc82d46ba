import { flashVapourSteamGradient } from '@riseback/hydraulics';
import { integrateAdaptive } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { readFigures, type FigureRow } from '../fixtures/hydraulics/read-figures';

const BAR_PA = 1e5;

// Independent integrations of the same model, the vapour alone in the bore, along level lines; see the fixture's head. The
// rows print pressures to 1e-9 bar, so 0.1 % of the rise is the agreement asked of the model itself.
describe('vapour part of the flash method along level lines', () => {
  it.each(readFigures('level-lines.csv').map((row) => [row('id'), row] as const))('line %s', (_id, row) => {
    const expectedRisePa = (Number(row('upstreamBar')) - Number(row('receiverBar'))) * BAR_PA;
    expect(Math.abs(upstreamRisePa(row) - expectedRisePa)).toBeLessThan(0.001 * expectedRisePa);
  });
});

function upstreamRisePa(row: FigureRow): number {
  const receiverPa = Number(row('receiverBar')) * BAR_PA;
  const enthalpyJKg = saturationState(Number(row('trapInletBar')) * BAR_PA).liquidEnthalpyJKg;
  const gradient = (_distanceM: number, pressurePa: number): number => {
    const saturation = saturationState(pressurePa);
    const latentJKg = saturation.vapourEnthalpyJKg - saturation.liquidEnthalpyJKg;
    return flashVapourSteamGradient({
      massFlowKgS: Number(row('flowKgH')) / 3600,
      quality: (enthalpyJKg - saturation.liquidEnthalpyJKg) / latentJKg,
      saturation,
      insideDiameterM: Number(row('boreMm')) / 1000,
      roughnessM: Number(row('roughnessM')),
      lossCoefficientPerM: 0,
      fallSlope: 0,
    });
  };
  const start = { s: 0, y: receiverPa };
  const end = integrateAdaptive(gradient, start, Number(row('lengthM')), {
    absoluteTolerance: 0.01,
    maximumSteps: 1000,
  });
  return end.y - receiverPa;
}
