import type { SolveResult, TrapCheck } from '@riseback/contracts';
import type { TopologyFinding } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { checkName, findingWords } from '../results/finding-words';

/** One thing that stands against an element: in a word for the table, in sentences for who asks. */
export interface RowFinding {
  readonly code: string;
  readonly status: 'fail' | 'watch';
  readonly word: string;
  readonly sentences: readonly string[];
}

/** Findings by element, the worst first: on the drawing as it is, and in the chosen case's result. */
export function rowFindings(
  topology: readonly TopologyFinding[],
  result: SolveResult | null,
  units: DisplayUnits,
): ReadonlyMap<string, readonly RowFinding[]> {
  const byElement = new Map<string, RowFinding[]>();
  const add = (id: string, finding: RowFinding): void => {
    byElement.set(id, [...(byElement.get(id) ?? []), finding]);
  };
  for (const { element, severity, code, what, why, remedy } of topology) {
    if (element === null || element.in === 'gauges') continue;
    add(element.id, {
      code,
      status: severity === 'error' ? 'fail' : 'watch',
      word: checkName(code),
      sentences: [`${what}.`, why, remedy],
    });
  }
  for (const trap of result?.traps ?? []) for (const check of trap.checks) addCheck(trap.id, check);
  for (const warning of result?.warnings ?? []) if (warning.element !== '') addCheck(warning.element, warning);
  for (const findings of byElement.values()) findings.sort((a, b) => RANK[a.status] - RANK[b.status]);
  return byElement;

  function addCheck(id: string, check: Pick<TrapCheck, 'code' | 'text' | 'remedy' | 'verdict'>): void {
    if (check.verdict === 'pass') return;
    const remedy = check.remedy === undefined ? [] : [findingWords(check.remedy, units)];
    add(id, {
      code: check.code,
      status: check.verdict,
      word: checkName(check.code),
      sentences: [findingWords(check.text, units), ...remedy],
    });
  }
}

const RANK = { fail: 0, watch: 1 } as const;

/** The first finding's word, and how many more there are: short enough to stand uncut beside its mark. */
export function findingSummary(findings: readonly RowFinding[]): string {
  const [first, ...rest] = findings;
  if (first === undefined) return '';
  return rest.length === 0 ? first.word : `${first.word} +${String(rest.length)}`;
}
