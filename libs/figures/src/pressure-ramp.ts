import type { CaseOutcome } from '@riseback/contracts';
import { type DisplayUnits, displayUnit, toDisplay } from '@riseback/units';

/** Classes of the pressure colours, low to high; class n is painted with `--rb-p{n}`. */
export const PRESSURE_CLASSES = [1, 2, 3, 4, 5, 6, 7] as const;
export type PressureClass = (typeof PRESSURE_CLASSES)[number];

/** From this class up the wash is so strong that a line on it is drawn in the colour of the paper. */
export const PAPER_CORE_FROM: PressureClass = 5;

export interface PressureRamp {
  /** Eight limits of the seven classes, in the display unit (gauge). */
  readonly limits: readonly number[];
  readonly unit: string;
  readonly classOf: (pressurePa: number) => PressureClass;
}

const COUNT = PRESSURE_CLASSES.length;
/** Steps that read well on a legend. */
const MANTISSAS = [1, 2, 5, 10] as const;
/** A network at nearly one pressure is not spread over seven colours: finer steps would paint the noise. */
const LEAST_STEP = 0.1;
/** The grid that limits stand on, as a part of what the network spans. */
const GRID_PARTS = 30;

/**
 * Seven classes between round limits that just hold the pressures. Their width follows the network: narrow where many pressures lie close
 * together, wide where there are few, so that a hall at one level does not take a single colour with everything around it. Half of each
 * class is its share of the span, half its share of the pressures: none is wider than two sevenths of the span, and none is a sliver.
 * Given the pressures of all cases of a network, a colour means the same in each of them.
 * @param pressuresPa absolute, Pa; those that are no number are passed over
 */
export function pressureRamp(pressuresPa: Iterable<number>, units: DisplayUnits): PressureRamp {
  const shown = [...pressuresPa].filter(Number.isFinite).map((pressurePa) => toDisplay(pressurePa, 'pressure', units));
  const limits = limitsFor(shown.sort((a, b) => a - b));
  return {
    limits,
    unit: displayUnit('pressure', units.system),
    classOf: (pressurePa) => {
      const value = toDisplay(pressurePa, 'pressure', units);
      const above = limits.slice(1, COUNT).filter((limit) => value >= limit - 1e-9).length;
      return PRESSURE_CLASSES[above] ?? 1;
    },
  };
}

/** Every pressure in the solved cases of a network: what its ramp is made from. */
export function pressuresOf(outcomes: Iterable<CaseOutcome>): number[] {
  const pressuresPa: number[] = [];
  for (const outcome of outcomes) {
    if (outcome.status !== 'solved') continue;
    for (const { pressurePa } of outcome.result.nodes) pressuresPa.push(pressurePa);
    // a vessel's leaving pipe may need more at its start than the vessel holds
    for (const { upstreamPressurePa } of outcome.result.pipes) pressuresPa.push(upstreamPressurePa);
  }
  return pressuresPa;
}

function limitsFor(sorted: readonly number[]): number[] {
  const [low = 0, high = low] = [sorted[0], sorted.at(-1)];
  const span = high - low;
  if (span < COUNT * LEAST_STEP) return evenLimits(low, high);
  const grid = Math.max(LEAST_STEP, roundStep(span / GRID_PARTS));
  const first = Math.floor(low / grid + 1e-9);
  const last = Math.max(first + COUNT, Math.ceil(high / grid - 1e-9));
  const steps = [first];
  for (let k = 1; k < COUNT; k += 1) {
    const wanted = Math.round(parted(sorted, k / COUNT) / grid);
    const least = (steps[k - 1] ?? first) + 1;
    steps.push(Math.min(last - (COUNT - k), Math.max(least, wanted)));
  }
  return [...steps, last].map((step) => onGrid(step, grid));
}

/** Where half the share of the span and half the share of the pressures below come to a share together. */
function parted(sorted: readonly number[], share: number): number {
  const [low = 0, high = 0] = [sorted[0], sorted.at(-1)];
  const below = (i: number) => ((sorted[i] ?? high) - low) / (high - low) / 2 + i / (sorted.length - 1) / 2;
  const i = Math.max(
    1,
    sorted.findIndex((_, at) => below(at) >= share),
  );
  const [from, to] = [sorted[i - 1] ?? low, sorted[i] ?? high];
  const rise = below(i) - below(i - 1);
  return from + ((share - below(i - 1)) / rise) * (to - from);
}

function evenLimits(low: number, high: number): number[] {
  const start = Math.floor(low / LEAST_STEP + 1e-9);
  const step = start + COUNT >= high / LEAST_STEP - 1e-9 ? 1 : 2;
  return Array.from({ length: COUNT + 1 }, (_, i) => onGrid(start + i * step, LEAST_STEP));
}

/** The next round step at or above one. */
function roundStep(width: number): number {
  const power = 10 ** Math.floor(Math.log10(width));
  return power * (MANTISSAS.find((mantissa) => mantissa * power >= width * 0.999) ?? 10);
}

/** Counted in whole steps, so that a limit prints as 0.3 and not as 0.30000000000000004. */
function onGrid(step: number, grid: number): number {
  return Number((step * grid).toPrecision(12));
}
