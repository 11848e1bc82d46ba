import { CaseOutcome } from '@riseback/contracts';
import { NetworkFileShape } from '@riseback/network';
import type { RevisionData } from '../mail/mail-data';
import { caseNameOf, summaryOf } from './outcome-summary';
import { parsedJson } from './parsed-json';
import type { RevisionRepository } from './revision-repository';

type MailFacts = Pick<RevisionData, 'verdicts' | 'figures'>;

/** What came out of a frozen revision, for who reads of it in a mail; nothing where what is stored was changed and cannot be read. */
export function revisionMailFacts(revisions: RevisionRepository, revisionId: string): MailFacts {
  const file = NetworkFileShape.safeParse(parsedJson(revisions.fileText(revisionId) ?? '')).data;
  const outcomes = revisions
    .outcomes(revisionId)
    .flatMap(({ result }) => CaseOutcome.safeParse(parsedJson(result)).data ?? []);
  if (file === undefined || outcomes.length === 0) return {};
  const { verdicts } = summaryOf(outcomes);
  const highest = highestOf(outcomes);
  if (highest === undefined) return { verdicts };
  const trap = file.nodes.find(({ id }) => id === highest.trapId);
  const label = `Highest back pressure (${trap?.tag ?? highest.trapId}, ${caseNameOf(file, highest.caseId)})`;
  const { atmosphericPressurePa } = file.site;
  return { verdicts, figures: [{ label, kind: 'pressure', value: highest.backPressurePa, atmosphericPressurePa }] };
}

interface Highest {
  readonly trapId: string;
  readonly caseId: string;
  readonly backPressurePa: number;
}

function highestOf(outcomes: readonly CaseOutcome[]): Highest | undefined {
  let highest: Highest | undefined;
  for (const outcome of outcomes) {
    if (outcome.status === 'refused' || !outcome.result.converged) continue;
    for (const { id: trapId, backPressurePa } of outcome.result.traps) {
      if (highest === undefined || backPressurePa > highest.backPressurePa)
        highest = { trapId, caseId: outcome.caseId, backPressurePa };
    }
  }
  return highest;
}
