import { FRICTION_METHODS, type NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { found, networkFile, solved, ternQuay, trapOf } from '../fixtures/solver/small-networks';

function withMethod(file: NetworkFile, method: object): NetworkFile {
  return { ...file, method: { ...file.method, ...method } };
}

/** By every friction method, with the rule and with two-phase risers. */
function everyMethod(file: NetworkFile): NetworkFile[] {
  return FRICTION_METHODS.flatMap((friction) => [
    withMethod(file, { friction, staticLift: 'rule' }),
    withMethod(file, { friction, staticLift: 'twoPhase', voidFraction: 'rouhaniAxelsson' }),
  ]);
}

function line(loadKgS: number, more: { trap?: object; pipe?: object; riseM?: number } = {}): NetworkFile {
  return networkFile({
    nodes: [
      { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS, ...more.trap },
      { id: 'R1', kind: 'receiver', elevationM: more.riseM ?? 0, pressurePa: 1.2e5 },
    ],
    pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 30, size: { nps: '1-1/2', schedule: '40' }, ...more.pipe }],
  });
}

const BANDS = { bands: true } as const;

describe('the spread', () => {
  it.each([
    { friction: 'flashVapour', staticLift: 'rule' },
    { friction: 'friedel', staticLift: 'liquidFull' },
    { friction: 'byPattern', staticLift: 'twoPhase', voidFraction: 'zivi' },
  ])(
    'of the demo plant runs from the lowest to the highest of separate solves, $friction with $staticLift among them',
    (method) => {
      const file = withMethod(ternQuay(), method);
      const results = [file, ...everyMethod(file)].map((network) => solved(network, { caseId: 'design' }));
      for (const { id, backPressurePa, spread } of solved(file, { caseId: 'design', ...BANDS }).traps) {
        const separate = results.map((result) => found(result.traps, id).backPressurePa);
        // bands add a gradient's parts up in another order, which rounds otherwise
        expect(relativeError(spread?.lowPa ?? NaN, Math.min(...separate))).toBeLessThan(1e-10);
        expect(relativeError(spread?.highPa ?? NaN, Math.max(...separate))).toBeLessThan(1e-10);
        expect(spread?.withoutSolution).toBeUndefined();
        expect(separate).toContain(backPressurePa);
      }
    },
  );

  it('stands around the trap’s own peak where that is what it is judged by', () => {
    const file = withMethod(line(0.02, { trap: { discharge: 'intermittent', peakFactor: 3 } }), {
      coincidence: 'ownPeak',
    });
    const atPeak = trapOf(solved(line(0.06), BANDS), 'T1');
    const own = trapOf(solved(file, BANDS), 'T1');
    expect(Math.abs((own.spread?.highPa ?? NaN) - (atPeak.spread?.highPa ?? NaN))).toBeLessThan(1e-3);
    expect(Math.abs((own.spread?.lowPa ?? NaN) - (atPeak.spread?.lowPa ?? NaN))).toBeLessThan(1e-3);
  });

  it('is solved anew by each method where flows divide by it', () => {
    const plain = line(0.2);
    const file = networkFile({
      nodes: [...plain.nodes, { id: 'J', kind: 'junction', elevationM: 0 }],
      pipes: [
        { ...plain.pipes[0], to: 'J' },
        { id: 'A', from: 'J', to: 'R1', lengthM: 30, insideDiameterM: 0.03 },
        { id: 'B', from: 'J', to: 'R1', lengthM: 90, insideDiameterM: 0.04 },
      ],
    });
    const separate = everyMethod(file).map((network) => trapOf(solved(network), 'T1').backPressurePa);
    const { spread } = trapOf(solved(file, BANDS), 'T1');
    expect(Math.abs((spread?.lowPa ?? NaN) - Math.min(...separate))).toBeLessThan(2);
    expect(Math.abs((spread?.highPa ?? NaN) - Math.max(...separate))).toBeLessThan(2);
  });
});

describe('the credible band', () => {
  const by = (file: NetworkFile, friction: string): number =>
    trapOf(solved(withMethod(file, { friction })), 'T1').backPressurePa;

  it('of a line that fills its bore is that of the full-bore methods, solved separately', () => {
    const file = line(0.25);
    const result = solved(file, BANDS);
    expect(found(result.pipes, 'L1').flowPattern).toBe('annular');
    const separate = ['homogeneous', 'lockhartMartinelli', 'friedel', 'mullerSteinhagenHeck'].map((name) =>
      by(file, name),
    );
    expect(trapOf(result, 'T1').credible).toEqual({ lowPa: Math.min(...separate), highPa: Math.max(...separate) });
  });

  it('of a stratified line holds the dry-return basis and the balance of its level', () => {
    const file = line(0.02, { pipe: { size: { nps: '2', schedule: '40' } } });
    const result = solved(file, BANDS);
    expect(found(result.pipes, 'L1').flowPattern).toMatch(/^stratified/);
    const { lowPa = NaN, highPa = NaN } = trapOf(result, 'T1').credible ?? {};
    const [vapour, level] = [by(file, 'flashVapour'), by(file, 'byPattern')];
    expect(lowPa).toBe(Math.min(vapour, level));
    expect(highPa).toBeGreaterThanOrEqual(Math.max(vapour, level));
    expect(highPa).toBeLessThan(by(file, 'mullerSteinhagenHeck'));
  });
});

describe('a verdict', () => {
  const file = (inletPressurePa: number): NetworkFile => line(0.25, { trap: { inletPressurePa }, riseM: 4 });
  const differential = (network: NetworkFile, bands: boolean) =>
    trapOf(solved(network, { bands }), 'T1').checks.find(({ code }) => code === 'differential');

  it('that passes becomes a watch where a credible method fails it, and only there', () => {
    const seen = new Set<string>();
    for (let inletPa = 1.25e5; inletPa < 5e5; inletPa *= 1.05) {
      const [plain, banded] = [differential(file(inletPa), false), differential(file(inletPa), true)];
      const { highPa = NaN } = trapOf(solved(file(inletPa), BANDS), 'T1').credible ?? {};
      const expected = plain?.verdict === 'pass' && inletPa <= highPa ? 'watch' : plain?.verdict;
      expect(banded?.verdict).toBe(expected);
      if (banded?.verdict !== 'watch') continue;
      expect(banded.message).toMatch(/credible band/);
      expect(banded.remedy).toBeDefined();
      expect([banded.value, banded.limit]).toEqual([plain?.value, plain?.limit]);
      seen.add(banded.verdict);
    }
    expect(seen).toEqual(new Set(['watch']));
  });

  it('that fails stays a fail', () => {
    expect(differential(line(0.25, { trap: { inletPressurePa: 1.2001e5 } }), true)?.verdict).toBe('fail');
  });
});

describe('a method without a solution', () => {
  it('is named, not hidden, and takes the pass of what depends on it', () => {
    // flash steam cannot raise a return above its trap's inlet; close under the end of the steam properties a rise can
    const pipe = { size: undefined, insideDiameterM: 0.014, lengthM: 400 };
    const file = line(0.3, { pipe, trap: { inletPressurePa: 9.5e6 }, riseM: 100 });
    const trap = trapOf(solved(file, BANDS), 'T1');
    expect(trap.spread?.withoutSolution?.length).toBeGreaterThan(0);
    expect(trap.credible?.withoutSolution?.length).toBeGreaterThan(0);
    expect(Number.isFinite(trap.credible?.highPa)).toBe(true);
    expect(trap.checks.find(({ code }) => code === 'differential')?.verdict).not.toBe('pass');
  });
});
