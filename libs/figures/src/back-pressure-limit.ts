import type { TrapResult } from '@riseback/contracts';
import type { Trap, TrapModel } from '@riseback/network';
import { trapCapacityKgS } from '@riseback/solver';
import { type DisplayUnits, formatQuantity } from '@riseback/units';

export interface BackPressureLimit {
  readonly pressurePa: number;
  /** What sets it, for a small label: "2 × load", "50 % of inlet". */
  readonly word: string;
}

/**
 * The back pressure above which a check at a trap turns, the least where several bound it. That of `differential` is the inlet itself,
 * which the staff shows as its top, so it is left out.
 * @returns null where no check bounds it, or where no back pressure above the atmosphere would do
 */
export function backPressureLimit(
  result: TrapResult,
  trap: Trap,
  model: TrapModel | undefined,
  units: DisplayUnits,
): BackPressureLimit | null {
  const inletPa = result.backPressurePa + result.differentialPa;
  const limits = [byCapacity(result, trap, model, inletPa, units), byFraction(result, inletPa, units)];
  return limits.reduce(
    (least, limit) => (limit && (!least || limit.pressurePa < least.pressurePa) ? limit : least),
    null,
  );
}

/** Where the model's capacity falls to what is needed: its capacity points read backwards. */
function byCapacity(
  { checks }: TrapResult,
  trap: Trap,
  model: TrapModel | undefined,
  inletPa: number,
  units: DisplayUnits,
): BackPressureLimit | null {
  const neededKgS = checks.find(({ code }) => code === 'capacity')?.limit;
  const points = model?.capacity ?? [];
  const greatest = points.at(-1);
  if (neededKgS === undefined || greatest === undefined) return null;
  const mostPa = inletPa - units.atmosphericPressurePa;
  if (!(trapCapacityKgS(points, mostPa) >= neededKgS)) return null;
  let [tooLittlePa, enoughPa] = [0, Math.min(mostPa, greatest.differentialPa)];
  // capacity rises with the differential; halved until the bracket is a thousandth of a pascal
  while (enoughPa - tooLittlePa > 1e-3) {
    const middle = (tooLittlePa + enoughPa) / 2;
    if (trapCapacityKgS(points, middle) >= neededKgS) enoughPa = middle;
    else tooLittlePa = middle;
  }
  return { pressurePa: inletPa - enoughPa, word: `${formatQuantity(trap.sizingFactor, 'factor', units)} × load` };
}

/** The share of the inlet's gauge pressure that the check compares with. */
function byFraction({ checks }: TrapResult, inletPa: number, units: DisplayUnits): BackPressureLimit | null {
  const share = checks.find(({ code }) => code === 'backPressureFraction')?.limit;
  const inletGaugePa = inletPa - units.atmosphericPressurePa;
  if (share === undefined || inletGaugePa <= 0) return null;
  return {
    pressurePa: units.atmosphericPressurePa + share * inletGaugePa,
    word: `${formatQuantity(share, 'fraction', units, { withUnit: true })} of inlet`,
  };
}
