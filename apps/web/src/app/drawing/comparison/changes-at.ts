import type { DrawnNetwork } from '@riseback/figures';
import { splitOverrideId } from '@riseback/network';
import { hasMoved, type NetworkComparison, type ResultEffects, type TrapComparison } from '@riseback/revisions';
import type { DisplayUnits } from '@riseback/units';
import { formatQuantity } from '@riseback/units';
import { propertyWord } from '../../networks/property-words';
import { changeWords } from '../../results/pressure-change';
import { nameOf } from '../../shared/element-words';

/** What is otherwise at one element than in the revision it is compared with. */
export interface ElementChangeAt {
  /** Null where the element is as it was and only its pressure moved. */
  readonly kind: 'added' | 'changed' | null;
  /** What of it was changed, in a word or two. */
  readonly words: string;
  /** Of a trap: how far its back pressure moved, with its sign; '' where it did not. */
  readonly change: string;
  readonly way: 'up' | 'down' | null;
  readonly spoken: string;
}

/** An element that is not there any more. */
export interface GoneElement {
  readonly id: string;
  readonly name: string;
  readonly kind: 'node' | 'pipe';
}

/** Stands for all keys that only place a symbol. */
const MOVED = 'position';

/** By element of what is drawn. A value that a case sets counts to its element. */
export function changesAt(
  { elements }: NetworkComparison,
  effects: ResultEffects | null,
  units: DisplayUnits,
): ReadonlyMap<string, ElementChangeAt> {
  const kinds = new Map<string, { kind: 'added' | 'changed'; keys: Set<string> }>();
  for (const { in: list, id, kind, keys } of elements) {
    if (kind === 'removed' && list !== 'overrides') continue;
    const elementId = list === 'overrides' ? splitOverrideId(id).nodeId : id;
    if (list !== 'nodes' && list !== 'pipes' && list !== 'overrides') continue;
    const known = kinds.get(elementId) ?? {
      kind: kind === 'added' && list !== 'overrides' ? 'added' : 'changed',
      keys: new Set(),
    };
    for (const { key, drawingOnly } of keys) known.keys.add(drawingOnly ? MOVED : key);
    kinds.set(elementId, known);
  }
  const traps = new Map(effects?.traps.map((trap) => [trap.id, trap]));
  const moved = [...traps.values()].filter(hasMoved).map(({ id }) => id);
  return new Map(
    [...new Set([...kinds.keys(), ...moved])].map((id) => {
      const { kind = null, keys = new Set<string>() } = kinds.get(id) ?? {};
      return [id, changeAt(kind, [...keys], traps.get(id), units)];
    }),
  );
}

export function goneElements(comparison: NetworkComparison | null, earlier: DrawnNetwork): GoneElement[] {
  return (comparison?.elements ?? []).flatMap(({ in: list, id, kind }): GoneElement[] => {
    if (kind !== 'removed') return [];
    if (list === 'nodes') return [{ id, name: nameOf(earlier.nodes.get(id)?.node ?? { id }), kind: 'node' }];
    return list === 'pipes' ? [{ id, name: nameOf(earlier.pipes.get(id)?.pipe ?? { id }), kind: 'pipe' }] : [];
  });
}

function changeAt(
  kind: ElementChangeAt['kind'],
  keys: readonly string[],
  trap: TrapComparison | undefined,
  units: DisplayUnits,
): ElementChangeAt {
  const pa = trap !== undefined && hasMoved(trap) ? trap.changePa : undefined;
  const change = changeWords(pa, units, 1);
  const inputs = keys.filter((key) => key !== MOVED).map((key) => propertyWord(key).toLowerCase());
  const what = keys.includes(MOVED) ? [...inputs, 'moved'] : inputs;
  const words = kind === 'added' ? 'added' : (what[0] ?? '') + (what.length > 1 ? ` +${String(what.length - 1)}` : '');
  return {
    kind,
    words,
    change: change === '–' ? '' : change,
    way: pa === undefined || change === '–' ? null : pa > 0 ? 'up' : 'down',
    spoken: spoken(kind, what, pa, trap, units),
  };
}

function spoken(
  kind: ElementChangeAt['kind'],
  what: readonly string[],
  pa: number | undefined,
  trap: TrapComparison | undefined,
  units: DisplayUnits,
): string {
  const [from, to] = [trap?.before?.verdict, trap?.after?.verdict];
  return [
    ...(kind === 'added' ? ['added'] : []),
    ...(kind === 'changed' ? [`changed: ${what.join(', ')}`] : []),
    ...(pa === undefined
      ? []
      : [
          `back pressure ${pa > 0 ? 'up' : 'down'} by ${formatQuantity(Math.abs(pa), 'pressureDifference', units, { withUnit: true })}`,
        ]),
    ...(from && to && from !== to ? [`${from} before`] : []),
  ].join(', ');
}
