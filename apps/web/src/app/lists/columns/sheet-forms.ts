import { FITTINGS } from '@riseback/hydraulics';
import { FITTING_KINDS, type PipeRun, setOp, type Trap, type TrapModel } from '@riseback/network';
import { displayUnit, type DisplayUnits, formatForEditing, parseQuantity, type QuantityKind } from '@riseback/units';
import type { Proposal, SheetForm } from './column';

/** How cells that have a dialog of their own are written out in one line, exactly, and read again. */

const NONE = 'none';

export const FITTINGS_IN_WORDS: SheetForm<PipeRun> = {
  write: ({ fittings }) =>
    fittings.length === 0
      ? undefined
      : fittings.map(({ kind, count }) => `${String(count)} ${FITTINGS[kind].name}`).join('; '),
  read: (text, { id }, { document }) => {
    const fittings: { kind: string; count: number }[] = [];
    for (const part of partsOf(text)) {
      const [, count = '1', name = ''] = /^(?:(\d+)\s*[x×]?\s+)?(.+)$/i.exec(part) ?? [];
      const kind = FITTING_KINDS.find((each) => isNamed(name, each, FITTINGS[each].name));
      if (kind === undefined)
        return refused(`“${name}” is not a fitting of this list. Write how many and which, as in 2 Gate valve.`);
      fittings.push({ kind, count: Number(count) });
    }
    return { ok: true, ops: [setOp(document, 'pipes', id, 'fittings', fittings)] };
  },
};

export const ROUTE_IN_WORDS: SheetForm<PipeRun> = {
  write: ({ route }, { units }) =>
    route
      ?.map(({ lengthM, riseM }) => `${exact(lengthM, 'length', units)} up ${exact(riseM, 'length', units)}`)
      .join('; '),
  read: (text, { id }, { document, units }) => {
    const pieces = pairs(text, /^(.+?)\s+up\s+(.+)$/i, ['length', 'length'], units);
    if (typeof pieces === 'string') return refused(`${pieces} Write each piece as in 12 ft up 3 ft; pieces part by ;`);
    const route = pieces.map(([lengthM, riseM]) => ({ lengthM, riseM }));
    return { ok: true, ops: [setOp(document, 'pipes', id, 'route', route.length === 0 ? undefined : route)] };
  },
};

export const CAPACITY_IN_WORDS: SheetForm<TrapModel> = {
  write: ({ capacity }, { units }) =>
    capacity
      ?.map(
        ({ differentialPa, flowKgS }) =>
          `${exact(flowKgS, 'massFlow', units)} at ${exact(differentialPa, 'pressureDifference', units)}`,
      )
      .join('; '),
  read: (text, { id }, { document, units }) => {
    const points = pairs(text, /^(.+?)\s+at\s+(.+)$/i, ['massFlow', 'pressureDifference'], units);
    if (typeof points === 'string')
      return refused(`${points} Write each point as in 500 lb/h at 30 psi; points part by ;`);
    const capacity = points
      .map(([flowKgS, differentialPa]) => ({ differentialPa, flowKgS }))
      .sort((a, b) => a.differentialPa - b.differentialPa);
    return {
      ok: true,
      ops: [setOp(document, 'trapModels', id, 'capacity', capacity.length === 0 ? undefined : capacity)],
    };
  },
};

export const SERVICE_IN_WORDS: SheetForm<Trap> = {
  write: ({ service }) => (service.kind === 'constant' ? 'Constant' : 'Modulating'),
  read: (text, { id, service }, { document }) => {
    const kind = text.trim().toLowerCase();
    if (kind === service.kind) return { ok: true, ops: [] };
    switch (kind) {
      case 'constant':
        return { ok: true, ops: [setOp(document, 'nodes', id, 'service', { kind })] };
      case 'modulating':
        // both temperatures come from cells of their own; without them the trap is not whole and the schema says so
        return { ok: true, ops: [setOp(document, 'nodes', id, 'service', { kind, control: 'varyingInlet' })] };
      default:
        return refused('A service is Constant or Modulating.');
    }
  },
};

function refused(reason: string): Proposal {
  return { ok: false, reason };
}

function partsOf(text: string): string[] {
  const parts = text
    .split(';')
    .map((part) => part.trim())
    .filter(Boolean);
  return parts.length === 1 && parts[0]?.toLowerCase() === NONE ? [] : parts;
}

/** Pairs of quantities, or what is wrong with one of them. */
function pairs(
  text: string,
  shape: RegExp,
  kinds: readonly [QuantityKind, QuantityKind],
  units: DisplayUnits,
): [number, number][] | string {
  const found: [number, number][] = [];
  for (const part of partsOf(text)) {
    const [, first, second] = shape.exec(part) ?? [];
    if (first === undefined || second === undefined) return `“${part}” cannot be read.`;
    const [a, b] = [parseQuantity(first, kinds[0], units), parseQuantity(second, kinds[1], units)];
    if (!a.ok) return `“${part}”: ${a.reason}`;
    if (!b.ok) return `“${part}”: ${b.reason}`;
    found.push([a.si, b.si]);
  }
  return found;
}

/** With all its digits, so that it reads back as what is stored. */
function exact(si: number, kind: QuantityKind, units: DisplayUnits): string {
  return `${formatForEditing(si, kind, units)} ${displayUnit(kind, units.system)}`;
}

function isNamed(text: string, ...names: readonly string[]): boolean {
  const wanted = text.trim().toLowerCase();
  return names.some((name) => name.toLowerCase() === wanted);
}
