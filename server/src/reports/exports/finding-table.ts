import { checkName } from '@riseback/contracts';
import { drawnFindings, type ElementFinding, solvedFindings, STATUS_WORDS, worstFirst } from './element-findings';
import { type ReportColumn, type ReportTable, tableOf } from './report-table';
import { unsolvedWords } from './solved-cases';
import { caseNameOf, nameOfElement, type TableSource } from './table-source';

/** The same thing at the same element stands once, with the cases in which it holds. */
interface SharedFinding extends ElementFinding {
  /** Empty where it holds in whatever case. */
  readonly cases: string[];
}

export function findingTable(source: TableSource): ReportTable {
  return tableOf('Findings', findingColumns(source), sharedFindings(source), source.units);
}

function sharedFindings(source: TableSource): SharedFinding[] {
  const { topology, units, outcomes } = source;
  const shared = new Map<string, SharedFinding>();
  for (const outcome of outcomes) {
    for (const finding of foundIn(source, outcome)) {
      const key = JSON.stringify([finding.elementId, finding.code, finding.status, finding.what, finding.remedy]);
      const before = shared.get(key);
      const caseName = caseNameOf(source, outcome.caseId);
      if (before === undefined) shared.set(key, { ...finding, cases: [caseName] });
      else if (!before.cases.includes(caseName)) before.cases.push(caseName);
    }
  }
  const drawn = drawnFindings(topology, units).map((finding): SharedFinding => ({ ...finding, cases: [] }));
  return worstFirst([...drawn, ...shared.values()]);
}

function foundIn({ units }: TableSource, outcome: TableSource['outcomes'][number]): ElementFinding[] {
  const unsolved = unsolvedWords(outcome);
  const whole: ElementFinding[] =
    unsolved === undefined
      ? []
      : [
          {
            elementId: '',
            status: 'fail',
            code: outcome.status === 'refused' ? 'refused' : 'noSolution',
            what: unsolved,
          },
        ];
  return outcome.status === 'refused' ? whole : [...whole, ...solvedFindings(outcome.result, units)];
}

function findingColumns(source: TableSource): ReportColumn<SharedFinding>[] {
  return [
    { title: 'Verdict', value: ({ status }) => STATUS_WORDS[status] },
    {
      title: 'Element',
      value: ({ elementId }) => (elementId === '' ? 'Whole network' : nameOfElement(source, elementId)),
    },
    { title: 'Check', value: ({ code }) => checkName(code) },
    { title: 'Cases', value: ({ cases }) => (cases.length === 0 ? 'Any' : cases.join(', ')) },
    { title: 'What is so', value: ({ what }) => what },
    { title: 'Why it matters', value: ({ why }) => why },
    { title: 'What would mend it', value: ({ remedy }) => remedy },
    { title: 'Id', value: ({ elementId }) => elementId },
  ];
}
