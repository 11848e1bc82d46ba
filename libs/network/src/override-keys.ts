import type { NodeKind, Override } from './network-file';

export type OverrideKey = Exclude<keyof Override, 'node'>;

/** What an operating case may change at a node, by the node's kind. */
export const OVERRIDE_KEYS: Readonly<Record<NodeKind, readonly OverrideKey[]>> = {
  trap: ['loadKgS', 'inletPressurePa', 'orificeDiameterM', 'state'],
  junction: [],
  flashVessel: ['pressurePa'],
  pumpedInlet: ['flowKgS'],
  receiver: ['pressurePa'],
};

/** The keys of an override that its node's kind does not have. */
export function misfitKeys(override: object, kind: NodeKind): string[] {
  const allowed: readonly string[] = OVERRIDE_KEYS[kind];
  return Object.keys(override).filter((key) => key !== 'node' && !allowed.includes(key));
}

/** Why a key of an override is refused, with what would fit. */
export function misfitDetail(key: string, node: string, kind: NodeKind): string {
  const allowed = OVERRIDE_KEYS[kind];
  const remedy = allowed.length === 0 ? 'a case changes nothing there' : `a case may change ${allowed.join(', ')}`;
  return `${key} does not fit node ${node}, a ${KIND_NAMES[kind]}: ${remedy}`;
}

export const KIND_NAMES: Readonly<Record<NodeKind, string>> = {
  trap: 'trap',
  junction: 'junction',
  flashVessel: 'flash vessel',
  pumpedInlet: 'pumped inlet',
  receiver: 'receiver',
};

/** An override's id in the document. */
export function overrideId(caseId: string, nodeId: string): string {
  return `${caseId}/${nodeId}`;
}

/** The two ids in an override's id; ids hold no slash. */
export function splitOverrideId(id: string): { caseId: string; nodeId: string } {
  const slash = id.indexOf('/');
  return { caseId: id.slice(0, Math.max(slash, 0)), nodeId: id.slice(slash + 1) };
}
