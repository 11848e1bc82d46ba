import { LIMIT_WORDS } from '@riseback/contracts';
import { COINCIDENCES, FRICTION_METHODS, STATIC_LIFT_BASES, VOID_FRACTIONS } from '@riseback/network';
import { CHECK_LIMITS } from '@riseback/solver';
import { describe, expect, it } from 'vitest';
import { limitGroups } from '../networks/limit-rows';
import { methodSectionId } from '../networks/method-words';
import { formulaTree } from './formula/formula-tree';
import { METHOD_SECTIONS, type MethodSection } from '@riseback/methods';

/** Its equations, letters, and what stands between backquotes in its text. */
function formulasOf(section: MethodSection): string[] {
  const { equations = [], symbols = [], notes = [], table, summary, range, limits } = section;
  const texts = [
    summary,
    range,
    ...limits,
    ...notes,
    ...symbols.map(([, meaning]) => meaning),
    ...(table?.rows.flat() ?? []),
  ];
  const inline = texts.flatMap((text) => text.split('`').filter((_, i) => i % 2 === 1));
  return [...equations, ...symbols.flatMap(([symbol]) => symbol.split(', ')), ...inline];
}

const ids = METHOD_SECTIONS.map(({ id }) => id);

describe('METHOD_SECTIONS', () => {
  it.each([
    ...FRICTION_METHODS.map((value) => methodSectionId('friction', value)),
    ...STATIC_LIFT_BASES.map((value) => methodSectionId('staticLift', value)),
    ...VOID_FRACTIONS.map((value) => methodSectionId('voidFraction', value)),
    ...COINCIDENCES.map((value) => methodSectionId('coincidence', value)),
    ...Object.keys(CHECK_LIMITS).map((code) => `check-${code}`),
    'drop-credit',
    'acceleration',
    'spread',
    'credible',
  ])('explains %s', (id) => {
    expect(ids).toContain(id);
  });

  it.each(METHOD_SECTIONS)('says of $id where it holds, what it does not know, and where it comes from', (section) => {
    const limits = limitGroups({}).find(({ code }) => `check-${code}` === section.id)?.rows ?? [];
    expect(section.range).not.toBe('');
    expect(section.limits.length).toBeGreaterThan(0);
    // a check's limits bring their own sources
    expect(section.sources.length + limits.length).toBeGreaterThan(0);
    for (const text of formulasOf(section)) expect(() => formulaTree(text)).not.toThrow();
    if (section.choice) expect(section.id).toBe(methodSectionId(section.choice.key, section.choice.value));
  });

  it('names each section once', () => {
    expect(new Set(ids).size).toBe(ids.length);
  });
});

describe('LIMIT_WORDS', () => {
  it('has words for every limit that the solver knows', () => {
    const keys = limitGroups({}).flatMap(({ code, rows }) => rows.map(({ key }) => `${code}.${key}`));
    expect(keys.filter((key) => LIMIT_WORDS[key] === undefined)).toEqual([]);
  });
});
