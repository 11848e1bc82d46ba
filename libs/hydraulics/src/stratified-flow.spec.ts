import { findRootBracketed, NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boreAreaM2, GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import { darcyFrictionFactor } from './friction-factor';
import { pipeBore } from './pipe-catalogue';
import { STRATIFIED_SLOPE_LIMIT, stratifiedFlow } from './stratified-flow';
import type { FrictionLaw, LiquidSurface } from './stratified-forces';

/** 2 in schedule 40. */
const LINE: FlashingFlow = {
  massFlowKgS: 0.1,
  quality: 0.1,
  saturation: saturationState(101_325),
  insideDiameterM: 0.0525,
  roughnessM: 4.57e-5,
  lossCoefficientPerM: 0,
  fallSlope: 0,
};

// Taitel & Dukler, AIChE J. 22 (1976) 47-55: with a power law for both phases a level pipe's h depends on X alone. Levels solved
// independently with Fanning 0.046 Re^-0.2, to four digits; the paper's own half-full point is X = 1.6.
describe('stratified level over the Martinelli parameter', () => {
  const blasius: FrictionLaw = (Re) => 4 * 0.046 * Re ** -0.2;

  it.each([
    { X: 0.01, h: 0.0276 },
    { X: 0.1, h: 0.1247 },
    { X: 0.3, h: 0.2369 },
    { X: 1, h: 0.4208 },
    { X: 3, h: 0.6069 },
    { X: 10, h: 0.7709 },
    { X: 100, h: 0.9289 },
  ])('h = $h at X = $X', ({ X, h }) => {
    expect(Math.abs(levelAt(X) - h)).toBeLessThan(0.5e-4);
  });

  it('is half full at X = 1.584, the paper’s 1.6', () => {
    expect(Math.abs(levelAt(1.584) - 0.5)).toBeLessThan(1e-4);
  });

  function levelAt(X: number): number {
    const lnX = (lnQuality: number): number => {
      const quality = Math.exp(lnQuality);
      return Math.log(aloneGradient('liquid', quality) / aloneGradient('vapour', quality)) / 2 - Math.log(X);
    };
    const quality = Math.exp(findRootBracketed(lnX, -20, -1e-6));
    return levelOf({ ...LINE, quality }, 'smooth', blasius);
  }

  function aloneGradient(phase: 'liquid' | 'vapour', quality: number): number {
    const { saturation, insideDiameterM: D } = LINE;
    const share = phase === 'liquid' ? 1 - quality : quality;
    const massFlux = (share * LINE.massFlowKgS) / boreAreaM2(D);
    const viscosity = phase === 'liquid' ? saturation.liquidViscosityPaS : saturation.vapourViscosityPaS;
    const density = phase === 'liquid' ? saturation.liquidDensityKgM3 : saturation.vapourDensityKgM3;
    return (blasius((massFlux * D) / viscosity, 0) * massFlux ** 2) / (2 * density * D);
  }
});

// Twelve points solved independently by bisection, with Colebrook-White, roughness 0.0457 mm, schedule 40, IF97; level and falling
// 1:100. Printed to four digits and to 0.01 Pa/m; 0.5 % covers that in the least gradient.
describe('stratified level, friction and onset at printed points', () => {
  it.each([
    { bar: 1.01325, nps: '1', x: 0.1, m: 0.02, level: [0.2158, 22.8, 0.246], fall: [0.1658, 19.5, 0.165] },
    { bar: 1.01325, nps: '2', x: 0.1, m: 0.1, level: [0.216, 15.15, 0.208], fall: [0.1546, 12.53, 0.127] },
    { bar: 1.01325, nps: '3', x: 0.1, m: 0.5, level: [0.2177, 41.8, 0.73], fall: [0.1833, 37.34, 0.555] },
    { bar: 2.05, nps: '1-1/2', x: 0.06, m: 0.1, level: [0.3269, 16.37, 0.342], fall: [0.2253, 10.92, 0.147] },
    { bar: 2.05, nps: '3', x: 0.06, m: 0.6, level: [0.3291, 18.51, 0.502], fall: [0.2328, 12.52, 0.225] },
    { bar: 3, nps: '3', x: 0.03, m: 0.6, level: [0.4634, 7.53, 0.328], fall: [0.2511, 2.67, 0.046] },
  ] as const)('$nps in, $bar bar, x $x, $m kg/s', ({ bar, nps, x, m, level, fall }) => {
    for (const [fallSlope, [h, gradientPaM, leaveRatio]] of [
      [0, level],
      [0.01, fall],
    ] as const) {
      const insideDiameterM = pipeBore({ nps, schedule: '40' })?.insideDiameterM ?? NaN;
      const saturation = saturationState(bar * 1e5);
      const flow = stratifiedFlow({ ...LINE, massFlowKgS: m, quality: x, saturation, insideDiameterM, fallSlope });
      expect(Math.abs((flow?.section.levelFraction ?? NaN) - h)).toBeLessThan(0.6e-4);
      expect(relativeError(flow?.gradientPaM ?? NaN, gradientPaM)).toBeLessThan(0.005);
      expect(Math.abs((flow?.leaveRatio ?? NaN) - leaveRatio)).toBeLessThan(0.6e-3);
    }
  });
});

describe('stratified level against the balance as published', () => {
  const anyLine = fc.record<FlashingFlow>({
    massFlowKgS: fc.double({ min: -3, max: 1, noNaN: true }).map((decade) => 10 ** decade),
    quality: fc.double({ min: -4, max: -0.01, noNaN: true }).map((decade) => 10 ** decade),
    saturation: fc.double({ min: 20_000, max: 2e6, noNaN: true }).map((pressurePa) => saturationState(pressurePa)),
    insideDiameterM: fc.double({ min: 0.0125, max: 0.3, noNaN: true }),
    roughnessM: fc.constantFrom(0, 4.57e-5),
    lossCoefficientPerM: fc.constant(0),
    fallSlope: fc.constantFrom(0, 0.002, 0.01, 0.1, -0.003, -0.05),
  });

  // The document's equation written out in h, scanned upwards for its first change of sign: the lowest root. Two roots closer than the scan's
  // step may be missed by either side, so a level is also right where the equation changes its sign across it.
  it('is the lowest root, on a smooth and on a wavy surface', () => {
    fc.assert(
      fc.property(anyLine, fc.constantFrom<LiquidSurface>('smooth', 'wavy'), (line, surface) => {
        const h = levelOf(line, surface);
        const lowest = lowestRootByScan(line, surface);
        if (lowest.to >= 1 - 1e-4) return;
        if (h >= lowest.from * (1 - 1e-9) && h <= lowest.to * (1 + 1e-9)) return;
        expect(h).toBeLessThan(lowest.from);
        expect(publishedBalance(line, surface, h * (1 - 1e-7))).toBeGreaterThan(0);
        expect(publishedBalance(line, surface, h * (1 + 1e-7))).toBeLessThan(0);
      }),
      { numRuns: 150 },
    );
  });
});

describe('stratified flow and its surroundings', () => {
  it('loses the vapour’s velocity head in fittings', () => {
    const { vapourDensityKgM3 } = LINE.saturation;
    const vapourFlux = (0.1 * 0.1) / boreAreaM2(LINE.insideDiameterM);
    const bare = stratifiedFlow(LINE)?.gradientPaM ?? NaN;
    const fitted = stratifiedFlow({ ...LINE, lossCoefficientPerM: 0.5 })?.gradientPaM ?? NaN;
    expect(relativeError(fitted - bare, (0.5 * vapourFlux ** 2) / (2 * vapourDensityKgM3))).toBeLessThan(1e-11);
  });

  // Andritsos & Hanratty: no waves below 5 √(1.2/ρ_g) m/s, 7.1 m/s in steam at 100 °C. Vapour at 7.7 m/s here, 3.9 with half the load.
  it('waves hold a fast vapour back, and a slow one raises none', () => {
    const smooth = stratifiedFlow(LINE)?.gradientPaM ?? NaN;
    expect(stratifiedFlow(LINE, 'wavy')?.gradientPaM).toBeGreaterThan(1.05 * smooth);
    const slow = { ...LINE, massFlowKgS: 0.05 };
    expect(stratifiedFlow(slow, 'wavy')).toEqual(stratifiedFlow(slow, 'smooth'));
  });

  it('a steeper fall runs shallower and costs less', () => {
    const falls = [0, 0.002, 0.01, 0.05, 0.17].map((fallSlope) => stratifiedFlow({ ...LINE, fallSlope }));
    for (let i = 1; i < falls.length; i++) {
      expect(falls[i]?.section.levelFraction).toBeLessThan(falls[i - 1]?.section.levelFraction ?? NaN);
      expect(falls[i]?.gradientPaM).toBeLessThan(falls[i - 1]?.gradientPaM ?? NaN);
    }
  });

  it('a trace of vapour finds no room below the crown', () => {
    expect(stratifiedFlow({ ...LINE, quality: 1e-30 })).toBeUndefined();
  });

  it('a trace of liquid leaves the vapour as it is alone', () => {
    const { insideDiameterM: D, saturation } = LINE;
    const massFlux = LINE.massFlowKgS / boreAreaM2(D);
    const f = darcyFrictionFactor((massFlux * D) / saturation.vapourViscosityPaS, LINE.roughnessM / D);
    const alone = (f * massFlux ** 2) / (2 * saturation.vapourDensityKgM3 * D);
    const nearlyDry = stratifiedFlow({ ...LINE, quality: 1 - 1e-13 });
    expect(relativeError(nearlyDry?.gradientPaM ?? NaN, alone)).toBeLessThan(1e-6);
  });

  it.each([
    { quality: 0 },
    { quality: 1 },
    { quality: NaN },
    { massFlowKgS: 0 },
    { fallSlope: 1.01 * STRATIFIED_SLOPE_LIMIT },
    { fallSlope: NaN },
    { insideDiameterM: 0 },
  ])('refuses %o', (change) => {
    expect(() => stratifiedFlow({ ...LINE, ...change })).toThrow(NonPhysicalInputError);
  });
});

function levelOf(flow: FlashingFlow, surface: LiquidSurface, law?: FrictionLaw): number {
  return stratifiedFlow(flow, surface, law)?.section.levelFraction ?? 1;
}

/** Taitel and Dukler's balance in dimensional form, as docs/methods/by-pattern.md prints it [Pa/m]. */
function publishedBalance(flow: FlashingFlow, surface: LiquidSurface, h: number): number {
  const { insideDiameterM: D, saturation, quality, fallSlope } = flow;
  const rhoL = saturation.liquidDensityKgM3;
  const rhoG = saturation.vapourDensityKgM3;
  const c = 2 * h - 1;
  const a = Math.acos(c);
  const r = Math.sqrt(1 - c * c);
  const Al = (D * D * (Math.PI - a + c * r)) / 4;
  const Ag = (D * D * (a - c * r)) / 4;
  const Sl = D * (Math.PI - a);
  const Sg = D * a;
  const Si = D * r;
  const G = flow.massFlowKgS / boreAreaM2(D);
  const jG = (G * quality) / rhoG;
  const uL = ((G * (1 - quality)) / rhoL) * (boreAreaM2(D) / Al);
  const uG = jG * (boreAreaM2(D) / Ag);
  const Dl = (4 * Al) / Sl;
  const Dg = (4 * Ag) / (Sg + Si);
  const fL = darcyFrictionFactor((rhoL * uL * Dl) / saturation.liquidViscosityPaS, Math.min(0.9, flow.roughnessM / Dl));
  const fG = darcyFrictionFactor((rhoG * uG * Dg) / saturation.vapourViscosityPaS, Math.min(0.9, flow.roughnessM / Dg));
  const jT = 5 * Math.sqrt(1.2 / rhoG);
  const waves = surface === 'wavy' && jG > jT ? 1 + 15 * Math.sqrt(h) * (jG / jT - 1) : 1;
  const tauL = (fL * rhoL * uL * uL) / 8;
  const tauG = (fG * rhoG * uG * uG) / 8;
  const weight = (rhoL - rhoG) * GRAVITY_M_S2 * fallSlope;
  return (tauL * Sl) / Al - (tauG * Sg) / Ag - waves * tauG * Si * (1 / Al + 1 / Ag) - weight;
}

/** First cell of a fine scan in which the balance changes its sign; denser towards both ends. */
function lowestRootByScan(flow: FlashingFlow, surface: LiquidSurface): { from: number; to: number } {
  const CELLS = 3000;
  let from = 1e-5;
  for (let i = 1; i <= CELLS; i++) {
    const to = 1e-5 + (1 - 2e-5) * Math.sin((Math.PI / 2) * (i / CELLS)) ** 2;
    if (publishedBalance(flow, surface, to) <= 0) return { from, to };
    from = to;
  }
  return { from: 1, to: 1 };
}
