import {
  accelerationFactor,
  boreAreaM2,
  friedelGradient,
  GRAVITY_M_S2,
  homogeneousGradient,
  mullerSteinhagenHeckGradient,
  twoPhaseDensityKgM3,
  voidFractionHomogeneous,
  voidFractionRouhaniAxelsson,
  type FlashingFlow,
  type VoidFraction,
} from '@riseback/hydraulics';
import { integrateAdaptive } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { readFigures, type FigureRow } from '../fixtures/hydraulics/read-figures';

interface Model {
  readonly friction: (flow: FlashingFlow) => number;
  readonly voidFraction: VoidFraction;
  readonly accelerates: boolean;
}

const BAR_PA = 1e5;
const MODELS: readonly (readonly [string, Model])[] = [
  ['homogeneous', { friction: homogeneousGradient, voidFraction: voidFractionHomogeneous, accelerates: false }],
  ['accelerated', { friction: homogeneousGradient, voidFraction: voidFractionHomogeneous, accelerates: true }],
  [
    'mullerSteinhagenHeck',
    { friction: mullerSteinhagenHeckGradient, voidFraction: voidFractionRouhaniAxelsson, accelerates: false },
  ],
  ['friedel', { friction: friedelGradient, voidFraction: voidFractionRouhaniAxelsson, accelerates: false }],
];

// Independent marches of the same models; see the fixture’s head. Properties interpolated here add some 1e-6 of the
// difference, the tolerances of both marches as much again: hence 1e-4 of it.
describe.each(MODELS)('sloped flashing lines, %s', (name, model) => {
  it.each(readFigures('flashing-lines.csv').map((row) => [row('id'), row] as const))('line %s', (_id, row) => {
    const receiverPa = Number(row('receiverBar')) * BAR_PA;
    const expectedPa = Number(row(name)) * BAR_PA;
    const off = Math.abs(inletPressurePa(row, model) - expectedPa);
    expect(off).toBeLessThan(1e-4 * Math.abs(expectedPa - receiverPa));
  });
});

function inletPressurePa(row: FigureRow, { friction, voidFraction, accelerates }: Model): number {
  const receiverPa = Number(row('receiverBar')) * BAR_PA;
  const enthalpyJKg = saturationState(Number(row('trapInletBar')) * BAR_PA).liquidEnthalpyJKg;
  const lengthM = Number(row('lengthM'));
  const riseSlope = Number(row('riseM')) / lengthM;
  const insideDiameterM = Number(row('boreMm')) / 1000;
  const massFlowKgS = Number(row('flowKgH')) / 3600;
  const massFlux = massFlowKgS / boreAreaM2(insideDiameterM);
  const gradient = (_distanceM: number, pressurePa: number): number => {
    const saturation = saturationState(pressurePa);
    const latentJKg = saturation.vapourEnthalpyJKg - saturation.liquidEnthalpyJKg;
    const flow: FlashingFlow = {
      massFlowKgS,
      quality: (enthalpyJKg - saturation.liquidEnthalpyJKg) / latentJKg,
      saturation,
      insideDiameterM,
      roughnessM: Number(row('roughnessM')),
      lossCoefficientPerM: 0,
      fallSlope: -riseSlope,
    };
    const staticPaM = twoPhaseDensityKgM3(flow, voidFraction(flow)) * GRAVITY_M_S2 * riseSlope;
    const factor = accelerates ? accelerationFactor(massFlux, saturation, enthalpyJKg) : 1;
    return (friction(flow) + staticPaM) / factor;
  };
  const options = { absoluteTolerance: 0.01, maximumSteps: 5000 };
  return integrateAdaptive(gradient, { s: 0, y: receiverPa }, lengthM, options).y;
}
