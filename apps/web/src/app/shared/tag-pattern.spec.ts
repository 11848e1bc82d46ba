import { describe, expect, it } from 'vitest';
import { patternedTag } from './tag-pattern';

describe('patternedTag', () => {
  it('counts on from the highest number of its form, and leaves gaps alone', () => {
    expect(patternedTag('TR-###', '', new Set())).toBe('TR-001');
    expect(patternedTag('TR-###', 'X', new Set(['TR-001', 'TR-004', 'CR-9']))).toBe('TR-005');
    expect(patternedTag('TR-##', '', new Set(['TR-99']))).toBe('TR-100');
  });

  it('takes the letters of the tag before for *', () => {
    expect(patternedTag('*-##', 'RT-5', new Set(['RT-5', 'RT-08']))).toBe('RT-09');
    expect(patternedTag('20-*-#', 'DL75-2', new Set(['20-DL75-2']))).toBe('20-DL75-3');
    expect(patternedTag('*-#', 'North header', new Set())).toBe('North header-1');
  });

  it('counts between what stands before and after the number', () => {
    expect(patternedTag('TR-##A', '', new Set(['TR-07A', 'TR-08B', 'TR-A']))).toBe('TR-08A');
  });

  it('stays within the length of a tag', () => {
    const longest = patternedTag('12345678*12345678######12345678', 'x'.repeat(64), new Set());
    expect(longest.length).toBeLessThanOrEqual(64);
  });
});
