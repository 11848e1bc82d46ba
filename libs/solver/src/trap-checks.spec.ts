import { withTrapDefaults, type Trap, type TrapModel } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { limitsInForce } from './check-limits';
import { checkTrap, type TrapUnderCheck } from './trap-checks';

const PSI_PA = 6894.757293168;
const psig = (gauge: number): number => 101_325 + gauge * PSI_PA;

function at(
  changes: Partial<Omit<TrapUnderCheck, 'trap' | 'model'>> & {
    trap?: Partial<Trap>;
    model?: Partial<TrapModel> | undefined;
  },
) {
  const { trap, model, ...rest } = changes;
  return checkTrap({
    trap: withTrapDefaults({
      id: 'T1',
      kind: 'trap',
      elevationM: 0,
      inletPressurePa: psig(100),
      loadKgS: 0.05,
      ...trap,
    }),
    model: model && { id: 'M1', name: 'Model', ...model },
    inletPressurePa: psig(100),
    backPressurePa: psig(20),
    loadKgS: 0.05,
    atmosphericPressurePa: 101_325,
    limits: limitsInForce({}),
    ...rest,
  });
}

function verdict(code: string, outcome: ReturnType<typeof checkTrap>): string {
  const made = outcome.checks.find((check) => check.code === code);
  return made?.verdict ?? `not made: ${outcome.notChecked.find((unmade) => unmade.code === code)?.reason ?? 'missing'}`;
}

describe('every check', () => {
  it('is made or says why not', () => {
    const { checks, notChecked } = at({});
    const codes = [...checks, ...notChecked].map(({ code }) => code);
    expect(codes.sort()).toEqual(['backPressureFraction', 'bodyRating', 'capacity', 'differential', 'orificeRating']);
  });

  it('that fails says what would mend it', () => {
    const model = {
      maximumDifferentialPa: 1e5,
      bodyPressurePa: 5e5,
      capacity: [{ differentialPa: 1e5, flowKgS: 0.01 }],
    };
    const trap = { trapType: 'thermodynamic', maximumPressurePa: psig(150) } as const;
    const { checks } = at({ trap, model, backPressurePa: psig(90) });
    const failing = checks.filter((check) => check.verdict === 'fail');
    expect(failing.map(({ code }) => code)).toEqual([
      'capacity',
      'backPressureFraction',
      'orificeRating',
      'bodyRating',
    ]);
    expect(failing.every(({ remedy, message }) => remedy !== undefined && message.length > 0)).toBe(true);
  });
});

describe('differential', () => {
  it.each([
    { back: 99.9, expected: 'pass' },
    { back: 100, expected: 'fail' },
    { back: 120, expected: 'fail' },
  ])('$back psig behind 100 psig: $expected', ({ back, expected }) => {
    expect(verdict('differential', at({ backPressurePa: psig(back) }))).toBe(expected);
  });
});

describe('capacity', () => {
  const model = { capacity: [{ differentialPa: 80 * PSI_PA, flowKgS: 0.15 }] };

  it('is judged on sizing factor times the average load, never also on the peak', () => {
    const check = at({ model, trap: { peakFactor: 10 } }).checks.find(({ code }) => code === 'capacity');
    expect(check?.verdict).toBe('pass');
    expect(relativeError(check?.limit ?? NaN, 3 * 0.05)).toBeLessThan(1e-12);
  });

  it('is not judged without a model, nor without a differential', () => {
    expect(verdict('capacity', at({}))).toMatch(/no model/);
    expect(verdict('capacity', at({ model, backPressurePa: psig(110) }))).toMatch(/no differential/);
  });
});

// Limits: UFGS-15559A (watch above 0.5, or below 10 psig), common practice (fail above 0.8)
describe('backPressureFraction', () => {
  const thermodynamic = { trapType: 'thermodynamic' } as const;
  it.each([
    { inlet: 100, back: 49, model: undefined, expected: 'pass' },
    { inlet: 100, back: 51, model: undefined, expected: 'watch' },
    { inlet: 100, back: 81, model: undefined, expected: 'fail' },
    { inlet: 100, back: 81, model: { maximumBackPressureFraction: 0.85 }, expected: 'watch' },
    { inlet: 100, back: 45, model: { maximumBackPressureFraction: 0.4 }, expected: 'fail' },
    { inlet: 9, back: 0, model: undefined, expected: 'watch' },
    { inlet: 0, back: -1, model: undefined, expected: 'fail' },
  ])('thermodynamic, $back psig behind $inlet psig: $expected', ({ inlet, back, model, expected }) => {
    const outcome = at({ trap: thermodynamic, model, inletPressurePa: psig(inlet), backPressurePa: psig(back) });
    expect(verdict('backPressureFraction', outcome)).toBe(expected);
  });

  it('is judged for other types by the model’s own limit alone', () => {
    const trap = { trapType: 'floatThermostatic' } as const;
    expect(verdict('backPressureFraction', at({ trap, backPressurePa: psig(90) }))).toMatch(/No limit is known/);
    const model = { maximumBackPressureFraction: 0.8 };
    expect(verdict('backPressureFraction', at({ trap, model, backPressurePa: psig(90) }))).toBe('fail');
  });

  it('needs the type, and takes the site’s limits', () => {
    expect(verdict('backPressureFraction', at({}))).toMatch(/type is not given/);
    const limits = limitsInForce({ backPressureFraction: { watchFraction: 0.1, failFraction: 0.15 } });
    expect(verdict('backPressureFraction', at({ trap: thermodynamic, limits }))).toBe('fail');
  });
});

describe('ratings', () => {
  const trap = { maximumPressurePa: psig(150) };
  it.each([
    { code: 'orificeRating', model: { maximumDifferentialPa: 149 * PSI_PA }, expected: 'fail' },
    { code: 'orificeRating', model: { maximumDifferentialPa: 151 * PSI_PA }, expected: 'pass' },
    { code: 'bodyRating', model: { bodyPressurePa: psig(149) }, expected: 'fail' },
    { code: 'bodyRating', model: { bodyPressurePa: psig(151) }, expected: 'pass' },
    // 150 psig saturates at 366 °F = 458.7 K (any steam table)
    { code: 'bodyRating', model: { bodyPressurePa: psig(151), bodyTemperatureK: 458 }, expected: 'fail' },
    { code: 'bodyRating', model: { bodyPressurePa: psig(151), bodyTemperatureK: 459.5 }, expected: 'pass' },
    { code: 'bodyRating', model: { bodyTemperatureK: 459.5 }, expected: 'pass' },
  ])('$code with $model: $expected', ({ code, model, expected }) => {
    expect(verdict(code, at({ trap, model }))).toBe(expected);
  });

  it('are not judged without the safety valve’s setting, or without the model’s figures', () => {
    expect(verdict('orificeRating', at({ model: { maximumDifferentialPa: 1e6 } }))).toMatch(
      /setting of the safety valve/,
    );
    expect(verdict('bodyRating', at({ trap, model: {} }))).toMatch(/No body rating/);
  });

  it('judge a setting above the critical pressure by pressure alone', () => {
    const model = { bodyPressurePa: 2.4e7, bodyTemperatureK: 600 };
    expect(verdict('bodyRating', at({ trap: { maximumPressurePa: 2.3e7 }, model }))).toBe('pass');
  });
});
