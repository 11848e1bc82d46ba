import type { SolveResult, TrapResult } from '@riseback/contracts';
import { inOrder, type NetworkDocument, type NetworkNode, type Trap } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import type { Status } from '../../shared/status-mark/status-mark';
import { type BackPressureLimit, backPressureLimit, endWords } from '@riseback/figures';
import { trapVerdicts } from '../verdict';
import { nameOf } from '../../shared/element-words';

export interface TrapItem {
  readonly id: string;
  readonly tag: string;
  readonly trap: Trap;
  readonly result: TrapResult;
  readonly inletPa: number;
  readonly status: Status;
  readonly backPressure: string;
  readonly limit: BackPressureLimit | null;
  readonly end: NetworkNode | undefined;
}

/** The traps that drain to one vessel or receiver, worst first. */
export interface TrapGroup {
  readonly endId: string;
  readonly title: string;
  readonly traps: readonly TrapItem[];
}

export interface GroupedTraps {
  readonly groups: readonly TrapGroup[];
  /** The trap with most against it in the whole network. */
  readonly governing: TrapItem | null;
  /** Traps without a result in this case. */
  readonly unsolved: readonly Trap[];
  /** One scale for all flat staffs [Pa]. */
  readonly scaleMaximumPa: number;
}

const BADNESS: Readonly<Record<Status, number>> = { fail: 0, watch: 1, pass: 2, none: 3 };

export function groupTraps(document: NetworkDocument, result: SolveResult, units: DisplayUnits): GroupedTraps {
  const results = new Map(result.traps.map((trap) => [trap.id, trap]));
  const verdicts = trapVerdicts(result);
  const traps = inOrder(document.nodes).flatMap(([, { value }]) => (value.kind === 'trap' ? [value] : []));
  const items = traps
    .flatMap((trap) => {
      const found = results.get(trap.id);
      return found === undefined ? [] : [trapItem(document, trap, found, verdicts.get(trap.id) ?? 'none', units)];
    })
    .sort(byBadness);
  const byEnd = new Map<string, TrapItem[]>();
  for (const item of items) {
    const endId = item.end?.id ?? '';
    byEnd.set(endId, [...(byEnd.get(endId) ?? []), item]);
  }
  return {
    // the file's order of the vessels keeps the groups in place from one solve to the next
    groups: [...inOrder(document.nodes).map(([id]) => id), ''].flatMap((endId) => {
      const group = byEnd.get(endId);
      const end = group?.[0]?.end;
      return group === undefined ? [] : [{ endId, title: titleOf(end, group[0]?.result, units), traps: group }];
    }),
    governing: items[0] ?? null,
    unsolved: traps.filter(({ id }) => !results.has(id)),
    scaleMaximumPa: items.reduce(
      (most, { inletPa, result: { backPressurePa } }) => Math.max(most, inletPa, backPressurePa),
      units.atmosphericPressurePa,
    ),
  };
}

/**
 * The trap that an element leads to: itself, else the first, hence worst, whose way goes through it.
 * @returns null where no trap's way does
 */
export function trapOfElement(document: NetworkDocument, grouped: GroupedTraps, elementId: string): TrapItem | null {
  const items = grouped.groups.flatMap(({ traps }) => traps).sort(byBadness);
  return (
    items.find(({ id }) => id === elementId) ??
    items.find(({ end, result: { walk } }) => {
      if (end?.id === elementId || walk.includes(elementId)) return true;
      return walk.some((pipeId) => {
        const pipe = document.pipes.get(pipeId)?.value;
        return pipe?.from === elementId || pipe?.to === elementId;
      });
    }) ??
    null
  );
}

function trapItem(
  document: NetworkDocument,
  trap: Trap,
  result: TrapResult,
  status: Status,
  units: DisplayUnits,
): TrapItem {
  const model = trap.trapModel === undefined ? undefined : document.trapModels.get(trap.trapModel)?.value;
  return {
    id: trap.id,
    tag: nameOf(trap),
    trap,
    result,
    // as it stands in this case: factors, overrides and modulation included
    inletPa: result.backPressurePa + result.differentialPa,
    status,
    backPressure: formatQuantity(result.backPressurePa, 'pressure', units),
    limit: backPressureLimit(result, trap, model, units),
    end: endOfWalk(document, result),
  };
}

function endOfWalk(document: NetworkDocument, { id, walk }: TrapResult): NetworkNode | undefined {
  let at = id;
  for (const pipeId of walk) {
    const pipe = document.pipes.get(pipeId)?.value;
    if (pipe !== undefined) at = pipe.from === at ? pipe.to : pipe.from;
  }
  return at === id ? undefined : document.nodes.get(at)?.value;
}

/** Failing before watched before passing; among equals, by the share of the inlet's pressure that is left to drive it. */
function byBadness(a: TrapItem, b: TrapItem): number {
  return BADNESS[a.status] - BADNESS[b.status] || driving(a) - driving(b) || TAGS.compare(a.tag, b.tag);
}

const TAGS = new Intl.Collator('en', { numeric: true });

function driving({ result, inletPa }: TrapItem): number {
  return result.differentialPa / inletPa;
}

function titleOf(end: NetworkNode | undefined, result: TrapResult | undefined, units: DisplayUnits): string {
  const words = `To ${endWords(end)}`;
  if (end?.kind === 'receiver' && end.vented === true) return `${words}, vented`;
  if (result === undefined) return words;
  return `${words}, ${formatQuantity(result.receiverPressurePa, 'pressure', units, { withUnit: true })}`;
}
