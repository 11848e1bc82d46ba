import { describe, expect, it } from 'vitest';
import { NoConvergenceError, NonPhysicalInputError } from './index';

describe('errors', () => {
  it('names the function and every argument it refused', () => {
    const error = new NonPhysicalInputError('frictionFactor', { Re: -1, roughness: NaN });
    expect(error).toBeInstanceOf(Error);
    expect(error.name).toBe('NonPhysicalInputError');
    expect(error.message).toBe('frictionFactor cannot take Re = -1, roughness = NaN');
    expect(error.values).toEqual({ Re: -1, roughness: NaN });
  });

  it('names the iteration, its count and what was left', () => {
    const error = new NoConvergenceError('pipe L-7', 50, 12.5);
    expect(error.name).toBe('NoConvergenceError');
    expect(error.message).toBe('pipe L-7 did not converge: residual 12.5 after 50 iterations');
    expect(error).toMatchObject({ where: 'pipe L-7', iterations: 50, residual: 12.5 });
  });
});
