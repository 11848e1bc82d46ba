import type { RevisionState } from '@riseback/contracts';
import type { ReportContent } from '../report-content';
import { reportStanding } from './report-standing';
import type { ReportTable, TableCell } from './report-table';
import { caseNameOf, type TableSource } from './table-source';
import { unsolvedWords } from './solved-cases';

const CAUTIONS = [
  'Steam and hot condensate burn and kill; water hammer breaks pipes. Nobody opens a line, a trap or a gauge connection on the word of a calculation.',
  'Riseback computes a steady state from what was typed. It does not replace local codes (for instance the power-piping and building-services piping codes and pressure-equipment law) or a licensed engineer’s judgement.',
] as const;

const EVENT_WORDS: Readonly<Record<RevisionState, string>> = {
  draft: 'Frozen',
  underReview: 'Issued for review',
  returned: 'Returned',
  approved: 'Approved',
  superseded: 'Superseded',
  withdrawn: 'Withdrawn',
};

/** What the report is of, how it stands, who signed it, and what every part of it must be read with. */
export function coverTable(content: ReportContent, source: TableSource): ReportTable {
  const { siteName, networkName, reader, madeAt, fileHash, solverHash, engineVersion, outcomes } = content;
  const time = (iso: string) => timeWords(iso, reader.timeZone);
  const rows: (readonly [string, TableCell])[] = [
    ['Calculation report', networkName],
    ['Site', siteName],
    ['State', reportStanding(content).words],
    ...stateRows(content, time),
    ['Inputs, SHA-256', fileHash],
    ['What was solved, SHA-256', solverHash],
    ['Engine', engineVersion],
    ...outcomes.map((outcome): [string, string] => [
      `Case ${caseNameOf(source, outcome.caseId)}`,
      unsolvedWords(outcome) ?? 'Solved',
    ]),
    ['Pressures', 'Gauge, above the site’s atmosphere; differences are neither gauge nor absolute'],
    ['Made at', time(madeAt)],
    ['Made for', reader.name],
    ...CAUTIONS.map((caution): [string, string] => ['Caution', caution]),
  ];
  return { name: 'Cover', columns: ['What', 'Value'].map((title) => ({ title, unit: '' })), rows };
}

function stateRows({ state, previous }: ReportContent, time: (iso: string) => string): [string, string][] {
  if (state.kind === 'working')
    return [
      ['Version', String(state.version)],
      ['Last changed', `${time(state.changedAt)}, ${state.changedByName}`],
    ];
  return [
    ['Revision', `${state.letter}, ${state.title}`],
    ['Reason', state.reason],
    ['Version', String(state.version)],
    ['Frozen by', `${state.createdByName}, ${time(state.createdAt)}`],
    ['Results, SHA-256', state.resultsHash],
    ...state.events.map(({ state: reached, at, personName, note }): [string, string] => [
      'Course',
      [`${EVENT_WORDS[reached]}, ${time(at)}, ${personName}`, note].filter((part) => part !== '').join(': '),
    ]),
    ...state.signatures.map(({ meaning, personName, role, at, keyId }): [string, string] => [
      'Signature',
      `${meaning === 'approved' ? 'Approved' : 'Reviewed'} by ${personName}, ${role}, ${time(at)}; key ${keyId}`,
    ]),
    ...(previous === undefined
      ? []
      : [['Compared with', `Revision ${previous.letter}, ${previous.title}`] as [string, string]]),
  ];
}

function timeWords(iso: string, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', {
    timeZone,
    year: 'numeric',
    month: 'short',
    day: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZoneName: 'short',
  }).format(new Date(iso));
}
