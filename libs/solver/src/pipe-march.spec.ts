import { boreAreaM2, isenthalpicVolumeSlope } from '@riseback/hydraulics';
import { FRICTION_METHODS, type FrictionMethod } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { SATURATION_RANGE_PA, saturationState, saturationStateDirect } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { mayChoke } from './choking';
import { PipeMarcher, type MarchMethod } from './pipe-march';

const METHOD: MarchMethod = {
  staticLift: 'rule',
  liftRulePaM: 11_310.297,
  dropCredit: 0,
  friction: 'homogeneous',
  voidFraction: 'rouhaniAxelsson',
  acceleration: true,
};
const BORE_M = 0.02664;
const NODE_PA = 101_325;
const ENTHALPY = saturationStateDirect(8e5).liquidEnthalpyJKg;

function march(method: Partial<MarchMethod>, massFlowKgS: number, { lengthM = 10, riseM = 0, nodePa = NODE_PA } = {}) {
  const pipe = {
    lengthM,
    insideDiameterM: BORE_M,
    roughnessM: 4.57e-5,
    lossCoefficientPerM: 0,
    heatLossWM: 0,
    pieces: [{ lengthM, riseM }],
  };
  const flow = { massFlowKgS, inletEnthalpyJKg: ENTHALPY, heatLossWM: 0, ambientEnthalpyJKg: 84_000 };
  const marcher = new PipeMarcher({ method: { ...METHOD, ...method }, tolerancePa: 0.1 });
  return marcher.march(pipe, flow, pipe.pieces, nodePa);
}

/** Greatest flux that leaves at a pressure: G² = −1/(dv/dp)_h by differences of IF97 itself, the vapour's share or all of it. */
function criticalFlux(pressurePa: number, vapourAlone: boolean): number {
  const volumeAt = (p: number): number => {
    const { liquidEnthalpyJKg, vapourEnthalpyJKg, liquidDensityKgM3, vapourDensityKgM3 } = saturationStateDirect(p);
    const x = (ENTHALPY - liquidEnthalpyJKg) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
    return vapourAlone ? 1 / vapourDensityKgM3 : x / vapourDensityKgM3 + (1 - x) / liquidDensityKgM3;
  };
  const { liquidEnthalpyJKg, vapourEnthalpyJKg } = saturationStateDirect(pressurePa);
  const x = (ENTHALPY - liquidEnthalpyJKg) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
  const step = pressurePa * 1e-4;
  const flux = Math.sqrt((-2 * step) / (volumeAt(pressurePa + step) - volumeAt(pressurePa - step)));
  return vapourAlone ? flux / x : flux;
}

describe('choking', () => {
  it.each(FRICTION_METHODS)(
    'holds the outlet at the critical pressure by %s, the jump counted as flash',
    (friction) => {
      const criticalPa = 150_000;
      const massFlowKgS = criticalFlux(criticalPa, friction === 'flashVapour') * boreAreaM2(BORE_M);
      const { outletPressurePa, upstreamPressurePa, flashPa, frictionPa, staticPa } = march({ friction }, massFlowKgS);
      expect(relativeError(outletPressurePa, criticalPa)).toBeLessThan(1e-5);
      expect(flashPa).toBeGreaterThan(criticalPa - NODE_PA);
      expect(relativeError(NODE_PA + flashPa + frictionPa + staticPa, upstreamPressurePa)).toBeLessThan(1e-12);
    },
  );

  it.each<FrictionMethod>(['homogeneous', 'flashVapour', 'byPattern'])(
    'goes over smoothly from a free outlet by %s',
    (friction) => {
      const massFlowKgS = criticalFlux(NODE_PA, friction === 'flashVapour') * boreAreaM2(BORE_M);
      const [below, at, above] = [0.9999, 1, 1.0001].map((share) => march({ friction }, massFlowKgS * share));
      expect(below?.outletPressurePa).toBe(NODE_PA);
      expect(above?.outletPressurePa).toBeGreaterThan(NODE_PA);
      for (const side of [below, above])
        expect(relativeError(side?.upstreamPressurePa ?? NaN, at?.upstreamPressurePa ?? NaN)).toBeLessThan(5e-4);
    },
  );

  it('makes what stands behind a choked line independent of the node below it', () => {
    const massFlowKgS = criticalFlux(200_000, false) * boreAreaM2(BORE_M);
    const [low, high] = [50_000, 150_000].map((nodePa) => march({}, massFlowKgS, { nodePa }).upstreamPressurePa);
    expect(relativeError(low ?? NaN, high ?? NaN)).toBeLessThan(1e-6);
  });

  it('is told of a march without the acceleration term too', () => {
    const massFlowKgS = criticalFlux(150_000, false) * boreAreaM2(BORE_M);
    expect(relativeError(march({ acceleration: false }, massFlowKgS).outletPressurePa, 150_000)).toBeLessThan(1e-5);
  });

  it('is never ruled out where the flow chokes, from 0.0065 to 100 bar and into superheat', () => {
    const [lowPa, highPa] = SATURATION_RANGE_PA;
    for (let i = 0; i <= 200; i++) {
      const pressurePa = lowPa * 1.001 * ((highPa * 0.999) / (lowPa * 1.001)) ** (i / 200);
      const saturation = saturationState(pressurePa);
      for (let x = 1e-6; x < 1.3; x += 0.02) {
        const { liquidEnthalpyJKg, vapourEnthalpyJKg } = saturation;
        const slope = isenthalpicVolumeSlope(
          saturation,
          liquidEnthalpyJKg + x * (vapourEnthalpyJKg - liquidEnthalpyJKg),
        );
        expect(mayChoke(Math.sqrt(-1 / slope), pressurePa)).toBe(true);
      }
    }
  });
});

describe('acceleration', () => {
  it('turns momentum into pressure as its integral says: p + G²v falls by friction alone', () => {
    const massFlowKgS = 0.25;
    const G = massFlowKgS / boreAreaM2(BORE_M);
    const volumeAt = (pressurePa: number): number => {
      const { liquidEnthalpyJKg, vapourEnthalpyJKg, liquidDensityKgM3, vapourDensityKgM3 } =
        saturationStateDirect(pressurePa);
      const x = (ENTHALPY - liquidEnthalpyJKg) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
      return x / vapourDensityKgM3 + (1 - x) / liquidDensityKgM3;
    };
    const accelerated = march({}, massFlowKgS);
    // by hand: the same line in 4000 short stretches, each with its own friction, in the variable p + G²v
    let pressurePa = accelerated.outletPressurePa;
    expect(pressurePa).toBe(NODE_PA);
    const stretches = 4000;
    for (let i = 0; i < stretches; i++) {
      const without = march({ acceleration: false }, massFlowKgS, { lengthM: 10 / stretches, nodePa: pressurePa });
      const momentumPa = G * G * volumeAt(pressurePa) + without.upstreamPressurePa;
      let next = without.upstreamPressurePa;
      for (let k = 0; k < 60; k++) next = momentumPa - G * G * volumeAt(next);
      pressurePa = next;
    }
    expect(relativeError(accelerated.upstreamPressurePa - NODE_PA, pressurePa - NODE_PA)).toBeLessThan(2e-3);
  });
});

describe('falls', () => {
  it('give their head back by dropCredit where the flow fills the bore, and not where it is stratified', () => {
    const credited = (friction: FrictionMethod, massFlowKgS: number): number =>
      -march({ friction, dropCredit: 1, staticLift: 'liquidFull' }, massFlowKgS, { riseM: -0.3 }).staticPa;
    expect(credited('mullerSteinhagenHeck', 0.002)).toBeGreaterThan(2500);
    // the same trickle runs along the bottom of the pipe
    expect(Math.abs(credited('byPattern', 0.002))).toBe(0);
    // a flow that tears the liquid off the bottom fills the bore
    expect(credited('byPattern', 0.3)).toBeGreaterThan(2500);
  });
});
