import type { NetworkNode, PipeRun, TrapType } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { nameOf, TRAP_TYPE_WORDS } from './element-words';

export function trapTypeWords(type: TrapType | undefined): string {
  return type === undefined ? 'Trap of no given type' : TRAP_TYPE_WORDS[type];
}

/** "flash vessel FV-1", "receiver VR-1". */
export function endWords(end: NetworkNode | undefined): string {
  if (end === undefined) return 'the receiver';
  return `${end.kind === 'flashVessel' ? 'flash vessel' : 'receiver'} ${nameOf(end)}`;
}

const FRACTIONS: Readonly<Record<string, string>> = { '1/2': '½', '3/4': '¾', '1/4': '¼' };

/** A nominal size as it is written on drawings, 1½″ schedule 80; the bore in the person's unit where there is no size. */
export function boreWords({ size, insideDiameterM }: PipeRun, units: DisplayUnits): string {
  if (size !== undefined) {
    const [whole = '', part] = size.nps.split('-');
    const shown = part === undefined ? (FRACTIONS[whole] ?? whole) : `${whole}${FRACTIONS[part] ?? `-${part}`}`;
    return `${shown}″`;
  }
  return insideDiameterM === undefined ? '–' : formatQuantity(insideDiameterM, 'diameter', units, { withUnit: true });
}
