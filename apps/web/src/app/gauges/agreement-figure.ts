import { AGREEMENT_LIMITS, type AgreementRow, type JudgedRow } from '@riseback/diagnosis';
import { niceTicks } from '@riseback/figures';
import { type DisplayUnits, displayUnit, toDisplay } from '@riseback/units';
import { area, line } from 'd3-shape';
import { nameOf } from '../shared/element-words';

/** The figure's own measures, px at full size. */
export const CHART = { width: 520, height: 440, left: 52, right: 508, top: 16, bottom: 392 } as const;
const MOST_STEPS = 7;
/** Room that a name takes above or below another, px. */
const NAME_ROOM = 14;
const NAME_WIDTH = 60;

interface Point {
  readonly gaugeId: string;
  readonly name: string;
  readonly x: number;
  readonly y: number;
  /** Ends of the whiskers: expanded uncertainties, as far as the frame. */
  readonly x1: number;
  readonly x2: number;
  readonly y1: number;
  readonly y2: number;
  readonly word: JudgedRow['word'];
  readonly nameX: number;
  readonly nameY: number;
  readonly nameEnd: boolean;
}

export interface AgreementFigure {
  readonly unit: string;
  readonly ticks: readonly { readonly x: number; readonly y: number; readonly text: string }[];
  readonly diagonal: string;
  /** Within 1 and within 1.5 of the median uncertainty. */
  readonly agrees: string;
  readonly doubtful: string;
  readonly points: readonly Point[];
  readonly sentence: string;
}

/** Expected against read. The bands are for the median uncertainty; each gauge's own decides its word. Null where none is judged. */
export function agreementFigure(rows: Iterable<AgreementRow>, units: DisplayUnits): AgreementFigure | null {
  const judged = [...rows].filter((row) => row.status === 'judged');
  if (judged.length === 0) return null;
  const shown = (pa: number) => toDisplay(pa, 'pressure', units);
  const sizes = (row: JudgedRow) => [row.measurement.expandedPa, row.predicted.expandedPa] as const;
  // a whisker may be longer than all that was read: it ends at the frame, and the table has its number
  const all = judged.flatMap(({ measuredPa, predictedPa }) => [shown(measuredPa), shown(predictedPa)]);
  const ticks = niceTicks(Math.min(0, ...all), Math.max(...all), MOST_STEPS);
  const [low = 0, high = 1] = [ticks[0], ticks.at(-1)];
  const x = (value: number) => CHART.left + ((value - low) / (high - low)) * (CHART.right - CHART.left);
  const y = (value: number) => CHART.bottom - ((value - low) / (high - low)) * (CHART.bottom - CHART.top);
  const medianPa = median(judged.map((row) => Math.hypot(...sizes(row))));
  const half = shown(medianPa) - shown(0);
  const clamp = (value: number) => Math.min(high, Math.max(low, value));
  // the band's corners lie where it meets the frame
  const band = (times: number) => {
    const at = [low, low + times * half, high - times * half, high].map(clamp).sort((a, b) => a - b);
    return (
      area<number>()
        .x(x)
        .y0((value) => y(clamp(value - times * half)))
        .y1((value) => y(clamp(value + times * half)))(at) ?? ''
    );
  };
  const bare = judged.map((row) => {
    const [measured, predicted] = sizes(row);
    return {
      gaugeId: row.gaugeId,
      name: nameOf(row.gauge),
      x: x(shown(row.predictedPa)),
      y: y(shown(row.measuredPa)),
      x1: x(clamp(shown(row.predictedPa - predicted))),
      x2: x(clamp(shown(row.predictedPa + predicted))),
      y1: y(clamp(shown(row.measuredPa + measured))),
      y2: y(clamp(shown(row.measuredPa - measured))),
      word: row.word,
    };
  });
  return {
    unit: displayUnit('pressure', units.system),
    ticks: ticks.map((tick) => ({ x: x(tick), y: y(tick), text: String(tick).replace('-', '−') })),
    diagonal: line<number>(x, y)([low, high]) ?? '',
    agrees: band(AGREEMENT_LIMITS.agrees),
    doubtful: band(AGREEMENT_LIMITS.disagrees),
    points: withNames(bare),
    sentence: sentenceOf(judged),
  };
}

/** A name stands right of its point, or left of it, wherever no other stands yet. */
function withNames(points: readonly Omit<Point, 'nameX' | 'nameY' | 'nameEnd'>[]): Point[] {
  const laid: { x: number; y: number }[] = points.map((point) => ({ x: point.x - NAME_WIDTH / 4, y: point.y }));
  return points.map((point) => {
    const candidates = [
      { nameX: point.x + 9, nameY: point.y + 16, nameEnd: false },
      { nameX: point.x - 9, nameY: point.y - 8, nameEnd: true },
      { nameX: point.x + 9, nameY: point.y - 8, nameEnd: false },
      { nameX: point.x - 9, nameY: point.y + 16, nameEnd: true },
      { nameX: point.x + 9, nameY: point.y + 30, nameEnd: false },
      { nameX: point.x - 9, nameY: point.y - 22, nameEnd: true },
    ];
    const left = ({ nameX, nameEnd }: { nameX: number; nameEnd: boolean }) => (nameEnd ? nameX - NAME_WIDTH : nameX);
    const free = (at: (typeof candidates)[number]) =>
      left(at) > CHART.left &&
      left(at) + NAME_WIDTH < CHART.right + NAME_WIDTH / 2 &&
      laid.every(({ x, y }) => Math.abs(y - at.nameY) >= NAME_ROOM || Math.abs(x - left(at)) >= NAME_WIDTH);
    const chosen = candidates.find(free) ?? candidates[0];
    const at = chosen ?? { nameX: point.x, nameY: point.y, nameEnd: false };
    laid.push({ x: left(at), y: at.nameY });
    return { ...point, ...at };
  });
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const [below = 0, above = 0] = [sorted[Math.ceil(sorted.length / 2) - 1], sorted[Math.floor(sorted.length / 2)]];
  return (below + above) / 2;
}

function sentenceOf(judged: readonly JudgedRow[]): string {
  const names = (word: JudgedRow['word']) =>
    judged.filter((row) => row.word === word).map(({ gauge }) => nameOf(gauge));
  const [agree, doubtful, disagree] = [names('agrees'), names('doubtful'), names('disagrees')];
  const parts = [
    ...(disagree.length === 0 ? [] : [`${disagree.join(', ')} ${disagree.length === 1 ? 'disagrees' : 'disagree'}`]),
    ...(doubtful.length === 0 ? [] : [`${doubtful.join(', ')} ${doubtful.length === 1 ? 'is' : 'are'} doubtful`]),
    ...(agree.length === 0 ? [] : [`${String(agree.length)} of ${String(judged.length)} agree`]),
  ];
  return `Pressure read against pressure expected, ${String(judged.length)} gauges: ${parts.join('; ')}.`;
}
