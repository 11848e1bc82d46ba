import { describe, expect, it } from 'vitest';
import { turnWords } from './turned-verdicts';

type Verdicts = Parameters<typeof turnWords>[0];
const of = (verdicts: Record<string, 'pass' | 'watch' | 'fail'>): Verdicts => new Map(Object.entries(verdicts));

describe('what a change would turn', () => {
  it('counts verdicts by what they become, the worst first', () => {
    const before = of({ a: 'fail', b: 'watch', c: 'watch', d: 'pass', e: 'pass' });
    const after = of({ a: 'pass', b: 'pass', c: 'watch', d: 'fail', e: 'pass' });
    expect(turnWords(before, after)).toBe('Would turn 1 fail and 1 watch to pass, 1 pass to fail.');
  });

  it('says so when it turns none', () => {
    expect(turnWords(of({ a: 'fail', gone: 'pass' }), of({ a: 'fail', new: 'fail' }))).toBe('Would turn no verdict.');
  });
});
