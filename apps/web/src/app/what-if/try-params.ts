import type { CollectionName } from '@riseback/network';

/** A wish as it stands in the address of the view: what to change, how, and where to begin. */
export interface TryParams {
  readonly change: string;
  readonly by: string;
  readonly element: string;
}

/** Findings that a wider pipe mends, if anything does. */
const WIDER_PIPE: ReadonlySet<string> = new Set(['velocity', 'momentum', 'gradient', 'slug', 'choked']);
/** Findings at a trap that less back pressure mends: the pipes of its way are where to begin. */
const LESS_BACK_PRESSURE: ReadonlySet<string> = new Set(['differential', 'capacity', 'backPressureFraction', 'stall']);

/**
 * What a finding proposes to try.
 * @returns null where nothing that can be tried would mend it
 */
export function tryParams(finding: {
  readonly code: string;
  readonly element: { readonly in: CollectionName; readonly id: string } | null;
}): TryParams | null {
  const { code, element } = finding;
  if (element?.in === 'pipes' && WIDER_PIPE.has(code)) return { change: 'size', by: 'up', element: element.id };
  if (element?.in === 'nodes' && LESS_BACK_PRESSURE.has(code)) return { change: 'size', by: 'up', element: element.id };
  return null;
}
