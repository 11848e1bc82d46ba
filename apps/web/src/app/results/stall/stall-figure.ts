import { type DisplayUnits, displayUnit, formatQuantity, toDisplay } from '@riseback/units';
import { line } from 'd3-shape';
import { niceTicks } from '@riseback/figures';
import type { StallFacts } from './stall-facts';

/** The figure's own measures, px at full size. */
export const STALL = { width: 332, height: 190, left: 44, right: 308, top: 20, bottom: 152 } as const;
/** Load fractions that the table beside the figure gives. */
const TABLE_LOADS = [0, 0.25, 0.5, 0.75, 1] as const;

interface Tick {
  readonly at: number;
  readonly text: string;
}

export interface StallRow {
  readonly load: string;
  readonly pressure: string;
  readonly word: string;
}

export interface StallFigure {
  readonly unit: string;
  readonly curve: string;
  readonly pressureTicks: readonly Tick[];
  readonly loadTicks: readonly Tick[];
  readonly backY: number;
  readonly back: string;
  /** Above its line where there is room. */
  readonly backLabelY: number;
  /** Where the steam space falls to the back pressure; null where it does not between no load and full load. */
  readonly stall: { readonly x: number; readonly text: string } | null;
  /** From no load to the stall load: where nothing drives the condensate out. */
  readonly stalledWidth: number;
  /** The case's load. */
  readonly load: { readonly x: number; readonly y: number; readonly stalled: boolean };
  readonly sentence: string;
  readonly rows: readonly StallRow[];
}

/** The steam space of a modulated exchanger over its load, with what its trap stands against. */
export function stallFigure({ curve, loadFraction }: StallFacts, units: DisplayUnits): StallFigure {
  const { backPressurePa, stallFraction, points } = curve;
  const shown = (pa: number) => toDisplay(pa, 'pressure', units);
  const pressures = [...points.map(({ steamPressurePa }) => steamPressurePa), backPressurePa].map(shown);
  const ticks = niceTicks(Math.min(...pressures), Math.max(...pressures), 4);
  const [low = 0, high = 1] = [ticks[0], ticks.at(-1)];
  const x = (fraction: number) => STALL.left + Math.min(1, Math.max(0, fraction)) * (STALL.right - STALL.left);
  const y = (value: number) => STALL.bottom - ((value - low) / (high - low)) * (STALL.bottom - STALL.top);
  const at = (fraction: number) => steamAt(points, fraction);
  const stalled = loadFraction < stallFraction;
  const pressure = (pa: number) => formatQuantity(pa, 'pressure', units);
  const share = (fraction: number) => formatQuantity(fraction, 'fraction', units, { withUnit: true, decimals: 0 });
  const within = stallFraction > 0 && stallFraction < 1;
  return {
    unit: displayUnit('pressure', units.system),
    curve:
      line<StallFacts['curve']['points'][number]>(
        (point) => x(point.loadFraction),
        (point) => y(shown(point.steamPressurePa)),
      )([...points]) ?? '',
    pressureTicks: ticks.map((tick) => ({ at: y(tick), text: tickText(tick) })),
    loadTicks: TABLE_LOADS.map((load) => ({ at: x(load), text: share(load) })),
    backY: y(shown(backPressurePa)),
    back: pressure(backPressurePa),
    backLabelY: y(shown(backPressurePa)) + (y(shown(backPressurePa)) - STALL.top < 16 ? 14 : -5),
    stall: within ? { x: x(stallFraction), text: share(stallFraction) } : null,
    stalledWidth: x(stallFraction) - STALL.left,
    load: { x: x(loadFraction), y: y(shown(at(loadFraction))), stalled },
    sentence: sentence(curve, loadFraction, at(loadFraction), units),
    rows: [...TABLE_LOADS, ...(within ? [stallFraction] : []), loadFraction]
      .filter((load, i, all) => all.indexOf(load) === i)
      .sort((a, b) => a - b)
      .map((load) => ({
        load: share(load),
        pressure: pressure(at(load)),
        word: rowWord(load, loadFraction, within ? stallFraction : undefined),
      })),
  };
}

/** Linear between the curve's points, which stand close. */
function steamAt(points: StallFacts['curve']['points'], fraction: number): number {
  const after = points.findIndex((point) => point.loadFraction >= fraction);
  const [a, b] = [points[Math.max(0, after - 1)], after === -1 ? points.at(-1) : points[after]];
  if (a === undefined || b === undefined) return 0;
  if (a === b || after === -1) return b.steamPressurePa;
  const share = (fraction - a.loadFraction) / (b.loadFraction - a.loadFraction);
  return a.steamPressurePa + share * (b.steamPressurePa - a.steamPressurePa);
}

function rowWord(load: number, caseLoad: number, stallLoad: number | undefined): string {
  if (load === caseLoad) return 'this case';
  return load === stallLoad ? 'stalls below' : '';
}

function sentence(
  { backPressurePa, stallFraction, points }: StallFacts['curve'],
  loadFraction: number,
  steamPa: number,
  units: DisplayUnits,
): string {
  const pressure = (pa: number) => formatQuantity(pa, 'pressure', units, { withUnit: true });
  const share = (fraction: number) => formatQuantity(fraction, 'fraction', units, { withUnit: true, decimals: 0 });
  const span = `Steam space from ${pressure(points[0]?.steamPressurePa ?? 0)} at no load to ${pressure(points.at(-1)?.steamPressurePa ?? 0)} at full load, against ${pressure(backPressurePa)} of back pressure.`;
  const stalls =
    stallFraction <= 0
      ? 'It does not stall at any load.'
      : stallFraction >= 1
        ? 'It stalls at every load.'
        : `It stalls below ${share(stallFraction)} of full load.`;
  return `${span} ${stalls} This case runs at ${share(loadFraction)}, where the steam space has ${pressure(steamPa)}.`;
}

function tickText(tick: number): string {
  return (tick < 0 ? '−' : '') + String(Math.abs(tick));
}
