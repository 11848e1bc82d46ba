import type { AgreementRow, AgreementWord } from '@riseback/diagnosis';
import { WHY_NOT_WORDS } from '../readings/reading-words';
import type { WhyNotRead } from '@riseback/contracts';
import type { Status } from '../shared/status-mark/status-mark';
import { nameOf } from '../shared/element-words';
import { type DisplayUnits, formatQuantity } from '@riseback/units';

export const WORDS: Readonly<Record<AgreementWord, { readonly status: Status; readonly word: string }>> = {
  agrees: { status: 'pass', word: 'Agrees' },
  doubtful: { status: 'watch', word: 'Doubtful' },
  disagrees: { status: 'fail', word: 'Disagrees' },
};

/** One gauge of a round as it is printed; numbers in the person's units, '' where there is none. */
export interface AgreementLine {
  readonly gaugeId: string;
  readonly name: string;
  readonly status: Status;
  readonly word: string;
  readonly expected: string;
  readonly expectedWithin: string;
  readonly read: string;
  readonly readWithin: string;
  readonly difference: string;
  readonly e: string;
  /** Why there is no verdict. */
  readonly why: string;
}

export function agreementLines(
  rows: Iterable<AgreementRow>,
  whyNot: ReadonlyMap<string, WhyNotRead>,
  units: DisplayUnits,
): readonly AgreementLine[] {
  return [...rows].map((row) => ({
    gaugeId: row.gaugeId,
    name: nameOf(row.gauge),
    ...judged(row),
    ...numbers(row, units),
    why: whyNotJudged(row, whyNot),
  }));
}

/** How many of each: "7 agree", in the order of gravity. */
export function agreementCounts(rows: Iterable<AgreementRow>): readonly { status: Status; words: string }[] {
  const words = [...rows].flatMap((row) => (row.status === 'judged' ? [row.word] : []));
  const count = (word: AgreementWord) => words.filter((one) => one === word).length;
  const [disagree, doubtful, agree] = [count('disagrees'), count('doubtful'), count('agrees')];
  return [
    ...(disagree === 0
      ? []
      : [{ status: 'fail' as const, words: disagree === 1 ? '1 disagrees' : `${String(disagree)} disagree` }]),
    ...(doubtful === 0 ? [] : [{ status: 'watch' as const, words: `${String(doubtful)} doubtful` }]),
    ...(agree === 0 ? [] : [{ status: 'pass' as const, words: agree === 1 ? '1 agrees' : `${String(agree)} agree` }]),
  ];
}

export function signed(pa: number, units: DisplayUnits): string {
  const text = formatQuantity(pa, 'pressureDifference', units);
  return pa > 0 && Number(text) !== 0 ? `+${text}` : text;
}

export function eText(e: number): string {
  const text = Math.abs(e).toFixed(1);
  return Number(text) === 0 ? text : `${e < 0 ? '−' : '+'}${text}`;
}

function judged(row: AgreementRow): { status: Status; word: string } {
  return row.status === 'judged' ? WORDS[row.word] : { status: 'none', word: 'Not judged' };
}

function numbers(row: AgreementRow, units: DisplayUnits) {
  const pressure = (pa: number | undefined) => (pa === undefined ? '' : formatQuantity(pa, 'pressure', units));
  const within = (pa: number) => `± ${formatQuantity(pa, 'pressureDifference', units)}`;
  const measuredPa = 'measuredPa' in row ? row.measuredPa : undefined;
  const predictedPa = 'predictedPa' in row ? row.predictedPa : row.prediction?.pressurePa;
  const both = measuredPa !== undefined && predictedPa !== undefined;
  return {
    read: pressure(measuredPa),
    expected: pressure(predictedPa),
    difference: both ? signed(measuredPa - predictedPa, units) : '',
    readWithin: row.status === 'judged' ? within(row.measurement.expandedPa) : '',
    expectedWithin: row.status === 'judged' ? within(row.predicted.expandedPa) : '',
    e: row.status === 'judged' ? eText(row.normalisedError) : '',
  };
}

function whyNotJudged(row: AgreementRow, whyNot: ReadonlyMap<string, WhyNotRead>): string {
  switch (row.status) {
    case 'judged':
      return '';
    case 'notRead': {
      const why = whyNot.get(row.gaugeId);
      return why === undefined ? 'Not read' : `Not read: ${WHY_NOT_WORDS[why].toLowerCase()}`;
    }
    case 'notPredicted':
      return 'No result at its place';
    case 'accuracyUnknown':
      return 'Its range or accuracy is not in the gauge list';
  }
}
