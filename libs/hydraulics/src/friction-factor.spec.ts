import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import {
  COLEBROOK_RANGE,
  darcyFrictionFactor,
  darcyFrictionFactorColebrook,
  darcyFrictionFactorFullyRough,
  LAMINAR_LIMIT_RE,
  TURBULENT_LIMIT_RE,
} from './friction-factor';

const ROUGHNESSES = [
  COLEBROOK_RANGE.relativeRoughness[0],
  1e-6,
  1e-5,
  1e-4,
  1e-3,
  0.01,
  COLEBROOK_RANGE.relativeRoughness[1],
];

describe('darcyFrictionFactorColebrook', () => {
  it('satisfies the equation over the whole turbulent range', () => {
    for (const k of ROUGHNESSES) {
      for (const Re of logarithmicSweep(TURBULENT_LIMIT_RE, 1e9, 400)) {
        const y = 1 / Math.sqrt(darcyFrictionFactorColebrook(Re, k));
        // 1e-12: rounding of the logarithm is all that should be left
        expect(relativeError(-2 * Math.log10(k / 3.7 + (2.51 * y) / Re), y), `Re ${Re}, k ${k}`).toBeLessThan(1e-12);
      }
    }
  });

  it('approaches the fully rough limit', () => {
    for (const k of [1e-4, 1e-3, 0.01, 0.05]) {
      expect(relativeError(darcyFrictionFactorColebrook(1e12, k), darcyFrictionFactorFullyRough(k))).toBeLessThan(1e-6);
    }
  });

  it('answers far below its range, where solver iterates pass', () => {
    for (const Re of logarithmicSweep(1, TURBULENT_LIMIT_RE, 200)) {
      expect(darcyFrictionFactorColebrook(Re, 0.002)).toBeGreaterThan(0);
    }
  });
});

describe('darcyFrictionFactor', () => {
  it('is continuous where the regimes meet', () => {
    for (const k of ROUGHNESSES) {
      for (const limit of [LAMINAR_LIMIT_RE, TURBULENT_LIMIT_RE]) {
        const below = darcyFrictionFactor(limit * (1 - 1e-12), k);
        expect(relativeError(darcyFrictionFactor(limit * (1 + 1e-12), k), below)).toBeLessThan(1e-10);
      }
    }
  });

  it('has ln f linear in Re between the regimes', () => {
    const middle = darcyFrictionFactor((LAMINAR_LIMIT_RE + TURBULENT_LIMIT_RE) / 2, 0.001);
    const geometricMean = Math.sqrt(
      darcyFrictionFactor(LAMINAR_LIMIT_RE, 0.001) * darcyFrictionFactor(TURBULENT_LIMIT_RE, 0.001),
    );
    expect(relativeError(middle, geometricMean)).toBeLessThan(1e-12);
  });

  it('more flow always costs more: f Re² rises', () => {
    for (const k of ROUGHNESSES) {
      let last = 0;
      for (const Re of logarithmicSweep(1, 1e8, 2000)) {
        const loss = darcyFrictionFactor(Re, k) * Re * Re;
        expect(loss, `Re ${Re}, k ${k}`).toBeGreaterThan(last);
        last = loss;
      }
    }
  });

  it.each([
    { Re: 0, k: 0 },
    { Re: -1, k: 0 },
    { Re: NaN, k: 0 },
    { Re: Infinity, k: 0 },
    { Re: 1000, k: -1e-9 },
    { Re: 1000, k: NaN },
    { Re: 1e5, k: NaN },
    { Re: 1e5, k: 1 },
    { Re: 1000, k: 1 },
  ])('refuses Re $Re, k $k', ({ Re, k }) => {
    expect(() => darcyFrictionFactor(Re, k)).toThrow(NonPhysicalInputError);
  });
});

describe('darcyFrictionFactorFullyRough', () => {
  it.each([0, -1, 1, NaN])('refuses k %d', (k) => {
    expect(() => darcyFrictionFactorFullyRough(k)).toThrow(NonPhysicalInputError);
  });
});

function logarithmicSweep(from: number, to: number, count: number): number[] {
  return Array.from({ length: count }, (_, i) => from * (to / from) ** (i / (count - 1)));
}
