import {
  inOrder,
  type NetworkDocument,
  type NetworkNode,
  type OperatingCase,
  type Override,
  OVERRIDE_KEYS,
  overrideId,
  type OverrideKey,
  splitOverrideId,
  TRAP_STATES,
} from '@riseback/network';
import { type DisplayUnits, formatQuantity, type QuantityKind } from '@riseback/units';
import { nameOf } from '../shared/element-words';

type TrapState = (typeof TRAP_STATES)[number];

/** What the numbers that a case may set are: their word and quantity. A trap's state is the one that is no number. */
export const CHANGE_FACTS: Readonly<
  Record<Exclude<OverrideKey, 'state'>, { readonly word: string; readonly quantity: QuantityKind }>
> = {
  loadKgS: { word: 'Load', quantity: 'massFlow' },
  inletPressurePa: { word: 'Inlet pressure', quantity: 'pressure' },
  pressurePa: { word: 'Pressure', quantity: 'pressure' },
  flowKgS: { word: 'Flow', quantity: 'massFlow' },
  orificeDiameterM: { word: 'Orifice', quantity: 'diameter' },
};

export const STATE_WORDS: Readonly<Record<TrapState, string>> = {
  normal: 'Normal',
  isolated: 'Isolated',
  failedOpen: 'Failed open',
};
export const STATE_CHOICES = TRAP_STATES.map((value) => ({ value, words: STATE_WORDS[value] }));

export function keyWord(key: OverrideKey): string {
  return key === 'state' ? 'State' : CHANGE_FACTS[key].word;
}

/** One value that a case sets at one element, beside what would hold there without it. */
export interface CaseChange {
  readonly nodeId: string;
  readonly tag: string;
  readonly key: OverrideKey;
  readonly value: number | string;
  readonly otherwise: string;
}

/** All that a case sets for itself, element by element in the order in which it was set. */
export function changesOf(document: NetworkDocument, operatingCase: OperatingCase, units: DisplayUnits): CaseChange[] {
  return overridesOf(document, operatingCase.id).flatMap((override) => {
    const node = document.nodes.get(override.node)?.value;
    if (node === undefined) return [];
    return OVERRIDE_KEYS[node.kind].flatMap((key): CaseChange[] => {
      const value = override[key];
      if (value === undefined) return [];
      return [
        {
          nodeId: node.id,
          tag: nameOf(node),
          key,
          value,
          otherwise: otherwise(document, node, key, operatingCase, units),
        },
      ];
    });
  });
}

/** How many values a case sets for itself. */
export function countChanges(document: NetworkDocument, caseId: string): number {
  return overridesOf(document, caseId).reduce((sum, override) => sum + setKeys(override).length, 0);
}

/** What a case sets at one element, short: "load 500 lb/h", "failed open". */
export function caseChangeWords(
  document: NetworkDocument,
  caseId: string,
  nodeId: string,
  units: DisplayUnits,
): string[] {
  const override = document.overrides.get(overrideId(caseId, nodeId))?.value;
  return override === undefined ? [] : setKeys(override).map((key) => changeWords(override, key, units));
}

/** The keys that a case may still set at an element. */
export function freeKeys(document: NetworkDocument, caseId: string, node: NetworkNode): OverrideKey[] {
  const override = document.overrides.get(overrideId(caseId, node.id))?.value;
  return OVERRIDE_KEYS[node.kind].filter((key) => override?.[key] === undefined);
}

function overridesOf(document: NetworkDocument, caseId: string): Override[] {
  return inOrder(document.overrides)
    .filter(([id]) => splitOverrideId(id).caseId === caseId)
    .map(([, { value }]) => value);
}

function setKeys(override: Override): OverrideKey[] {
  return Object.values(OVERRIDE_KEYS)
    .flat()
    .filter((key, at, keys) => override[key] !== undefined && keys.indexOf(key) === at);
}

function changeWords(override: Override, key: OverrideKey, units: DisplayUnits): string {
  if (key === 'state') return STATE_WORDS[override.state ?? 'normal'].toLowerCase();
  const { word, quantity } = CHANGE_FACTS[key];
  return `${word.toLowerCase()} ${formatQuantity(override[key] ?? 0, quantity, units, { withUnit: true })}`;
}

/** What holds at an element in the case where the case does not set it: as drawn, by the case's factors. */
function otherwise(
  document: NetworkDocument,
  node: NetworkNode,
  key: OverrideKey,
  { loadFactor, inletPressureFactor }: OperatingCase,
  units: DisplayUnits,
): string {
  const print = (si: number, quantity: QuantityKind) => formatQuantity(si, quantity, units, { withUnit: true });
  switch (key) {
    case 'state':
      return STATE_WORDS.normal;
    case 'loadKgS':
      return node.kind === 'trap' ? print(node.loadKgS * loadFactor, 'massFlow') : '';
    case 'inletPressurePa': {
      if (node.kind !== 'trap') return '';
      if (node.service.kind === 'modulating') return 'Follows its load';
      const { atmosphericPressurePa } = document.site;
      const gaugePa = (node.inletPressurePa - atmosphericPressurePa) * inletPressureFactor;
      return print(atmosphericPressurePa + gaugePa, 'pressure');
    }
    case 'orificeDiameterM': {
      const model = node.kind === 'trap' ? document.trapModels.get(node.trapModel ?? '')?.value : undefined;
      return model?.orificeDiameterM === undefined ? 'Not known' : print(model.orificeDiameterM, 'diameter');
    }
    case 'flowKgS':
      return node.kind === 'pumpedInlet' ? print(node.flowKgS, 'massFlow') : '';
    case 'pressurePa':
      if (node.kind === 'receiver')
        return node.pressurePa === undefined ? 'Vented' : print(node.pressurePa, 'pressure');
      return node.kind === 'flashVessel' ? print(node.pressurePa, 'pressure') : '';
  }
}
