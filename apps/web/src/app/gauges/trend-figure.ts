import type { Round } from '@riseback/contracts';
import type { AgreementRow, AgreementWord } from '@riseback/diagnosis';
import { niceTicks } from '@riseback/figures';
import { type DisplayUnits, displayUnit, formatQuantity, toDisplay } from '@riseback/units';
import { line } from 'd3-shape';
import { timeWords } from '../account/time-words';
import { eText, signed, WORDS } from './agreement-lines';

/** The figure's own measures, px at full size. */
export const TREND = { width: 620, height: 220, left: 52, right: 604, top: 16, bottom: 180 } as const;
const MOST_STEPS = 5;

/** A round with what came of it; null where its case has no result. */
export interface PastRound {
  readonly round: Round;
  readonly agreement: ReadonlyMap<string, AgreementRow> | null;
}

export interface TrendPoint {
  readonly roundId: string;
  readonly when: string;
  readonly x: number;
  readonly readY: number;
  readonly expectedY: number;
  /** Between which the reading would agree. */
  readonly highY: number;
  readonly lowY: number;
  readonly word: AgreementWord | null;
  readonly read: string;
  readonly expected: string;
  readonly difference: string;
  readonly e: string;
  readonly verdict: string;
}

export interface TrendFigure {
  readonly unit: string;
  readonly ticks: readonly { readonly y: number; readonly text: string }[];
  readonly points: readonly TrendPoint[];
  readonly way: string;
  readonly sentence: string;
}

/** One gauge over the rounds, each against its own case. Rounds stand side by side in their order, however far apart in time. */
export function trendFigure(
  history: readonly PastRound[],
  gaugeId: string,
  name: string,
  units: DisplayUnits,
  timeZone: string,
): TrendFigure | null {
  const rows = history.flatMap(({ round, agreement }) => {
    const row = agreement?.get(gaugeId);
    return row !== undefined && (row.status === 'judged' || row.status === 'accuracyUnknown') ? [{ round, row }] : [];
  });
  if (rows.length === 0) return null;
  const shown = (pa: number) => toDisplay(pa, 'pressure', units);
  const within = (row: (typeof rows)[number]['row']) =>
    row.status === 'judged' ? Math.hypot(row.measurement.expandedPa, row.predicted.expandedPa) : 0;
  // a band may be wider than all that was read: it ends at the frame
  const all = rows.flatMap(({ row }) => [row.measuredPa, row.predictedPa]);
  const ticks = niceTicks(Math.min(0, ...all.map(shown)), Math.max(...all.map(shown)), MOST_STEPS);
  const [low = 0, high = 1] = [ticks[0], ticks.at(-1)];
  const clamp = (value: number) => Math.min(high, Math.max(low, value));
  const y = (value: number) => TREND.bottom - ((value - low) / (high - low)) * (TREND.bottom - TREND.top);
  const x = (i: number) => TREND.left + ((i + 0.5) / rows.length) * (TREND.right - TREND.left);
  const pressure = (pa: number) => formatQuantity(pa, 'pressure', units);
  const points = rows.map(({ round, row }, i): TrendPoint => {
    const word = row.status === 'judged' ? row.word : null;
    return {
      roundId: round.id,
      when: timeWords(round.startedAt, timeZone),
      x: x(i),
      readY: y(shown(row.measuredPa)),
      expectedY: y(shown(row.predictedPa)),
      highY: y(clamp(shown(row.predictedPa + within(row)))),
      lowY: y(clamp(shown(row.predictedPa - within(row)))),
      word,
      read: pressure(row.measuredPa),
      expected: pressure(row.predictedPa),
      difference: signed(row.measuredPa - row.predictedPa, units),
      e: row.status === 'judged' ? eText(row.normalisedError) : '',
      verdict: word === null ? 'Not judged' : WORDS[word].word,
    };
  });
  const [last] = points.slice(-1);
  return {
    unit: displayUnit('pressure', units.system),
    ticks: ticks.map((tick) => ({ y: y(tick), text: String(tick).replace('-', '−') })),
    points,
    way:
      line<TrendPoint>(
        (point) => point.x,
        (point) => point.readY,
      )(points) ?? '',
    sentence: `${name} over ${String(points.length)} ${points.length === 1 ? 'round' : 'rounds'}; last read ${last?.read ?? ''} with ${last?.expected ?? ''} expected: ${last?.verdict ?? ''}.`,
  };
}
