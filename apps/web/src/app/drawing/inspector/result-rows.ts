import { FLOW_PATTERN_WORDS } from '@riseback/contracts';
import type { NodeResult, PipeResult, TrapResult } from '@riseback/contracts';
import { type DisplayUnits, formatQuantity, type QuantityKind } from '@riseback/units';
import { bandWords } from '@riseback/figures';

export interface ResultRow {
  readonly name: string;
  readonly value: string;
}

/** What makes up the back pressure of a trap, and between what the methods put it. */
export function trapRows(
  result: TrapResult,
  receiverName: string,
  units: DisplayUnits,
  bandsToCome = false,
): ResultRow[] {
  const row = rowIn(units);
  const bands = bandsToCome ? 'Spread to come' : bandWords(result, units);
  return [
    row(receiverName, result.receiverPressurePa, 'pressure'),
    row('Lift', result.staticPa, 'pressureDifference'),
    row('Friction of the liquid', result.frictionPa, 'pressureDifference'),
    row('Added by flash steam', result.flashPa, 'pressureDifference'),
    row('Back pressure', result.backPressurePa, 'pressure'),
    ...(bands === '' ? [] : [{ name: 'Other methods', value: bands }]),
  ];
}

export function nodeRows(result: NodeResult, units: DisplayUnits): ResultRow[] {
  const row = rowIn(units);
  return [
    row('Pressure', result.pressurePa, 'pressure'),
    row('Temperature', result.temperatureK, 'temperature'),
    row('Flash share', result.quality, 'quality'),
    row('Flow', result.massFlowKgS, 'massFlow'),
  ];
}

export function pipeRows(result: PipeResult, units: DisplayUnits): ResultRow[] {
  const row = rowIn(units);
  const { flowPattern, outletPressurePa } = result;
  return [
    row('Flow', result.massFlowKgS, 'massFlow'),
    row('Pressure at its start', result.upstreamPressurePa, 'pressure'),
    row('Pressure at its end', result.downstreamPressurePa, 'pressure'),
    ...(outletPressurePa === undefined ? [] : [row('Choked: its outlet stands at', outletPressurePa, 'pressure')]),
    row('Flash share at its start', result.upstreamQuality, 'quality'),
    row('Flash share at its end', result.downstreamQuality, 'quality'),
    row('Velocity, as liquid', result.liquidVelocityMS, 'velocity'),
    row('Velocity, with flash steam', result.mixtureVelocityMS, 'velocity'),
    ...(flowPattern === undefined ? [] : [{ name: 'Flow pattern at its end', value: FLOW_PATTERN_WORDS[flowPattern] }]),
  ];
}

/** What the drop along a pipe is made of; the last row is the sum. */
export function dropRows(result: PipeResult, units: DisplayUnits): ResultRow[] {
  const row = rowIn(units);
  return [
    row('Lift', result.staticPa, 'pressureDifference'),
    row('Friction of the liquid', result.frictionPa, 'pressureDifference'),
    row('Added by flash steam', result.flashPa, 'pressureDifference'),
    row('Drop together', result.upstreamPressurePa - result.downstreamPressurePa, 'pressureDifference'),
  ];
}

/** Beside the staff of a trap: what its figures are for, where that is not its plain load. */
export function trapNotes({ basis, liveSteamKgS }: TrapResult, units: DisplayUnits): string[] {
  const steam = liveSteamKgS === undefined ? '' : formatQuantity(liveSteamKgS, 'massFlow', units, { withUnit: true });
  return [
    ...(basis === 'ownPeak' ? ['While it discharges at its own peak, all others at their load.'] : []),
    ...(basis === 'probable'
      ? ['While it discharges at its own peak, with what others upstream probably discharge with it.']
      : []),
    ...(steam === '' ? [] : [`Failed open: it blows ${steam} of live steam into the return on top of its load.`]),
  ];
}

function rowIn(units: DisplayUnits): (name: string, si: number, kind: QuantityKind) => ResultRow {
  return (name, si, kind) => ({ name, value: formatQuantity(si, kind, units, { withUnit: true }) });
}
