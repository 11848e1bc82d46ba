import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { darcyGradient } from './darcy-gradient';
import { DRAINING_QUALITY, flashVapourGradient, fullLineShare, LEAST_PITCH, type FlashingFlow } from './flash-vapour';

const ATMOSPHERIC = saturationState(101_325);
/** 3 in schedule 40, level. */
const RETURN: FlashingFlow = {
  massFlowKgS: 0.5,
  quality: 0.1,
  saturation: ATMOSPHERIC,
  insideDiameterM: 0.07792,
  roughnessM: 4.57e-5,
  lossCoefficientPerM: 0.2,
  fallSlope: 0,
};

/** Return lines of every kind the file can hold, within what is built. */
const anyReturn = fc.record<Omit<FlashingFlow, 'quality'>>({
  massFlowKgS: fc.double({ min: 1e-4, max: 50, noNaN: true }),
  saturation: fc.double({ min: 20_000, max: 2e6, noNaN: true }).map((pressurePa) => saturationState(pressurePa)),
  insideDiameterM: fc.double({ min: 0.0125, max: 0.4, noNaN: true }),
  roughnessM: fc.double({ min: 0, max: 5e-4, noNaN: true }),
  lossCoefficientPerM: fc.double({ min: 0, max: 5, noNaN: true }),
  fallSlope: fc.constantFrom(-1, -0.02, 0, 1 / 500, LEAST_PITCH, 0.02, 1),
});

describe('flashVapourGradient at its ends', () => {
  it('dry steam alone is Darcy-Weisbach of the steam', () => {
    const { frictionPaM, flashPaM } = flashVapourGradient({ ...RETURN, quality: 1 });
    expect(frictionPaM).toBe(0);
    expect(flashPaM).toBe(
      darcyGradient({
        ...RETURN,
        densityKgM3: ATMOSPHERIC.vapourDensityKgM3,
        viscosityPaS: ATMOSPHERIC.vapourViscosityPaS,
      }),
    );
  });

  it.each([0, -0.05])('liquid alone (x = %d) is Darcy-Weisbach of the liquid', (quality) => {
    const { frictionPaM, flashPaM } = flashVapourGradient({ ...RETURN, quality });
    expect(flashPaM).toBe(0);
    expect(frictionPaM).toBe(asFullLine(RETURN));
  });

  it('a still pipe costs exactly nothing', () => {
    expect(flashVapourGradient({ ...RETURN, massFlowKgS: 0, quality: 0.002 })).toEqual({ frictionPaM: 0, flashPaM: 0 });
  });

  it.each([{ quality: 1.01 }, { quality: NaN }, { fallSlope: NaN }, { massFlowKgS: -1 }, { insideDiameterM: 0 }])(
    'refuses %o',
    (change) => {
      expect(() => flashVapourGradient({ ...RETURN, ...change })).toThrow(NonPhysicalInputError);
    },
  );
});

describe('flashVapourGradient and the pitch', () => {
  const wet = { ...RETURN, massFlowKgS: 15, quality: 0.01 };
  const liquidAlone = asFullLine({ ...wet, massFlowKgS: 15 * 0.99 });

  // ρ_l g/240 of water at 100 °C, 958.4 kg/m³: 39.16 Pa/m.
  it('takes the drive of the least pitch off the liquid in a level run', () => {
    expect(relativeError(liquidAlone - flashVapourGradient(wet).frictionPaM, 39.16)).toBeLessThan(1e-3);
  });

  it('drives the liquid by the true fall where that is steeper', () => {
    const driven = liquidAlone - flashVapourGradient({ ...wet, fallSlope: 1 / 60 }).frictionPaM;
    expect(relativeError(driven, 4 * 39.16)).toBeLessThan(1e-3);
  });

  it('gives no drive in a rise', () => {
    expect(flashVapourGradient({ ...wet, fallSlope: -0.01 }).frictionPaM).toBe(liquidAlone);
  });

  it('a line that drains by its pitch costs only its vapour', () => {
    expect(flashVapourGradient(RETURN).frictionPaM).toBe(0);
  });
});

// A full line has friction L(m); the same line with a little flash in it is still nearly full, and a method that dropped the
// liquid at once would report next to nothing for it. The weight w is the promise that this does not happen: at least w L(m)
// remains, which is 81 % at x = 0.0005 and still 36 % at x = 0.002, and the approach to x = 0 has no step. Below w L(m) the
// method does fall on purpose, as the line empties and the pitch takes the liquid over, so no fixed floor is asked of the
// whole interval. From x to x + dx the loss is at most 2 dx/0.005 of L(m) by w, and as much as dx of it in each liquid term.
describe('flashVapourGradient where flash begins', () => {
  const step = 1e-5;
  const qualities = Array.from({ length: 1001 }, (_, i) => i * step);

  it('shows no collapse from x = 0 to 0.01', () => {
    fc.assert(
      fc.property(anyReturn, (line) => {
        const full = asFullLine(line);
        let last = full;
        for (const quality of qualities) {
          const { frictionPaM, flashPaM } = flashVapourGradient({ ...line, quality });
          const total = frictionPaM + flashPaM;
          const w = Math.max(0, 1 - quality / DRAINING_QUALITY) ** 2;
          expect(total).toBeGreaterThanOrEqual(w * full * (1 - 1e-12));
          expect(last - total).toBeLessThanOrEqual((2 / DRAINING_QUALITY + 3) * step * full + 1e-12);
          last = total;
        }
      }),
      { numRuns: 40 },
    );
  });

  it('a main that its pitch cannot drain keeps at least seven tenths of its full-line gradient', () => {
    // L(m) is 3.9 kPa/m here, of which the pitch drives 39 Pa/m: what the liquid sheds is small, so a floor is fair.
    const main = { ...RETURN, massFlowKgS: 20 };
    for (const quality of qualities) {
      const { frictionPaM, flashPaM } = flashVapourGradient({ ...main, quality });
      expect(frictionPaM + flashPaM).toBeGreaterThan(0.7 * asFullLine(main));
    }
  });

  it('leaves the full line and meets the draining line without a step', () => {
    expect(fullLineShare(0)).toBe(1);
    expect(1 - fullLineShare(1e-9)).toBeLessThan(1e-6);
    expect(fullLineShare(DRAINING_QUALITY)).toBe(0);
    expect(fullLineShare(DRAINING_QUALITY * (1 - 1e-6))).toBeLessThan(1e-11);
  });
});

describe('flashVapourGradient and the flow', () => {
  const anyQuality = fc.oneof(
    fc.constant(0),
    fc.double({ min: 0, max: 0.01, noNaN: true }),
    fc.double({ min: 0, max: 1, noNaN: true }),
  );

  it('more flow of the same quality never costs less', () => {
    fc.assert(
      fc.property(anyReturn, anyQuality, fc.double({ min: 1, max: 3, noNaN: true }), (line, quality, factor) => {
        const less = flashVapourGradient({ ...line, quality });
        const more = flashVapourGradient({ ...line, quality, massFlowKgS: factor * line.massFlowKgS });
        expect(more.frictionPaM).toBeGreaterThanOrEqual(less.frictionPaM * (1 - 1e-12));
        expect(more.flashPaM).toBeGreaterThanOrEqual(less.flashPaM * (1 - 1e-12));
      }),
    );
  });

  it('neither part is ever negative', () => {
    fc.assert(
      fc.property(anyReturn, anyQuality, (line, quality) => {
        const { frictionPaM, flashPaM } = flashVapourGradient({ ...line, quality });
        expect(Math.min(frictionPaM, flashPaM)).toBeGreaterThanOrEqual(0);
      }),
    );
  });

  it('a wider bore never costs more', () => {
    fc.assert(
      fc.property(anyReturn, anyQuality, (line, quality) => {
        const narrow = flashVapourGradient({ ...line, quality });
        const wide = flashVapourGradient({ ...line, quality, insideDiameterM: 1.2 * line.insideDiameterM });
        expect(wide.frictionPaM).toBeLessThanOrEqual(narrow.frictionPaM * (1 + 1e-12));
        expect(wide.flashPaM).toBeLessThanOrEqual(narrow.flashPaM * (1 + 1e-12));
      }),
    );
  });
});

/** Darcy-Weisbach of the whole flow as saturated liquid. */
function asFullLine(line: Omit<FlashingFlow, 'quality'>): number {
  const { liquidDensityKgM3, liquidViscosityPaS } = line.saturation;
  return darcyGradient({ ...line, densityKgM3: liquidDensityKgM3, viscosityPaS: liquidViscosityPaS });
}
