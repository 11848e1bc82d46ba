import type { Band } from '@riseback/contracts';
import { type DisplayUnits, formatQuantity, toDisplay } from '@riseback/units';
import type { ProfileBand, ProfilePoint } from '@riseback/solver';
import { area, line } from 'd3-shape';
import { niceTicks } from './nice-ticks';
import type { PressureRamp } from './pressure-ramp';
import type { GaugeOnWay } from './gauges-on-way';
import { type AlongText, type LiftMark, liftsAlong, type Place, pipesAlong, sizesAlong } from './profile-marks';
import { type Wash, washesOf } from './profile-washes';

/** The figure's own measures, px; its width is what the page gives it. */
export const PROFILE = {
  height: 322,
  left: 48,
  /** Right of the plot, for what stands at the end of the way. */
  rightMargin: 66,
  pressureTop: 24,
  pressureBottom: 158,
  numbers: 174,
  sizes: 193,
  elevationTop: 220,
  elevationBottom: 292,
} as const;
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
  readonly washes: readonly Wash[];
  readonly elevationLine: string;
  readonly elevationFill: string;
  readonly lifts: readonly LiftMark[];
  /** Where a pipe ends and the next begins. */
  readonly joints: readonly Place[];
  readonly pipeNumbers: readonly AlongText[];
  readonly sizes: readonly AlongText[];
  readonly gauges: readonly GaugeMark[];
  readonly start: Place;
  readonly end: Place;
  readonly limit: { readonly y: number; readonly labelY: number } | null;
  /** The trap's bands, at its end of the way. */
  readonly spread: BandMark | null;
  readonly credible: BandMark | null;
  /** The bands along the way; null where they are known at the trap alone. */
  readonly bands: { readonly spread: BandArea; readonly credible: BandArea } | null;
  readonly samples: readonly ProfileSample[];
}

/** A band as a stretch of height; an end that runs out of the plot has no cap. */
export interface BandMark {
  readonly top: number;
  readonly bottom: number;
  readonly capped: { readonly top: boolean; readonly bottom: boolean };
}

/** A band along the way: what is filled, and its two edges. Parts beyond the plot are for the clip of the drawing. */
export interface BandArea {
  readonly fill: string;
  readonly edges: string;
}

/** A gauge on the way: its tap on the line of elevation, its dial where it hangs, and its place on the pressure line. */
export interface GaugeMark extends Place {
  readonly id: string;
  readonly tag: string;
  readonly dialY: number;
  /** Its tag finds no room beside its neighbours'. */
  readonly silent: boolean;
  /** Its tag stands to the left, since the name of the end of the way is to the right. */
  readonly beside: boolean;
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
  /** One for each point. */
  readonly bands?: readonly ProfileBand[] | undefined;
  readonly sizeOf?: (pipeId: string) => string;
  readonly gauges?: readonly GaugeOnWay[];
  /** Of the whole figure, px. */
  readonly width: number;
}

/** Everything a lift profile draws, as numbers and paths: pressure upwards over elevation, flow from left to right. */
export function profileFigure(input: ProfileInput): ProfileFigure {
  const { points, units, ramp, limitPa, width } = input;
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
  const crediblyAlong = (input.bands ?? []).flatMap((band) => [
    inShown(band.credibleLowPa),
    inShown(band.credibleHighPa),
  ]);
  const reach = [least, most, ...credible, ...crediblyAlong, ...(limitInSight ? [limit] : [])];
  const pressureTicks = niceTicks(Math.min(...reach), Math.max(...reach), 4);
  const gauges = input.gauges ?? [];
  const elevations = [
    ...shown.map(({ elevation }) => elevation),
    ...gauges.map(({ elevationM }) => toDisplay(elevationM, 'length', units)),
  ];
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
    washes: washesOf(shown, ramp, (distance) => x(distance), pressureY),
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
    lifts: liftsAlong(points, places, units, { left: PROFILE.left, right }),
    ...pipesAlong(points, places),
    sizes: input.sizeOf === undefined ? [] : sizesAlong(points, places, input.sizeOf),
    gauges: gaugeMarks(gauges, right, {
      x: (metres) => x(toDisplay(metres, 'length', units)),
      pressureY: (pa) => pressureY(inShown(pa)),
      elevationY: (metres) => elevationY(toDisplay(metres, 'length', units)),
    }),
    start,
    end,
    limit: limitY === undefined ? null : { y: limitY, labelY: limitY > start.pressureY ? limitY + 14 : limitY - 6 },
    spread: bandMark(input.spread, (pa) => pressureY(inShown(pa))),
    credible: bandMark(input.credible, (pa) => pressureY(inShown(pa))),
    bands: bandAreas(places, input.bands, (pa) => pressureY(inShown(pa))),
    samples: places.map((place, i) => ({ ...place, words: sampleWords(input, i) })),
  };
}

function scaleOf(ticks: readonly number[], low: number, high: number): (value: number) => number {
  const [first = 0, last = 1] = [ticks[0], ticks.at(-1)];
  return (value) => low + ((value - first) / (last - first)) * (high - low);
}

function bandAreas(
  places: readonly Place[],
  bands: readonly ProfileBand[] | undefined,
  y: (pa: number) => number,
): ProfileFigure['bands'] {
  if (bands?.length !== places.length) return null;
  const areaOf = (ends: readonly (readonly [low: number, high: number])[]): BandArea => {
    const rows = places.map(({ x }, i) => ({ x, low: y(ends[i]?.[0] ?? 0), high: y(ends[i]?.[1] ?? 0) }));
    type Row = (typeof rows)[number];
    const edge = (at: (row: Row) => number) => line<Row>((row) => row.x, at)(rows) ?? '';
    return {
      fill:
        area<Row>(
          (row) => row.x,
          (row) => row.low,
          (row) => row.high,
        )(rows) ?? '',
      edges: `${edge((row) => row.low)}${edge((row) => row.high)}`,
    };
  };
  return {
    spread: areaOf(bands.map((band) => [band.spreadLowPa, band.spreadHighPa])),
    credible: areaOf(bands.map((band) => [band.credibleLowPa, band.credibleHighPa])),
  };
}

/** Half the width of a letter of a gauge's tag, px. */
const HALF_LETTER = 3.3;

function gaugeMarks(
  gauges: readonly GaugeOnWay[],
  right: number,
  at: { x: (metres: number) => number; pressureY: (pa: number) => number; elevationY: (metres: number) => number },
): readonly GaugeMark[] {
  let taken = -Infinity;
  return gauges.map(({ id, tag, distanceM, tapElevationM, elevationM, pressurePa }) => {
    const x = at.x(distanceM);
    const half = tag.length * HALF_LETTER + 3;
    const silent = x - half < taken;
    if (!silent) taken = x + half;
    return {
      id,
      tag,
      x,
      silent,
      beside: x + half > right,
      pressureY: at.pressureY(pressurePa),
      elevationY: at.elevationY(tapElevationM),
      dialY: at.elevationY(elevationM),
    };
  });
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

/** What a reader of the figure hears or reads at a point of the way. */
function sampleWords({ points, bands, gauges = [], nameOfPipe, sizeOf, units }: ProfileInput, index: number): string {
  const point = points[index];
  if (point === undefined) return '';
  const length = (metres: number) => formatQuantity(metres, 'length', units, { withUnit: true });
  const pressure = (pa: number, withUnit: boolean) => formatQuantity(pa, 'pressure', units, { withUnit, decimals: 2 });
  const size = sizeOf?.(point.pipeId) ?? '';
  const pipe = `${nameOfPipe(point.pipeId)}${size === '' ? '' : ` ${size}`}`;
  const band = bands?.[index];
  const near = gauges.filter(({ distanceM }) => Math.abs(distanceM - point.distanceM) < 0.005).map(({ tag }) => tag);
  return [
    index === 0 ? `At the trap, into ${pipe}` : `${length(point.distanceM)} along the way, in ${pipe}`,
    `elevation ${length(point.elevationM)}`,
    pressure(point.pressurePa, true),
    ...(band === undefined || band.spreadHighPa - band.spreadLowPa < 1
      ? []
      : [
          `credible ${pressure(band.credibleLowPa, false)} to ${pressure(band.credibleHighPa, false)}`,
          `by every method ${pressure(band.spreadLowPa, false)} to ${pressure(band.spreadHighPa, false)}`,
        ]),
    ...near.map((tag) => `gauge ${tag}`),
  ].join(', ');
}

function tickText(tick: number): string {
  const text = Math.abs(tick).toLocaleString('en', { maximumFractionDigits: 6 });
  return tick < 0 ? `−${text}` : text;
}
