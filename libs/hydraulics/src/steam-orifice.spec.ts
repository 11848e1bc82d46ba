import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { region1, region2, saturationTemperatureK } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import {
  CHOKED_PRESSURE_RATIO,
  napierOrificeFlowKgS,
  ORIFICE_DISCHARGE_COEFFICIENT,
  orificeSteamFlowKgS,
} from './steam-orifice';

const ORIFICE_M = 0.003;

describe('napierOrificeFlowKgS', () => {
  // W = 51.43 A p lb/h (in², psia), as handbooks give Napier; printed to four digits.
  it('is the rule’s lb/h with its discharge coefficient', () => {
    const inch = 0.0254;
    const areaIn2 = (Math.PI / 4) * 0.1875 ** 2;
    const poundsPerHour = (kgS: number): number => (kgS * 3600) / 0.45359237;
    const flow = poundsPerHour(napierOrificeFlowKgS(100 * 6894.757293, 0.1875 * inch));
    expect(relativeError(flow / ORIFICE_DISCHARGE_COEFFICIENT, 51.43 * areaIn2 * 100)).toBeLessThan(1e-4);
  });

  // An energy consultant's note: 5 psig (19.696 psia), 3/16 in, coefficient 0.6: 16.78 lb/h.
  it('gives a printed leak', () => {
    const flow = napierOrificeFlowKgS(19.696 * 6894.757293, 0.1875 * 0.0254);
    const atCoefficient06 = (flow * 0.6) / ORIFICE_DISCHARGE_COEFFICIENT;
    expect(relativeError((atCoefficient06 * 3600) / 0.45359237, 16.78)).toBeLessThan(1e-3);
  });

  it.each([
    [-1, 0.003],
    [NaN, 0.003],
    [1e5, -0.003],
    [1e5, NaN],
  ])('refuses %d Pa, %d m', (inletPa, diameterM) => {
    expect(() => napierOrificeFlowKgS(inletPa, diameterM)).toThrow(NonPhysicalInputError);
  });
});

describe('orificeSteamFlowKgS', () => {
  it('is choked up to 0.577 of the inlet', () => {
    expect(Math.abs(CHOKED_PRESSURE_RATIO - 0.577)).toBeLessThan(5e-4);
    expect(orificeSteamFlowKgS(8e5, 0.57 * 8e5, ORIFICE_M)).toBe(napierOrificeFlowKgS(8e5, ORIFICE_M));
    expect(orificeSteamFlowKgS(8e5, 0, ORIFICE_M)).toBe(napierOrificeFlowKgS(8e5, ORIFICE_M));
  });

  it.each([8e5, 9e5])('passes nothing against %d Pa, its inlet pressure or more', (backPa) => {
    expect(orificeSteamFlowKgS(8e5, backPa, ORIFICE_M)).toBe(0);
  });

  it('falls without a step from choked to none', () => {
    let last = orificeSteamFlowKgS(8e5, 0.5 * 8e5, ORIFICE_M);
    const choked = last;
    for (let i = 1; i <= 5000; i++) {
      const flow = orificeSteamFlowKgS(8e5, (0.5 + i * 1e-4) * 8e5, ORIFICE_M);
      expect(flow).toBeLessThanOrEqual(last);
      // √(1 − r) at the end is the steepest: 1e-4 in r makes 1.5 % there
      expect(last - flow).toBeLessThan(0.03 * choked);
      last = flow;
    }
    expect(last).toBe(0);
  });

  // Equilibrium expansion of dry saturated steam at constant entropy, by IAPWS-IF97: G = √(2 (h₀ − h))/v, over its own greatest value. The
  // exponent of saturated steam is a fit: 0.2 % up to 15 bar, 0.7 % at 40 bar.
  it.each([
    { inletPa: 1.5e5, tolerance: 0.002 },
    { inletPa: 3e5, tolerance: 0.002 },
    { inletPa: 8e5, tolerance: 0.002 },
    { inletPa: 15e5, tolerance: 0.002 },
    { inletPa: 40e5, tolerance: 0.008 },
  ])('follows the isentropic nozzle at $inletPa Pa', ({ inletPa, tolerance }) => {
    const flux = isentropicFlux(inletPa);
    const greatest = Math.max(...Array.from({ length: 400 }, (_, i) => flux((0.5 + i * 5e-4) * inletPa)));
    const choked = napierOrificeFlowKgS(inletPa, ORIFICE_M);
    for (const ratio of [0.58, 0.65, 0.7, 0.8, 0.9, 0.95, 0.99]) {
      const share = orificeSteamFlowKgS(inletPa, ratio * inletPa, ORIFICE_M) / choked;
      expect(relativeError(share, flux(ratio * inletPa) / greatest), `ratio ${ratio}`).toBeLessThan(tolerance);
    }
  });

  it.each([-1, NaN])('refuses a back pressure of %d Pa', (backPa) => {
    expect(() => orificeSteamFlowKgS(8e5, backPa, ORIFICE_M)).toThrow(NonPhysicalInputError);
  });
});

function isentropicFlux(inletPa: number): (pressurePa: number) => number {
  const inlet = region2(inletPa, saturationTemperatureK(inletPa));
  return (pressurePa) => {
    const temperatureK = saturationTemperatureK(pressurePa);
    const liquid = region1(pressurePa, temperatureK);
    const vapour = region2(pressurePa, temperatureK);
    const x = (inlet.entropyJKgK - liquid.entropyJKgK) / (vapour.entropyJKgK - liquid.entropyJKgK);
    const mixed = (ofLiquid: number, ofVapour: number): number => ofLiquid + x * (ofVapour - ofLiquid);
    const drop = inlet.enthalpyJKg - mixed(liquid.enthalpyJKg, vapour.enthalpyJKg);
    return Math.sqrt(2 * drop) / mixed(liquid.specificVolumeM3Kg, vapour.specificVolumeM3Kg);
  };
}
