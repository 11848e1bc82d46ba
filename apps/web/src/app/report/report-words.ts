import type { ReportFormat, ReportJob } from '@riseback/contracts';

export interface FormatWords {
  readonly format: ReportFormat;
  readonly name: string;
  readonly what: string;
}

export const FORMATS: readonly FormatWords[] = [
  { format: 'pdf', name: 'PDF', what: 'to read, print and hand on: cover, drawing, lists, method, results, ledgers' },
  { format: 'xlsx', name: 'XLSX', what: 'one workbook, a sheet for each list, in your units' },
  { format: 'csv', name: 'CSV', what: 'the same lists as text files, packed in one ZIP' },
  { format: 'json', name: 'JSON', what: 'everything in SI units, for programs' },
];

/** What each format tells of, in the order in which it stands there. */
export const CONTENTS = [
  'Network, revision, state, signatures and the hash of the inputs',
  'Scope and cautions',
  'Inputs: traps, pipes, junctions, vessels, pumped inlets, trap models, cases, gauges',
  'Method and limits, with their sources',
  'Results of every case: back pressure, differential and verdict of each trap; flow and losses of each pipe',
  'Ledger and lift profile of the trap that governs each header, and of those that you name',
  'Findings, and what would mend them',
  'What changed since the revision before',
] as const;

export const PAPERS = [
  { value: 'a4', words: 'A4' },
  { value: 'letter', words: 'Letter' },
] as const;

export const JOB_WORDS: Readonly<Record<ReportJob['state'], string>> = {
  waiting: 'Waiting its turn',
  running: 'Being made',
  finished: 'Made',
  failed: 'Not made',
  cancelled: 'Called off',
};

/** "840 kB", "2.4 MB": in thousands, as file lists count. */
export function sizeWords(bytes: number): string {
  if (bytes < 1_000) return `${String(bytes)} B`;
  if (bytes < 1_000_000) return `${String(Math.round(bytes / 1_000))} kB`;
  return `${(bytes / 1_000_000).toFixed(1)} MB`;
}
