import type { TrapResult, Verdict } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { trapToShow } from './trap-to-show';

const trap = (id: string, ...verdicts: Verdict[]) =>
  ({ id, checks: verdicts.map((verdict) => ({ verdict })) }) as unknown as TrapResult;

describe('trapToShow', () => {
  it('takes what fails before what is to be watched before what passes', () => {
    expect(trapToShow([trap('A', 'pass'), trap('B', 'watch'), trap('C', 'pass', 'fail')])).toEqual({
      id: 'C',
      fails: true,
    });
    expect(trapToShow([trap('A', 'pass'), trap('B', 'watch')])).toEqual({ id: 'B', fails: false });
    expect(trapToShow([trap('A', 'pass'), trap('B', 'pass')])).toEqual({ id: 'A', fails: false });
  });

  it('has nothing to show where no trap is solved', () => {
    expect(trapToShow([])).toBeNull();
  });
});
