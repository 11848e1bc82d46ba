import { describe, expect, it } from 'vitest';
import { copiedTag } from './copied-tag';

describe('the tag of a copy', () => {
  it('keeps letters and width and takes the next free number', () => {
    expect(copiedTag('TR-101', new Set(['TR-101', 'TR-102']))).toBe('TR-103');
    expect(copiedTag('DL75-009', new Set(['DL75-009']))).toBe('DL75-010');
  });

  it('gives a number to a tag without one', () => {
    expect(copiedTag('North header', new Set(['North header']))).toBe('North header-2');
  });

  it('never gets longer than a tag may be', () => {
    expect(copiedTag('x'.repeat(64), new Set()).length).toBeLessThanOrEqual(64);
  });
});
