import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { readingAtTap, readingExpected } from './reading-at-tap';

// 20 °C: water has 998.2 kg/m³ (IAPWS-95 and every table), so a metre of it weighs 998.2 × 9.80665 = 9,789 Pa.
const site = { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 };

describe('readingAtTap', () => {
  it('adds a filled leg below the gauge: 3 m of cold water are 29,367 Pa', () => {
    const gauge = { elevationM: 4.5, waterLeg: true };
    const tapPa = readingAtTap(50_000, gauge, 1.5, site);
    expect(relativeError(tapPa - 50_000 - 101_325, 3 * 998.2 * 9.80665)).toBeLessThan(1e-4);
  });

  it('takes it off where the gauge hangs below its tap', () => {
    const gauge = { elevationM: 0, waterLeg: true };
    expect(relativeError(151_325 - readingAtTap(50_000, gauge, 2, site), 2 * 998.2 * 9.80665)).toBeLessThan(1e-4);
  });

  it('adds nothing without a leg', () => {
    expect(readingAtTap(50_000, { elevationM: 9, waterLeg: false }, 0, site)).toBe(151_325);
  });

  it('is turned round by what the gauge is expected to show', () => {
    const gauge = { elevationM: 7, waterLeg: true };
    expect(relativeError(readingAtTap(readingExpected(2e5, gauge, 1, site), gauge, 1, site), 2e5)).toBeLessThan(1e-12);
  });
});
