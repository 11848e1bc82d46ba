import { describe, expect, it } from 'vitest';
import { roleChangeLines, roleMeaning } from './role-words';

// product.md's table of roles: a reviewer signs and does not draw, a viewer reads only, an administrator does not sign.
describe('the words of roles', () => {
  it('say what each may do', () => {
    expect(roleMeaning('viewer')).toBe('Reads everything, changes nothing.');
    expect(roleMeaning('reviewer')).toContain('signs revisions');
    expect(roleMeaning('reviewer')).not.toContain('draws');
    expect(roleMeaning('administrator')).not.toContain('signs');
  });

  it('say what a change of role gives and takes', () => {
    const lines = roleChangeLines('designer', 'reviewer');
    expect(lines.filter((line) => line.startsWith('From now on:'))).toHaveLength(1);
    expect(lines.filter((line) => line.startsWith('No longer:'))).toHaveLength(2);
    expect(lines[0]).toContain('signs');
    expect(roleChangeLines('viewer', 'viewer')).toEqual([]);
  });
});
