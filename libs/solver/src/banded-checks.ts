import { amount, findingWords, say } from './finding-text';
import type { Band, SolveWarning, TrapCheck } from './solve-result';
import { checkTrap, type TrapUnderCheck } from './trap-checks';

/**
 * A trap's checks with its credible band in mind: a check that passes by the chosen method, and that some credible method fails, becomes
 * a watch. A band never betters a verdict. The higher end decides: more behind a trap betters no check.
 */
export function bandedChecks(checks: readonly TrapCheck[], at: TrapUnderCheck, credible: Band): readonly TrapCheck[] {
  const { highPa, withoutSolution } = credible;
  if (withoutSolution === undefined && highPa <= at.backPressurePa) return checks;
  const atHigh = new Map(
    checkTrap({ ...at, backPressurePa: Math.max(highPa, at.backPressurePa) }).checks.map((check) => [
      check.code,
      check,
    ]),
  );
  return checks.map((check) => {
    if (check.verdict !== 'pass' || !DEPENDS_ON_BACK_PRESSURE.has(check.code)) return check;
    const worst = atHigh.get(check.code);
    // a capacity without a differential is not judged, and passes nothing
    if (worst === undefined || worst.verdict === 'fail') return inDoubt(check, worst, highPa);
    return withoutSolution === undefined ? check : unsolved(check, withoutSolution);
  });
}

/** The checks that look at what stands behind the trap. */
const DEPENDS_ON_BACK_PRESSURE: ReadonlySet<string> = new Set([
  'differential',
  'capacity',
  'backPressureFraction',
  'stall',
]);

function inDoubt(check: TrapCheck, worst: TrapCheck | undefined, highPa: number): TrapCheck {
  const head = say`Passes by the chosen method, but by others within the credible band up to ${amount('pressure', highPa)} stands behind the trap. Then: `;
  const text = [...head, ...(worst?.text ?? NO_DIFFERENTIAL)];
  return { ...check, verdict: 'watch', ...findingWords(text, worst?.remedy ?? MEASURE) };
}

function unsolved(check: TrapCheck, names: readonly string[]): TrapCheck {
  const text = say`Passes by the chosen method, but of those within the credible band ${names.join(', ')} found no solution: by them the return cannot carry its load at any pressure computed.`;
  return { ...check, verdict: 'watch', ...findingWords(text, MEASURE) };
}

const NO_DIFFERENTIAL = say`nothing is left across the trap to drive its condensate out.`;
const MEASURE = say`Measure the return’s pressure at this trap, or leave room for what the higher methods say.`;

/** What a result says in place of its bands where a caller has no time for them, so that their absence is not taken for certainty. */
export function bandsLeftOut(): SolveWarning {
  const text = say`This network is too large for its bands to be computed while somebody waits: each trap shows the chosen method alone, and its verdicts know no other.`;
  const remedy = say`Solve it from the command line, which takes the time, or divide it at its flash vessels.`;
  return { code: 'bandsLeftOut', element: '', verdict: 'watch', ...findingWords(text, remedy) };
}
