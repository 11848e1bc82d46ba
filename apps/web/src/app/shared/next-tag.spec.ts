import { describe, expect, it } from 'vitest';
import { nextTag } from './next-tag';

describe('nextTag', () => {
  it('counts up the last tag, keeping its letters and width', () => {
    expect(nextTag('trap', ['TR-008', 'TR-009'], new Set(['TR-008', 'TR-009']))).toBe('TR-010');
    expect(nextTag('trap', ['RT-1', 'DL75-3'], new Set(['RT-1', 'DL75-3']))).toBe('DL75-4');
  });

  it('passes over tags that something else has', () => {
    expect(nextTag('pipe', ['CR-1'], new Set(['CR-1', 'CR-2', 'CR-3']))).toBe('CR-4');
  });

  it('starts each kind somewhere, but leaves junctions nameless until one has a tag', () => {
    expect(nextTag('trap', [], new Set())).toBe('TR-101');
    expect(nextTag('receiver', ['North'], new Set(['North']))).toBe('R-1');
    expect(nextTag('junction', [], new Set())).toBe('');
    expect(nextTag('junction', ['H7'], new Set(['H7']))).toBe('H8');
    expect(nextTag('gauge', [], new Set())).toBe('PI-1');
  });
});
