import type { CapacityPoint } from '@riseback/network';
import { trapCapacityKgS } from '@riseback/solver';
import { type DisplayUnits, displayUnit, formatQuantity, fromDisplay, toDisplay } from '@riseback/units';
import { line } from 'd3-shape';
import { logScale, type LogScale } from './log-ticks';

/** The figure's own measures, px at full size. */
export const CAPACITY = { width: 360, height: 236, left: 52, right: 348, top: 22, bottom: 192 } as const;
/** Steps drawn between two points; the law between them bends only a little on these scales. */
const STEPS = 12;
/** So many labelled lines fit beside one another. */
const MOST_LABELS = 9;

/** Where a trap stands: what it has across it and what must pass there. */
export interface CapacityNeed {
  readonly differentialPa: number;
  readonly needKgS: number;
}

interface Tick {
  readonly at: number;
  /** '' where there is no room for a number. */
  readonly text: string;
}

export interface CapacityFigure {
  readonly differentialUnit: string;
  readonly flowUnit: string;
  /** Between the points. */
  readonly curve: string;
  /** Below the first and above the last, where the law goes on but no point stands. */
  readonly beyond: readonly string[];
  readonly points: readonly { readonly x: number; readonly y: number }[];
  readonly differentialTicks: readonly Tick[];
  readonly flowTicks: readonly Tick[];
  readonly need: { readonly x: number; readonly y: number; readonly short: boolean; readonly left: boolean } | null;
  readonly sentence: string;
  readonly rows: readonly { readonly differential: string; readonly flow: string }[];
}

/**
 * What a trap model passes over the differential, on logarithmic scales, by the law that the solver judges with.
 * @returns null without points
 */
export function capacityFigure(
  points: readonly CapacityPoint[],
  units: DisplayUnits,
  need: CapacityNeed | null = null,
): CapacityFigure | null {
  const [first, last] = [points[0], points.at(-1)];
  if (first === undefined || last === undefined) return null;
  const shownNeed = need !== null && need.differentialPa > 0 && need.needKgS > 0 ? need : null;
  const differentials = [...points, ...(shownNeed === null ? [] : [shownNeed])].map((at) => at.differentialPa);
  const scaleX = scaleOf(differentials, 'pressureDifference', units);
  const lowPa = fromDisplay(scaleX.low, 'pressureDifference', units);
  const highPa = fromDisplay(scaleX.high, 'pressureDifference', units);
  const flowAt = (differentialPa: number) => trapCapacityKgS([...points], differentialPa);
  const flows = [
    flowAt(lowPa),
    ...points.map(({ flowKgS }) => flowKgS),
    ...(shownNeed === null ? [] : [shownNeed.needKgS]),
  ];
  const scaleY = scaleOf(flows, 'massFlow', units);
  const x = (pa: number) => along(scaleX, toDisplay(pa, 'pressureDifference', units), CAPACITY.left, CAPACITY.right);
  const y = (kgS: number) => along(scaleY, toDisplay(kgS, 'massFlow', units), CAPACITY.bottom, CAPACITY.top);
  const path = (differentialsPa: readonly number[]) =>
    line<number>(
      (pa) => x(pa),
      (pa) => y(flowAt(pa)),
    )([...differentialsPa]) ?? '';

  return {
    differentialUnit: displayUnit('pressureDifference', units.system),
    flowUnit: displayUnit('massFlow', units.system),
    curve: path(steps(points.map(({ differentialPa }) => differentialPa))),
    beyond: [
      [lowPa, first.differentialPa],
      [last.differentialPa, highPa],
    ].flatMap(([from = 0, to = 0]) => (to > from * (1 + 1e-9) ? [path(steps([from, to]))] : [])),
    points: points.map(({ differentialPa, flowKgS }) => ({ x: x(differentialPa), y: y(flowKgS) })),
    differentialTicks: ticksOf(scaleX, (tick) => along(scaleX, tick, CAPACITY.left, CAPACITY.right)),
    flowTicks: ticksOf(scaleY, (tick) => along(scaleY, tick, CAPACITY.bottom, CAPACITY.top)),
    need:
      shownNeed === null
        ? null
        : {
            x: x(shownNeed.differentialPa),
            y: y(shownNeed.needKgS),
            short: flowAt(shownNeed.differentialPa) < shownNeed.needKgS,
            left: x(shownNeed.differentialPa) > (CAPACITY.left + CAPACITY.right) / 2,
          },
    sentence: sentence(points, flowAt, shownNeed, units),
    rows: points.map(({ differentialPa, flowKgS }) => ({
      differential: formatQuantity(differentialPa, 'pressureDifference', units),
      flow: formatQuantity(flowKgS, 'massFlow', units),
    })),
  };
}

function scaleOf(si: readonly number[], kind: 'pressureDifference' | 'massFlow', units: DisplayUnits): LogScale {
  const shown = si.map((value) => toDisplay(value, kind, units));
  return logScale(Math.min(...shown), Math.max(...shown));
}

function along({ low, high }: LogScale, value: number, from: number, to: number): number {
  return from + (Math.log(value / low) / Math.log(high / low)) * (to - from);
}

/** Points between the given ones, evenly on a logarithmic scale, the given ones among them. */
function steps(given: readonly number[]): number[] {
  return given.flatMap((from, i) => {
    const to = given[i + 1];
    if (to === undefined) return [from];
    return Array.from({ length: STEPS }, (_, step) => from * (to / from) ** (step / STEPS));
  });
}

function ticksOf({ ticks }: LogScale, at: (tick: number) => number): Tick[] {
  const crowded = ticks.length > MOST_LABELS;
  return ticks.map((tick) => ({ at: at(tick), text: crowded && !isPowerOfTen(tick) ? '' : tickText(tick) }));
}

function isPowerOfTen(tick: number): boolean {
  return /^1e/.test(tick.toExponential());
}

function tickText(tick: number): string {
  return tick.toLocaleString('en-US', { maximumSignificantDigits: 1 });
}

function sentence(
  points: readonly CapacityPoint[],
  flowAt: (pa: number) => number,
  need: CapacityNeed | null,
  units: DisplayUnits,
): string {
  const flow = (kgS: number) => formatQuantity(kgS, 'massFlow', units, { withUnit: true });
  const pressure = (pa: number) => formatQuantity(pa, 'pressureDifference', units, { withUnit: true });
  const [first, last] = [points[0], points.at(-1)];
  if (first === undefined || last === undefined) return '';
  const span =
    points.length === 1
      ? `Capacity ${flow(first.flowKgS)} at ${pressure(first.differentialPa)}, one point.`
      : `Capacity from ${flow(first.flowKgS)} at ${pressure(first.differentialPa)} to ${flow(last.flowKgS)} at ${pressure(last.differentialPa)}, ${String(points.length)} points.`;
  if (need === null) return span;
  return `${span} At this trap’s ${pressure(need.differentialPa)} it passes ${flow(flowAt(need.differentialPa))}; ${flow(need.needKgS)} is needed.`;
}
