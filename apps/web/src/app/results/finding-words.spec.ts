import { describe, expect, it } from 'vitest';
import { checkName, findingWords } from './finding-words';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const SI = { ...US, system: 'si' } as const;

describe('findingWords', () => {
  // 75 psig above the standard atmosphere is 618,432 Pa (1 psi = 6,894.757 Pa, NIST SP 811)
  const text = [
    'The inlet stands at ',
    { quantity: 'pressure', si: 618_432 },
    ', half of it ',
    { quantity: 'fraction', si: 0.5 },
    '.',
  ] as const;

  it('speaks the units of the person', () => {
    expect(findingWords([...text], US)).toBe('The inlet stands at 75.0 psig, half of it 50 %.');
    expect(findingWords([...text], SI)).toBe('The inlet stands at 517.1 kPa g, half of it 50 %.');
  });

  it('leaves plain words alone', () => {
    expect(findingWords(['Turn the pipe’s ends round.'], US)).toBe('Turn the pipe’s ends round.');
  });
});

describe('checkName', () => {
  it('takes a code it does not know apart at its capitals', () => {
    expect(checkName('backPressureFraction')).toBe('Back-pressure fraction');
    expect(checkName('uphillTwoPhase')).toBe('Uphill two phase');
    expect(checkName('toString')).toBe('To string');
  });
});
