import type { NetworkNode, NodeKind, PipeRun } from '@riseback/network';

export { TRAP_TYPE_WORDS } from '@riseback/contracts';

/** What the trade calls each kind, as it stands in a sentence. */
export const KIND_WORDS: Readonly<Record<NodeKind | 'pipe', string>> = {
  trap: 'trap',
  junction: 'junction',
  receiver: 'receiver',
  flashVessel: 'flash vessel',
  pumpedInlet: 'pumped inlet',
  pipe: 'pipe',
};

/** What the plant calls an element: its tag, or its id where it has none. */
export function nameOf(element: { readonly id: string; readonly tag?: string | undefined }): string {
  return element.tag ?? element.id;
}

export function isPipe(element: NetworkNode | PipeRun): element is PipeRun {
  return 'from' in element;
}
