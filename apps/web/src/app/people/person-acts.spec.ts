import type { SitePerson } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { actsOn } from './person-acts';

const person: SitePerson = {
  id: 'p1',
  name: 'Ines Kallan',
  email: 'ines@quay.example',
  role: 'designer',
  grantedAt: '2026-03-01T08:00:00.000Z',
  codesOn: false,
  onlyHere: true,
};

describe('actsOn', () => {
  it('offers what there is to do: codes off only where codes are on, enabling only who is disabled', () => {
    expect(actsOn(person).map(({ what }) => what)).toEqual(['password-reset', 'disabling', 'taking-away']);
    const other = { ...person, codesOn: true, disabledAt: '2026-03-02T08:00:00.000Z' };
    expect(actsOn(other).map(({ what }) => what)).toEqual(['password-reset', 'codes-off', 'enabling', 'taking-away']);
  });

  it('says why an account that another site relies on cannot be closed here, and does not offer it', () => {
    const acts = actsOn({ ...person, onlyHere: false });
    expect(acts.filter(({ question }) => question.act === undefined).map(({ what }) => what)).toEqual(['disabling']);
    expect(acts.find(({ what }) => what === 'disabling')?.question.lines[0]).toContain('another site');
  });
});
