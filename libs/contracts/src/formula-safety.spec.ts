import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { guarded, unguarded } from './formula-safety';

describe('texts that a spreadsheet would take for a formula', () => {
  // the characters that OWASP names under "CSV Injection"
  it.each(['=1+1', '+1', '-2', '@SUM(A1)', '\tx', '\rx', "'=1"])('%j goes out as text', (text) => {
    expect(guarded(text)).toBe(`'${text}`);
  });

  it('leaves all others alone', () => {
    for (const text of ['TR-101', '', '1/2', "12'", '’s']) expect(guarded(text)).toBe(text);
  });

  it('comes in as it was', () => {
    const text = fc.oneof(fc.string(), fc.stringMatching(/^'{0,3}[=+\-@\t\r]?.{0,5}$/));
    fc.assert(fc.property(text, (each) => unguarded(guarded(each)) === each));
  });
});
