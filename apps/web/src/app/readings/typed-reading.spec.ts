import { describe, expect, it } from 'vitest';
import { type KeypadKey, keyFor, pressed, readingPa, readingRefusal } from './typed-reading';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;

const after = (...keys: KeypadKey[]) => keys.reduce(pressed, '');

describe('pressed', () => {
  it('writes a number digit by digit', () => {
    expect(after('2', '3', '.', '9')).toBe('23.9');
  });

  it('takes one point, with a zero before it', () => {
    expect(after('.', '5', '.', '.')).toBe('0.5');
    expect(after('minus', '.', '5')).toBe('−0.5');
  });

  it('writes no leading zeros', () => {
    expect(after('0', '0', '7')).toBe('7');
    expect(after('0', '.', '7')).toBe('0.7');
  });

  it('turns the sign whenever the minus is pressed', () => {
    expect(after('4', 'minus')).toBe('−4');
    expect(after('4', 'minus', 'minus')).toBe('4');
  });

  it('takes away the last character, and nothing from nothing', () => {
    expect(after('2', '3', 'delete')).toBe('2');
    expect(after('delete')).toBe('');
  });

  it('stops at eight characters', () => {
    expect(after('1', '2', '3', '4', '5', '6', '7', '8', '9')).toBe('12345678');
  });
});

describe('keyFor', () => {
  it('knows the keys of a keyboard', () => {
    expect(['7', ',', '-', 'Backspace', 'a', 'Enter'].map(keyFor)).toEqual([
      '7',
      '.',
      'minus',
      'delete',
      undefined,
      undefined,
    ]);
  });
});

describe('readingPa', () => {
  // 1 psi = 6894.757293168 Pa (lbf of 4.4482216152605 N on 0.0254 m squared); 1 bar = 1e5 Pa
  it.each([
    ['10', 'psig', 68_947.57293168],
    ['1.5', 'bar g', 150_000],
    ['30', 'kPa g', 30_000],
    ['−0.2', 'bar g', -20_000],
  ] as const)('%s %s is %d Pa above the atmosphere', (text, unit, pa) => {
    const read = readingPa(text, unit, US) ?? NaN;
    expect(Math.abs(read / pa - 1)).toBeLessThan(1e-12);
  });

  it('is nothing while the number is not complete', () => {
    for (const text of ['', '−', '2.']) expect(readingPa(text, 'psig', US)).toBeUndefined();
  });

  it('refuses less than a vacuum, in words', () => {
    expect(readingPa('−2', 'bar g', US)).toBeUndefined();
    expect(readingRefusal('−2', 'bar g', US)).not.toBe('');
    expect(readingRefusal('2', 'bar g', US)).toBe('');
  });
});
