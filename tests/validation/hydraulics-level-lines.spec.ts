import { flashVapourSteamGradient } from '@riseback/hydraulics';
import { integrateAdaptive } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { readFigures, type FigureRow } from '../fixtures/hydraulics/read-figures';

const BAR_PA = 1e5;

// Independent integrations of the same model, the vapour alone in the bore, along level lines; see the fixture's head. Their
// own tolerance is about 2e-4 Pa, 1e-5 of the smallest rise; properties interpolated here add some 1e-6. Hence 1e-4 of the rise.
describe('vapour part of the flash method along level lines', () => {
  it.each(readFigures('level-lines.csv').map((row) => [row('id'), row] as const))('line %s', (_id, row) => {
    const expectedRisePa = (Number(row('upstreamBar')) - Number(row('receiverBar'))) * BAR_PA;
    expect(Math.abs(upstreamRisePa(row) - expectedRisePa)).toBeLessThan(1e-4 * expectedRisePa);
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
