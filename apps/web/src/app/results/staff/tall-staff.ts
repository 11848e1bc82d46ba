import type { Band } from '@riseback/contracts';
import { type DisplayUnits, displayUnit, formatQuantity, fromDisplay, toDisplay } from '@riseback/units';
import { bandNumbers, niceTicks, type StaffModel, type StaffPartKind } from '@riseback/figures';
import { spreadLabels } from './spread-labels';

/** The tall staff's own measures, in px at full size. */
export const TALL = {
  width: 332,
  height: 324,
  top: 12,
  bottom: 10,
  tickEnd: 48,
  tubeLeft: 56,
  tubeWidth: 26,
  bandLeft: 88,
  bandWidth: 10,
  labelLeft: 126,
  valueRight: 296,
} as const;
const ROW = 18;
const BIG_ROW = 32;
/** An axis number nearer to the limit's label than this, above or below, would run into it. */
const LIMIT_LABEL_REACH = { above: 16, below: 34 } as const;
/** What fits beside the axis in the limit's small letters. */
const LIMIT_LINE_LETTERS = 8;

export interface TallLabel {
  readonly key: 'inlet' | 'differential' | 'back' | 'spread' | 'credible' | StaffPartKind;
  readonly name: string;
  readonly value: string;
  readonly y: number;
  /** From the tube or the band to the label. */
  readonly leader: string;
}

export interface TallStaff {
  readonly unit: string;
  readonly ticks: readonly { readonly y: number; readonly text: string }[];
  readonly parts: readonly { readonly kind: StaffPartKind; readonly y: number; readonly height: number }[];
  readonly tubeTop: number;
  readonly tubeFoot: number;
  readonly inletY: number;
  readonly backY: number;
  readonly limit: { readonly y: number; readonly text: string; readonly exceeded: boolean } | null;
  /** At the right of the tube: the credible band, with the whole spread as its thin ends. */
  readonly spread: TallStretch | null;
  readonly credible: TallStretch | null;
  readonly labels: readonly TallLabel[];
}

/** A stretch of height, px from the top. */
export interface TallStretch {
  readonly top: number;
  readonly bottom: number;
}

/** Where everything of a tall staff stands. */
export function tallStaff(model: StaffModel, units: DisplayUnits, scaleMaximumPa: number | undefined): TallStaff {
  const shown = (pa: number) => toDisplay(pa, 'pressure', units);
  const pressure = (pa: number) => formatQuantity(pa, 'pressure', units);
  const ticks = niceTicks(
    shown(model.footPa),
    shown(Math.max(model.topPa, scaleMaximumPa ?? model.topPa, bandTopPa(model))),
    5,
  );
  const [low = 0, high = 1] = [ticks[0], ticks.at(-1)];
  const foot = TALL.height - TALL.bottom;
  const yOf = (pa: number) => foot - ((shown(pa) - low) / (high - low)) * (foot - TALL.top);

  const { limitPa } = model;
  const limit =
    limitPa === undefined ? null : { y: yOf(limitPa), text: pressure(limitPa), exceeded: model.backPa > limitPa };
  return {
    unit: displayUnit('pressure', units.system),
    ticks: ticks.map((tick) => {
      const y = yOf(fromDisplay(tick, 'pressure', units));
      const hidden = limit !== null && y > limit.y - LIMIT_LABEL_REACH.above && y < limit.y + LIMIT_LABEL_REACH.below;
      return { y, text: hidden ? '' : formatTick(tick) };
    }),
    parts: model.parts.map(({ kind, fromPa, toPa }) => ({
      kind,
      y: yOf(toPa),
      height: Math.max(0, yOf(fromPa) - yOf(toPa)),
    })),
    tubeTop: yOf(Math.max(model.inletPa, model.backPa)),
    tubeFoot: yOf(model.footPa),
    inletY: yOf(model.inletPa),
    backY: yOf(model.backPa),
    limit,
    spread: stretch(model.spread, yOf),
    credible: stretch(model.credible, yOf),
    labels: labels(model, units, yOf),
  };
}

/** The limit's word as lines that are not cut off at the edge: "50 % of inlet" stands in two. */
export function limitLines(word: string): string[] {
  return word.split(' ').reduce<string[]>((lines, part) => {
    const last = lines.at(-1);
    const joined = last === undefined ? part : `${last} ${part}`;
    if (joined.length <= LIMIT_LINE_LETTERS) return [...lines.slice(0, -1), joined];
    return [...lines, part];
  }, []);
}

function labels(model: StaffModel, units: DisplayUnits, yOf: (pa: number) => number): TallLabel[] {
  const { inletPa, backPa, differentialPa } = model;
  const wanted: (Omit<TallLabel, 'y' | 'leader'> & { readonly pa: number })[] = [
    { key: 'inlet', name: 'Steam inlet', value: formatQuantity(inletPa, 'pressure', units), pa: inletPa },
    {
      key: 'differential',
      name: differentialPa > 0 ? 'Differential' : 'No differential',
      value: formatQuantity(differentialPa, 'pressureDifference', units, { decimals: 1 }),
      pa: (inletPa + backPa) / 2,
    },
    ...bandLabels(model, units),
    { key: 'back', name: 'Back pressure', value: formatQuantity(backPa, 'pressure', units), pa: backPa },
    // from the top of the pile down, so that parts of no height keep the order in which they lie
    ...model.parts.toReversed().map(({ kind, name, shown, fromPa, toPa }) => ({
      key: kind,
      name,
      value: shown,
      pa: (fromPa + toPa) / 2,
    })),
  ];
  const at = (pa: number) => Math.max(0, yOf(pa));
  const wishes = wanted.map(({ key, pa }) => ({ at: at(pa), height: key === 'back' ? BIG_ROW : ROW }));
  const middles = spreadLabels(wishes, 0, TALL.height);
  return wanted.map(({ key, name, value, pa }, i) => {
    const y = middles[i] ?? 0;
    const onBand = key === 'spread' || key === 'credible';
    return { key, name, value, y, leader: leader(at(pa), y, onBand ? BAND_RIGHT : TUBE_RIGHT) };
  });
}

/** Named at their upper ends, which are what may turn a verdict. */
function bandLabels(
  { spread, credible }: StaffModel,
  units: DisplayUnits,
): (Omit<TallLabel, 'y' | 'leader'> & { pa: number })[] {
  return [
    ...(spread === undefined
      ? []
      : [{ key: 'spread' as const, name: 'Spread', value: bandNumbers(spread, units), pa: spread.highPa }]),
    ...(credible === undefined
      ? []
      : [{ key: 'credible' as const, name: 'Credible', value: bandNumbers(credible, units), pa: credible.highPa }]),
  ];
}

/** A spread far above the inlet would flatten what is of interest; it may take a third more than the rest, then runs off the top. */
function bandTopPa({ footPa, topPa, spread, credible }: StaffModel): number {
  const most = Math.max(credible?.highPa ?? topPa, Math.min(spread?.highPa ?? topPa, topPa + (topPa - footPa) / 3));
  return Math.max(topPa, most);
}

function stretch(band: Band | undefined, yOf: (pa: number) => number): TallStretch | null {
  return band === undefined ? null : { top: Math.max(0, yOf(band.highPa)), bottom: yOf(band.lowPa) };
}

const TUBE_RIGHT = TALL.tubeLeft + TALL.tubeWidth;
const BAND_RIGHT = TALL.bandLeft + TALL.bandWidth;

/** Level out of the tube or the band, slanting to the label's height, level to the label. */
function leader(from: number, to: number, start: number): string {
  const end = TALL.labelLeft - 4;
  return `M${start} ${from.toFixed(1)}H${start + 8}L${end - 8} ${to.toFixed(1)}H${end}`;
}

function formatTick(tick: number): string {
  return (tick < 0 ? '−' : '') + String(Math.abs(tick));
}
