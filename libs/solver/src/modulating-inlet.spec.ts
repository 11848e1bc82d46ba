import { relativeError } from '@riseback/numerics';
import { saturationPressurePa, saturationTemperatureK } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { modulatedInletPressurePa, type ModulatingService } from './modulating-inlet';

const FULL_PA = 400_000;
const inlet = (service: Partial<ModulatingService>, loadFraction: number): number =>
  modulatedInletPressurePa(
    { control: 'varyingInlet', secondaryInletK: 320, secondaryOutletK: 350, ...service },
    FULL_PA,
    loadFraction,
  );

/** Log-mean temperature difference of steam condensing at T, by its definition. */
const lmtd = (T: number): number => (350 - 320) / Math.log((T - 320) / (T - 350));

describe('modulatedInletPressurePa', () => {
  it('falls in temperature in proportion to the load where the secondary inlet varies', () => {
    const fullK = saturationTemperatureK(FULL_PA);
    expect(relativeError(inlet({}, 0.5), saturationPressurePa(350 + 0.5 * (fullK - 350)))).toBeLessThan(1e-12);
  });

  it.each([0.9, 0.5, 0.2])(
    'falls in log-mean temperature difference to %s of it where the secondary flow varies',
    (phi) => {
      const T = saturationTemperatureK(inlet({ control: 'varyingFlow' }, phi));
      expect(relativeError(lmtd(T), phi * lmtd(saturationTemperatureK(FULL_PA)))).toBeLessThan(1e-6);
    },
  );

  it.each(['varyingInlet', 'varyingFlow'] as const)(
    '%s: without load the steam space is as warm as what leaves it',
    (control) => {
      expect(relativeError(inlet({ control }, 0), saturationPressurePa(350))).toBeLessThan(1e-9);
    },
  );

  it('stays at full pressure from full load up, and where the steam is not hotter than what leaves', () => {
    expect([inlet({}, 1), inlet({}, 1.3), inlet({ secondaryOutletK: 430 }, 0.5)]).toEqual([FULL_PA, FULL_PA, FULL_PA]);
  });

  it.each(['varyingInlet', 'varyingFlow'] as const)('%s: falls steadily with the load', (control) => {
    let before = Infinity;
    for (let phi = 1; phi >= 0; phi -= 0.02) {
      const pressure = inlet({ control }, phi);
      expect(pressure).toBeLessThanOrEqual(before);
      before = pressure;
    }
  });
});
