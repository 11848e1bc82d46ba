import type { Band, TrapResult } from '@riseback/contracts';
import { DEFAULT_LIFT_RULE_PA_M } from '@riseback/network';
import { type DisplayUnits, formatQuantity, roundCumulatively, toDisplay } from '@riseback/units';
import { bandsOf, bandWords } from './bands';

export type StaffPartKind = 'receiver' | 'lift' | 'friction' | 'flash';

/** One filling of the tube. */
export interface StaffPart {
  readonly kind: StaffPartKind;
  readonly name: string;
  /** Printed so that the four add up to the back pressure. */
  readonly shown: string;
  /** What of it is seen in the tube, from and to [Pa]; equal where a credited fall has taken it all back. */
  readonly fromPa: number;
  readonly toPa: number;
}

export interface StaffModel {
  /** The tube's foot: the atmosphere, or lower where something stands under vacuum [Pa]. */
  readonly footPa: number;
  /** The highest thing on the staff [Pa]. */
  readonly topPa: number;
  readonly inletPa: number;
  readonly backPa: number;
  readonly differentialPa: number;
  readonly limitPa: number | undefined;
  /** Lowest and highest by every method; undefined while it is not computed. */
  readonly spread: Band | undefined;
  /** The part of it that suits the flow; undefined likewise. */
  readonly credible: Band | undefined;
  readonly parts: readonly StaffPart[];
  /** The whole staff in one sentence. */
  readonly sentence: string;
}

/** Decimals of the parts, one more than the pressure's own, so that small shares show. */
export const PART_DECIMALS = 2;

export interface StaffNotes {
  readonly receiverName: string;
  readonly limitPa: number | undefined;
  /** The bands are of the solve before. */
  readonly bandsToCome?: boolean;
}

export function staffModel(
  trap: TrapResult,
  inletPa: number,
  units: DisplayUnits,
  { receiverName, limitPa, bandsToCome = false }: StaffNotes,
): StaffModel {
  const backPa = trap.backPressurePa;
  const parts = staffParts(trap, units, receiverName);
  const { spread, credible } = bandsOf(trap);
  const footPa = Math.min(
    units.atmosphericPressurePa,
    trap.receiverPressurePa,
    backPa,
    inletPa,
    spread?.lowPa ?? backPa,
  );
  return {
    footPa,
    topPa: Math.max(inletPa, backPa, limitPa ?? footPa),
    spread,
    credible,
    inletPa,
    backPa,
    differentialPa: inletPa - backPa,
    limitPa,
    parts: visible(parts, trap.receiverPressurePa, footPa),
    sentence: sentence(
      parts,
      { inletPa, backPa, limitPa },
      bandsToCome ? 'Spread to come.' : bandWords(trap, units),
      units,
    ),
  };
}

interface NamedPart {
  readonly kind: StaffPartKind;
  readonly name: string;
  readonly shown: string;
  readonly pa: number;
}

function staffParts(trap: TrapResult, units: DisplayUnits, receiverName: string): NamedPart[] {
  const difference = (pa: number) => toDisplay(pa, 'pressureDifference', units);
  const shown = roundCumulatively(
    [
      toDisplay(trap.receiverPressurePa, 'pressure', units),
      difference(trap.staticPa),
      difference(trap.frictionPa),
      difference(trap.flashPa),
    ],
    PART_DECIMALS,
  );
  return [
    { kind: 'receiver', name: receiverName, shown: shown[0] ?? '', pa: 0 },
    { kind: 'lift', name: liftName(trap, units), shown: shown[1] ?? '', pa: trap.staticPa },
    { kind: 'friction', name: 'Friction', shown: shown[2] ?? '', pa: trap.frictionPa },
    { kind: 'flash', name: 'Flash steam', shown: shown[3] ?? '', pa: trap.flashPa },
  ];
}

/** The hand check counts nothing but the rises, half a psi a foot, so it tells their height. */
function liftName({ staticPa, handCheck }: TrapResult, units: DisplayUnits): string {
  if (staticPa < 0) return 'Fall, credited';
  const riseM = handCheck.staticPa / DEFAULT_LIFT_RULE_PA_M;
  if (riseM < 0.005) return 'Lift';
  const decimals = units.system === 'us' ? 0 : 1;
  return `Lift, ${formatQuantity(riseM, 'length', units, { withUnit: true, decimals })}`;
}

/** What adds, piled up; what is taken back (a credited fall) is taken off the top of what lies below it. */
function visible(parts: readonly NamedPart[], receiverPa: number, footPa: number): StaffPart[] {
  let levelPa = receiverPa;
  const levels = parts.map(({ pa }) => (levelPa += pa));
  return parts.map(({ kind, name, shown }, i) => {
    const before = i === 0 ? footPa : (levels[i - 1] ?? footPa);
    const ceiling = Math.min(...levels.slice(i));
    const fromPa = Math.min(before, ceiling);
    return { kind, name, shown, fromPa, toPa: Math.max(fromPa, Math.min(levels[i] ?? ceiling, ceiling)) };
  });
}

function sentence(
  parts: readonly NamedPart[],
  { inletPa, backPa, limitPa }: Pick<StaffModel, 'inletPa' | 'backPa' | 'limitPa'>,
  bands: string,
  units: DisplayUnits,
): string {
  const pressure = (pa: number) => formatQuantity(pa, 'pressure', units, { withUnit: true });
  const difference = formatQuantity(Math.abs(inletPa - backPa), 'pressureDifference', units, { withUnit: true });
  const across =
    inletPa > backPa ? `${difference} of differential` : `no differential, it is ${difference} above the inlet`;
  const limit = limitPa === undefined ? '' : `; limit ${pressure(limitPa)}${backPa > limitPa ? ', exceeded' : ''}`;
  const made = parts.map(({ name, shown }) => `${name} ${shown}`).join('; ');
  return `Back pressure ${pressure(backPa)} against ${pressure(inletPa)} at the steam inlet, ${across}${limit}. Made of: ${made}.${bands === '' ? '' : ` ${bands}`}`;
}
