import type { Band } from '@riseback/contracts';
import { type DisplayUnits, formatQuantity, toDisplay } from '@riseback/units';
import type { ProfilePoint } from '@riseback/solver';
import { area, line } from 'd3-shape';
import { niceTicks } from '../nice-ticks';
import { PAPER_CORE_FROM, type PressureClass, type PressureRamp } from '../pressure-ramp';

/** The figure's own measures, px; its width is what the page gives it. */
export const PROFILE = {
  height: 306,
  left: 48,
  /** Right of the plot, for what stands at the end of the way. */
  rightMargin: 66,
  pressureTop: 24,
  pressureBottom: 158,
  numbers: 176,
  elevationTop: 204,
  elevationBottom: 276,
} as const;
/** A rise lower than this is a pitch or a step, not a lift worth a label, m. */
const LIFT_WORTH_A_LABEL_M = 0.3;

interface Place {
  readonly x: number;
  readonly pressureY: number;
  readonly elevationY: number;
}

/** A place that pointer or keys can ask about. */
export interface ProfileSample extends Place {
  readonly words: string;
}

export interface ProfileFigure {
  /** Where the plot ends. */
  readonly right: number;
  readonly pressureTicks: readonly Tick[];
  readonly elevationTicks: readonly Tick[];
  readonly distanceTicks: readonly Tick[];
  /** The pressure line in runs of one colour class each, and its core. */
  readonly washes: readonly {
    readonly pressureClass: PressureClass;
    readonly path: string;
    readonly paperCore: boolean;
  }[];
  readonly elevationLine: string;
  readonly elevationFill: string;
  readonly lifts: readonly {
    readonly x: number;
    readonly width: number;
    readonly labelX: number;
    readonly text: string;
  }[];
  /** Where a pipe ends and the next begins. */
  readonly joints: readonly Place[];
  readonly pipeNumbers: readonly { readonly x: number; readonly text: string }[];
  readonly start: Place;
  readonly end: Place;
  readonly limit: { readonly y: number; readonly labelY: number } | null;
  /** The trap's bands, at its end of the way only: along it the other methods are not known. */
  readonly spread: BandMark | null;
  readonly credible: BandMark | null;
  readonly samples: readonly ProfileSample[];
}

/** A band as a stretch of height; an end that runs out of the plot has no cap. */
export interface BandMark {
  readonly top: number;
  readonly bottom: number;
  readonly capped: { readonly top: boolean; readonly bottom: boolean };
}

interface Tick {
  readonly at: number;
  readonly text: string;
}

export interface ProfileInput {
  /** From the trap to the end of its walk; at least two. */
  readonly points: readonly ProfilePoint[];
  readonly nameOfPipe: (pipeId: string) => string;
  readonly units: DisplayUnits;
  readonly ramp: PressureRamp;
  readonly limitPa: number | undefined;
  readonly spread?: Band | undefined;
  readonly credible?: Band | undefined;
  /** Of the whole figure, px. */
  readonly width: number;
}

/** Everything a lift profile draws, as numbers and paths: pressure upwards over elevation, flow from left to right. */
export function profileFigure(input: ProfileInput): ProfileFigure {
  const { points, nameOfPipe, units, ramp, limitPa, width } = input;
  const shown = points.map((point) => ({
    distance: toDisplay(point.distanceM, 'length', units),
    elevation: toDisplay(point.elevationM, 'length', units),
    pressure: toDisplay(point.pressurePa, 'pressure', units),
  }));
  const wayLength = Math.max(shown.at(-1)?.distance ?? 0, 1e-9);
  const right = width - PROFILE.rightMargin;
  const distanceTicks = niceTicks(0, wayLength, Math.max(2, Math.floor((right - PROFILE.left) / 140))).filter(
    (tick) => tick <= wayLength * 1.0001,
  );
  const limit = limitPa === undefined ? undefined : toDisplay(limitPa, 'pressure', units);
  const pressures = shown.map(({ pressure }) => pressure);
  const [least, most] = [Math.min(...pressures), Math.max(...pressures)];
  // a limit far off would flatten the line that the figure is about
  const limitInSight =
    limit !== undefined && Math.abs(limit - (shown[0]?.pressure ?? 0)) < 1.5 * Math.max(most - least, 1);
  const inShown = (pa: number) => toDisplay(pa, 'pressure', units);
  const credible = input.credible === undefined ? [] : [inShown(input.credible.lowPa), inShown(input.credible.highPa)];
  const reach = [least, most, ...credible, ...(limitInSight ? [limit] : [])];
  const pressureTicks = niceTicks(Math.min(...reach), Math.max(...reach), 4);
  const elevations = shown.map(({ elevation }) => elevation);
  const elevationTicks = niceTicks(Math.min(...elevations), Math.max(...elevations), 3);

  const x = (distance: number) => PROFILE.left + (distance / wayLength) * (right - PROFILE.left);
  const pressureY = scaleOf(pressureTicks, PROFILE.pressureBottom, PROFILE.pressureTop);
  const elevationY = scaleOf(elevationTicks, PROFILE.elevationBottom, PROFILE.elevationTop);
  const places = shown.map(({ distance, elevation, pressure }): Place => ({
    x: x(distance),
    pressureY: pressureY(pressure),
    elevationY: elevationY(elevation),
  }));
  const start = places[0] ?? { x: 0, pressureY: 0, elevationY: 0 };
  const end = places.at(-1) ?? start;
  const limitY = limitInSight ? pressureY(limit) : undefined;

  return {
    right,
    pressureTicks: pressureTicks.map((tick) => ({ at: pressureY(tick), text: tickText(tick) })),
    elevationTicks: elevationTicks.map((tick) => ({ at: elevationY(tick), text: tickText(tick) })),
    distanceTicks: distanceTicks.map((tick) => ({ at: x(tick), text: tickText(tick) })),
    washes: washes(shown, ramp, (distance) => x(distance), pressureY),
    elevationLine:
      line<Place>(
        (place) => place.x,
        (place) => place.elevationY,
      )(places) ?? '',
    elevationFill:
      area<Place>(
        (place) => place.x,
        PROFILE.elevationBottom,
        (place) => place.elevationY,
      )(places) ?? '',
    lifts: lifts(points, places, units, right),
    ...pipesAlong(points, places),
    start,
    end,
    limit: limitY === undefined ? null : { y: limitY, labelY: limitY > start.pressureY ? limitY + 14 : limitY - 6 },
    spread: bandMark(input.spread, (pa) => pressureY(inShown(pa))),
    credible: bandMark(input.credible, (pa) => pressureY(inShown(pa))),
    samples: places.map((place, i) => ({ ...place, words: sampleWords(points[i], i, nameOfPipe, units) })),
  };
}

function scaleOf(ticks: readonly number[], low: number, high: number): (value: number) => number {
  const [first = 0, last = 1] = [ticks[0], ticks.at(-1)];
  return (value) => low + ((value - first) / (last - first)) * (high - low);
}

function bandMark(band: Band | undefined, y: (pa: number) => number): BandMark | null {
  if (band === undefined) return null;
  const [top, bottom] = [y(band.highPa), y(band.lowPa)];
  const { pressureTop, pressureBottom } = PROFILE;
  return {
    top: Math.min(pressureBottom, Math.max(pressureTop, top)),
    bottom: Math.min(pressureBottom, Math.max(pressureTop, bottom)),
    // but for the rounding of a conversion
    capped: { top: top >= pressureTop - 0.01, bottom: bottom <= pressureBottom + 0.01 },
  };
}

interface Shown {
  readonly distance: number;
  readonly pressure: number;
}

/** Cuts the pressure line where it crosses a limit of the ramp, so that a riser changes colour along its height. */
function washes(
  shown: readonly Shown[],
  ramp: PressureRamp,
  x: (distance: number) => number,
  y: (pressure: number) => number,
): ProfileFigure['washes'] {
  const inner = ramp.limits.slice(1, -1);
  const classOf = (pressure: number): PressureClass => {
    const index = inner.filter((limit) => pressure >= limit).length;
    return ([1, 2, 3, 4, 5, 6, 7] as const)[index] ?? 7;
  };
  const runs: { pressureClass: PressureClass; points: Shown[] }[] = [];
  const add = (from: Shown, to: Shown) => {
    const pressureClass = classOf((from.pressure + to.pressure) / 2);
    const last = runs.at(-1);
    if (last?.pressureClass === pressureClass) last.points.push(to);
    else runs.push({ pressureClass, points: [from, to] });
  };
  shown.forEach((to, i) => {
    const from = shown[i - 1];
    if (from === undefined) return;
    let at = from;
    for (const limit of crossed(from.pressure, to.pressure, inner)) {
      const share = (limit - from.pressure) / (to.pressure - from.pressure);
      const cut = { distance: from.distance + share * (to.distance - from.distance), pressure: limit };
      add(at, cut);
      at = cut;
    }
    add(at, to);
  });
  const draw = line<Shown>(
    ({ distance }) => x(distance),
    ({ pressure }) => y(pressure),
  );
  return runs.map(({ pressureClass, points }) => ({
    pressureClass,
    path: draw(points) ?? '',
    paperCore: pressureClass >= PAPER_CORE_FROM,
  }));
}

/** A crossing nearer to an end than this is the end itself, but for the rounding of a conversion. */
const HAIR = 1e-6;

/** The limits strictly between two pressures, in the order in which they are met. */
function crossed(from: number, to: number, limits: readonly number[]): number[] {
  const between = limits.filter((limit) => limit > Math.min(from, to) + HAIR && limit < Math.max(from, to) - HAIR);
  return from < to ? between : between.reverse();
}

/** Rises that follow one another are one lift. A label that would run into the one before it is left out. */
function lifts(
  points: readonly ProfilePoint[],
  places: readonly Place[],
  units: DisplayUnits,
  edge: number,
): ProfileFigure['lifts'] {
  const found: { from: number; to: number; riseM: number }[] = [];
  points.forEach((point, i) => {
    const before = points[i - 1];
    if (before === undefined || point.elevationM <= before.elevationM) return;
    const last = found.at(-1);
    const riseM = point.elevationM - before.elevationM;
    if (last?.to === i - 1) Object.assign(last, { to: i, riseM: last.riseM + riseM });
    else found.push({ from: i - 1, to: i, riseM });
  });
  let taken = -Infinity;
  return found
    .filter(({ riseM }) => riseM >= LIFT_WORTH_A_LABEL_M)
    .map(({ from, to, riseM }) => {
      const [left, right] = [places[from]?.x ?? 0, places[to]?.x ?? 0];
      const decimals = units.system === 'us' ? 0 : 1;
      const text = `${formatQuantity(riseM, 'length', units, { withUnit: true, decimals })} lift`;
      const half = text.length * 3.4;
      const labelX = Math.min(edge - half, Math.max(PROFILE.left + half, right + half + 8));
      const free = labelX - half > taken;
      if (free) taken = labelX + half + 8;
      return { x: left, width: Math.max(2, right - left), labelX, text: free ? text : '' };
    });
}

function pipesAlong(
  points: readonly ProfilePoint[],
  places: readonly Place[],
): Pick<ProfileFigure, 'joints' | 'pipeNumbers'> {
  const ends = points.map((_, i) => i).filter((i) => i > 0 && points[i]?.pipeId !== points[i + 1]?.pipeId);
  let from = places[0]?.x ?? 0;
  let taken = -Infinity;
  const pipeNumbers: { x: number; text: string }[] = [];
  ends.forEach((end, i) => {
    const to = places[end]?.x ?? from;
    // numbered as in the ledger, which begins at the vessel
    const text = String(ends.length - i);
    const [middle, half] = [(from + to) / 2, 2 + text.length * 4];
    if (middle - half >= taken) {
      pipeNumbers.push({ x: middle, text });
      taken = middle + half;
    }
    from = to;
  });
  return { joints: ends.slice(0, -1).flatMap((end) => places[end] ?? []), pipeNumbers };
}

function sampleWords(
  point: ProfilePoint | undefined,
  index: number,
  nameOfPipe: (pipeId: string) => string,
  units: DisplayUnits,
): string {
  if (point === undefined) return '';
  const pipe = nameOfPipe(point.pipeId);
  return [
    index === 0
      ? `At the trap, into ${pipe}`
      : `${formatQuantity(point.distanceM, 'length', units, { withUnit: true })} along the way, in ${pipe}`,
    `elevation ${formatQuantity(point.elevationM, 'length', units, { withUnit: true })}`,
    formatQuantity(point.pressurePa, 'pressure', units, { withUnit: true, decimals: 2 }),
  ].join(', ');
}

function tickText(tick: number): string {
  const text = Math.abs(tick).toLocaleString('en', { maximumFractionDigits: 6 });
  return tick < 0 ? `−${text}` : text;
}
