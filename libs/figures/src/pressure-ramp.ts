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
const MANTISSAS = [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8] as const;
/** A network at nearly one pressure is not spread over seven colours: finer steps would paint the noise. */
const LEAST_STEP = 0.1;

/**
 * Seven classes of even, round width that just hold the pressures. Given the pressures of all cases of a network, a colour means the
 * same in each of them.
 * @param pressuresPa absolute, Pa; those that are no number are passed over
 */
export function pressureRamp(pressuresPa: Iterable<number>, units: DisplayUnits): PressureRamp {
  let [low, high] = [Infinity, -Infinity];
  for (const pressurePa of pressuresPa) {
    if (!Number.isFinite(pressurePa)) continue;
    const shown = toDisplay(pressurePa, 'pressure', units);
    low = Math.min(low, shown);
    high = Math.max(high, shown);
  }
  if (low === Infinity) [low, high] = [0, 0];
  const limits = roundLimits(low, high);
  const [first = 0, second = 1] = limits;
  const step = second - first;
  return {
    limits,
    unit: displayUnit('pressure', units.system),
    classOf: (pressurePa) => {
      const index = Math.floor((toDisplay(pressurePa, 'pressure', units) - first) / step + 1e-9);
      return PRESSURE_CLASSES[Math.min(COUNT - 1, Math.max(0, index))] ?? 1;
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

function roundLimits(low: number, high: number): number[] {
  for (let exponent = Math.floor(Math.log10(Math.max((high - low) / COUNT, LEAST_STEP))); ; exponent += 1) {
    for (const mantissa of MANTISSAS) {
      const step = mantissa * 10 ** exponent;
      if (step < LEAST_STEP * 0.999) continue;
      const start = Math.floor(low / step + 1e-9);
      if ((start + COUNT) * step >= high - 1e-9 * step) {
        // counted in whole steps, so that a limit prints as 0.3 and not as 0.30000000000000004
        return Array.from({ length: COUNT + 1 }, (_, i) => Number(((start + i) * step).toPrecision(12)));
      }
    }
  }
}
