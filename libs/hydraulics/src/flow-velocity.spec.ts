import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { liquidVelocityMS, mixtureVelocityMS } from './flow-velocity';

// One square metre of bore makes the mass flow the mass flux.
const SQUARE_METRE_BORE_M = Math.sqrt(4 / Math.PI);

describe('velocities', () => {
  it('liquid moves at G/ρ', () => {
    expect(relativeError(liquidVelocityMS(1000, 950, SQUARE_METRE_BORE_M), 1000 / 950)).toBeLessThan(1e-12);
  });

  // By hand: 10 kg/(m²s) at x = 0.1 is 1 kg of steam of 0.5 kg/m³ and 9 kg of water of 900 kg/m³: 2 + 0.01 m³ a second.
  it('adds the volumes of steam and water', () => {
    expect(relativeError(mixtureVelocityMS(10, 0.1, 900, 0.5, SQUARE_METRE_BORE_M), 2.01)).toBeLessThan(1e-12);
  });

  it('subcooled liquid is liquid', () => {
    expect(mixtureVelocityMS(10, -0.2, 900, 0.5, 0.05)).toBe(liquidVelocityMS(10, 900, 0.05));
  });

  it('refuses what cannot flow', () => {
    expect(() => liquidVelocityMS(1, 900, 0)).toThrow(NonPhysicalInputError);
    expect(() => liquidVelocityMS(NaN, 900, 0.05)).toThrow(NonPhysicalInputError);
    expect(() => mixtureVelocityMS(1, 1.1, 900, 0.5, 0.05)).toThrow(NonPhysicalInputError);
    expect(() => mixtureVelocityMS(1, NaN, 900, 0.5, 0.05)).toThrow(NonPhysicalInputError);
  });
});
