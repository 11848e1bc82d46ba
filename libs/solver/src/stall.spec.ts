import { relativeError } from '@riseback/numerics';
import { saturationPressurePa, saturationTemperatureK } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { stallCurve, stallFraction } from './stall';

const VARYING_INLET = { control: 'varyingInlet', secondaryInletK: 283.15, secondaryOutletK: 333.15 } as const;
const VARYING_FLOW = { ...VARYING_INLET, control: 'varyingFlow' } as const;
const FULL_PA = saturationPressurePa(423.15);
const BACK_PA = saturationPressurePa(373.15);

describe('the load at which an exchanger stalls', () => {
  // by hand, round temperatures: steam at 150 °C, return at 100 °C, water from 10 to 60 °C
  it('is (100 − 60)/(150 − 60) with a varying inlet', () => {
    expect(relativeError(stallFraction(VARYING_INLET, FULL_PA, BACK_PA) ?? NaN, 40 / 90)).toBeLessThan(1e-6);
  });

  it('is LMTD(100 °C)/LMTD(150 °C) with a varying flow', () => {
    const lmtd = (steam: number): number => 50 / Math.log((steam - 10) / (steam - 60));
    expect(relativeError(stallFraction(VARYING_FLOW, FULL_PA, BACK_PA) ?? NaN, lmtd(100) / lmtd(150))).toBeLessThan(
      1e-6,
    );
  });

  it('is 0 where the return is colder than what leaves the exchanger, and above 1 where it is hotter than the steam', () => {
    for (const service of [VARYING_INLET, VARYING_FLOW]) {
      expect(stallFraction(service, FULL_PA, saturationPressurePa(330))).toBe(0);
      expect(stallFraction(service, FULL_PA, saturationPressurePa(430))).toBeGreaterThan(1);
      expect(stallFraction(service, FULL_PA, FULL_PA)).toBe(1);
    }
  });

  it('is not told of temperatures that describe no exchanger', () => {
    expect(stallFraction({ ...VARYING_INLET, secondaryOutletK: 430 }, FULL_PA, BACK_PA)).toBeUndefined();
    expect(stallFraction({ ...VARYING_FLOW, secondaryInletK: 340 }, FULL_PA, BACK_PA)).toBeUndefined();
  });
});

describe('the stall curve', () => {
  it.each([VARYING_INLET, VARYING_FLOW])('crosses the back pressure at the stall load, $control', (service) => {
    const trap = { service: { kind: 'modulating' as const, ...service }, inletPressurePa: FULL_PA };
    const curve = stallCurve(trap, BACK_PA, FULL_PA, 2001);
    if (curve === undefined) throw new Error('no curve');
    const above = curve.points.findIndex(({ steamPressurePa }) => steamPressurePa > BACK_PA);
    expect(Math.abs((curve.points[above]?.loadFraction ?? NaN) - curve.stallFraction)).toBeLessThan(1 / 2000);
    const temperatures = curve.points.map(({ steamPressurePa }) => saturationTemperatureK(steamPressurePa));
    for (const [i, steamK] of temperatures.entries()) expect(steamK).toBeGreaterThan((temperatures[i - 1] ?? 0) - 1e-9);
    expect(Math.abs((temperatures[0] ?? NaN) - 333.15)).toBeLessThan(1e-3);
    expect(curve.points.at(-1)?.steamPressurePa).toBe(FULL_PA);
  });

  it('is not drawn for a trap whose steam is not modulated', () => {
    expect(stallCurve({ service: { kind: 'constant' }, inletPressurePa: FULL_PA }, BACK_PA)).toBeUndefined();
  });
});
