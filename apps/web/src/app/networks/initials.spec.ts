import { describe, expect, it } from 'vitest';
import { initialsOf } from './initials';

describe('initialsOf', () => {
  it('takes the first letters of the first and the last name', () => {
    expect(initialsOf(['Ana Reyes', 'Bo', 'Åsa de la Cruz', ''])).toEqual(['AR', 'B', 'ÅC', '']);
  });

  it('tells apart who would have the same', () => {
    expect(initialsOf(['Ana Reyes', 'Arno Rau', 'ada ray'])).toEqual(['AR', 'AR2', 'AR3']);
  });
});
