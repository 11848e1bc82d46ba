import { describe, expect, it } from 'vitest';
import { tryParams } from './try-params';

describe('what a finding proposes to try', () => {
  it('is a wider pipe where the pipe is too small, or the way of the trap that has too much behind it', () => {
    expect(tryParams({ code: 'velocity', element: { in: 'pipes', id: 'L1' } })).toEqual({
      change: 'size',
      by: 'up',
      element: 'L1',
    });
    expect(tryParams({ code: 'capacity', element: { in: 'nodes', id: 'T1' } })?.element).toBe('T1');
  });

  it('is nothing where no size mends it, or where it is about the whole', () => {
    expect(tryParams({ code: 'thermalShock', element: { in: 'pipes', id: 'L1' } })).toBeNull();
    expect(tryParams({ code: 'velocity', element: null })).toBeNull();
  });
});
