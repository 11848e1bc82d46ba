import type { CaseOutcome, SolveResult } from '@riseback/contracts';
import { type DisplayUnits, fromDisplay, type QuantityKind, toDisplay } from '@riseback/units';
import { pressureRamp, pressuresOf } from './pressure-ramp';

export const COLOURED_BY = ['pressure', 'flash', 'velocity'] as const;
/** What the washes show. */
export type ColouredBy = (typeof COLOURED_BY)[number];

export const CLASS_COUNT = 7;
/** Class 1 is the lowest. From class 5 the wash is too strong for an ink core. */
export type ColourClass = 1 | 2 | 3 | 4 | 5 | 6 | 7;

/** Seven classes between eight rising limits. The ends are open: what lies beyond still takes the outer class. */
export interface ColourScale {
  readonly by: ColouredBy;
  readonly kind: QuantityKind;
  /** SI. */
  readonly limits: readonly number[];
  /** Decimals that tell the limits apart in the person's unit. */
  readonly decimals: number;
}

export const COLOUR_KINDS: Readonly<Record<ColouredBy, QuantityKind>> = {
  pressure: 'pressure',
  flash: 'fraction',
  velocity: 'velocity',
};

/** Seven classes between round limits for a network, the same in all its cases. Pressures take the limits that every other view takes. */
export function colourScale(by: ColouredBy, outcomes: readonly CaseOutcome[], units: DisplayUnits): ColourScale {
  const kind = COLOUR_KINDS[by];
  const limits =
    by === 'pressure' ? pressureRamp(pressuresOf(outcomes), units).limits : limitsFromZero(by, outcomes, units);
  const decimals = Math.max(...limits.map(decimalsOf));
  return { by, kind, limits: limits.map((limit) => fromDisplay(limit, kind, units)), decimals };
}

export function classOf(value: number, { limits }: ColourScale): ColourClass {
  let found = 1;
  for (let i = 1; i < CLASS_COUNT; i++) if (value >= (limits[i] ?? Infinity)) found = i + 1;
  return found as ColourClass;
}

/** A stretch of a pipe in one class, by shares of its length. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  readonly level: ColourClass;
}

/** Cuts a pipe where the value passes from one class to the next, taking it as even between its ends: a riser changes along its height. */
export function stretches(start: number, end: number, scale: ColourScale): Stretch[] {
  const crossings = scale.limits
    .slice(1, CLASS_COUNT)
    .filter((limit) => (limit - start) * (limit - end) < 0)
    .map((limit) => (limit - start) / (end - start))
    .sort((a, b) => a - b);
  const cuts = [0, ...crossings, 1];
  return cuts.slice(1).map((to, i) => {
    const from = cuts[i] ?? 0;
    return { from, to, level: classOf(start + ((end - start) * (from + to)) / 2, scale) };
  });
}

function limitsFromZero(
  by: Exclude<ColouredBy, 'pressure'>,
  outcomes: readonly CaseOutcome[],
  units: DisplayUnits,
): number[] {
  let most = 0;
  for (const outcome of outcomes) if (outcome.status === 'solved') most = Math.max(most, mostOf(by, outcome.result));
  const step = roundStep(toDisplay(most, COLOUR_KINDS[by], units) / CLASS_COUNT);
  return Array.from({ length: CLASS_COUNT + 1 }, (_, i) => Number((i * step).toPrecision(12)));
}

function mostOf(by: Exclude<ColouredBy, 'pressure'>, { pipes }: SolveResult): number {
  return pipes.reduce(
    (most, pipe) =>
      Math.max(most, by === 'flash' ? Math.max(pipe.upstreamQuality, pipe.downstreamQuality) : pipe.mixtureVelocityMS),
    0,
  );
}

/** The next round width at or above one. */
function roundStep(width: number): number {
  if (!(width > 0)) return 1;
  const power = 10 ** Math.floor(Math.log10(width));
  const factor = [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10].find((candidate) => candidate * power >= width * 0.999) ?? 10;
  return factor * power;
}

/** Enough to print a limit as it is: 2.5 needs one decimal, 10 none. */
function decimalsOf(limit: number): number {
  return [0, 1, 2, 3].find((decimals) => Math.abs(Number(limit.toFixed(decimals)) - limit) < 1e-9) ?? 4;
}
