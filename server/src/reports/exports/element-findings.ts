import { checkName, type FindingText, type SolveResult } from '@riseback/contracts';
import type { TopologyFinding } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';

export type FindingStatus = 'fail' | 'watch' | 'note';

/** One thing that stands against an element, or against the network as a whole (elementId ''). */
export interface ElementFinding {
  readonly elementId: string;
  readonly status: FindingStatus;
  readonly code: string;
  readonly what: string;
  readonly why?: string | undefined;
  readonly remedy?: string | undefined;
}

export const STATUS_WORDS: Readonly<Record<FindingStatus, string>> = { fail: 'Fail', watch: 'Watch', note: 'Note' };
const RANK: Readonly<Record<FindingStatus, number>> = { fail: 0, watch: 1, note: 2 };

/** A finding's sentence with its numbers in the reader's units. */
export function sentence(text: FindingText | NonNullable<TopologyFinding['whatText']>, units: DisplayUnits): string {
  return text
    .map((part) =>
      typeof part === 'string' ? part : formatQuantity(part.si, part.quantity, units, { withUnit: true }),
    )
    .join('');
}

/** What is wrong with the network as drawn, in whatever case. */
export function drawnFindings(topology: readonly TopologyFinding[], units: DisplayUnits): ElementFinding[] {
  return topology.map(({ element, severity, code, what, whatText, why, remedy }) => ({
    elementId: element?.id ?? '',
    status: severity === 'error' ? 'fail' : 'note',
    code,
    what: whatText === undefined ? what : sentence(whatText, units),
    why,
    remedy,
  }));
}

/** What the solve of one case found at its traps, then elsewhere; checks that pass are no findings. */
export function solvedFindings({ traps, warnings }: SolveResult, units: DisplayUnits): ElementFinding[] {
  const atTraps = traps.flatMap(({ id, checks }) => checks.map((check) => ({ ...check, element: id })));
  return [...atTraps, ...warnings].flatMap(({ element, verdict, code, text, remedy }) =>
    verdict === 'pass'
      ? []
      : [
          {
            elementId: element,
            status: verdict,
            code,
            what: sentence(text, units),
            remedy: remedy === undefined ? undefined : sentence(remedy, units),
          },
        ],
  );
}

export function byElement(findings: readonly ElementFinding[]): ReadonlyMap<string, readonly ElementFinding[]> {
  const found = new Map<string, ElementFinding[]>();
  for (const finding of worstFirst(findings)) {
    const before = found.get(finding.elementId);
    if (before === undefined) found.set(finding.elementId, [finding]);
    else before.push(finding);
  }
  return found;
}

export function worstFirst<F extends ElementFinding>(findings: readonly F[]): F[] {
  return [...findings].sort((a, b) => RANK[a.status] - RANK[b.status]);
}

/** As the lists print it: the worst by its word, and how many more there are. */
export function findingSummary(findings: readonly ElementFinding[]): string | undefined {
  const [worst, ...rest] = findings;
  if (worst === undefined) return undefined;
  // on the screen's lists a note about the drawing asks to be watched
  const word = worst.status === 'fail' ? STATUS_WORDS.fail : STATUS_WORDS.watch;
  return `${word}: ${checkName(worst.code)}${rest.length === 0 ? '' : ` +${String(rest.length)}`}`;
}
