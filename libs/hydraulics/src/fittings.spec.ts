import { NonPhysicalInputError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { FITTINGS, fittingLossCoefficient, turbulentFrictionFactorCrane, type FittingName } from './fittings';
import { darcyFrictionFactorFullyRough } from './friction-factor';
import { pipeSizes } from './pipe-catalogue';

describe('fittingLossCoefficient', () => {
  // 1/2 in and up without 3-1/2 in: the sizes Crane prints.
  it('gives schedule 80 and EN pipes the K of their nominal size', () => {
    for (const { schedule, sizes } of pipeSizes()) {
      if (schedule !== '80' && !schedule.startsWith('EN')) continue;
      for (const { nps, dn, insideDiameterM } of sizes) {
        if (dn < 15 || dn === 90) continue;
        const schedule40 = pipeSizes()
          .find((group) => group.schedule === '40')
          ?.sizes.find((size) => size.nps === nps);
        expect(turbulentFrictionFactorCrane(insideDiameterM), `${nps} in, ${schedule}`).toBe(
          turbulentFrictionFactorCrane(schedule40?.insideDiameterM ?? NaN),
        );
      }
    }
  });

  // Crane's f_T is the fully rough factor of clean commercial steel, 0.0018 in, rounded to three decimals (up to 5 %
  // at 1/2 in); holding a nominal size's factor half-way to the next adds the rest. Hence 8 %.
  it('stays near the fully rough factor of commercial steel', () => {
    for (let boreM = 0.0158; boreM < 0.6; boreM *= 1.03) {
      const ratio = turbulentFrictionFactorCrane(boreM) / darcyFrictionFactorFullyRough(4.57e-5 / boreM);
      expect(Math.abs(ratio - 1), `bore ${boreM} m`).toBeLessThan(0.08);
    }
  });

  it('holds the ends of the printed table', () => {
    expect(turbulentFrictionFactorCrane(0.005)).toBe(0.027);
    expect(turbulentFrictionFactorCrane(2)).toBe(0.012);
  });

  it('every fitting costs something and says where its figure is from', () => {
    for (const kind of Object.keys(FITTINGS) as FittingName[]) {
      expect(fittingLossCoefficient(kind, 0.05)).toBeGreaterThan(0);
      expect(FITTINGS[kind].source).toMatch(/Crane/);
    }
  });

  it.each([0, -1, NaN, Infinity])('refuses a bore of %d m', (boreM) => {
    expect(() => fittingLossCoefficient('elbow90', boreM)).toThrow(NonPhysicalInputError);
  });
});
