import { DISCHARGES, type NetworkDocument, type NetworkNode, type NodeKind, TRAP_TYPES } from '@riseback/network';
import type { QuantityKind } from '@riseback/units';
import { TRAP_TYPE_WORDS } from '../../shared/element-words';
import type { Choice } from '../../shared/fields/choice-field';

interface FieldBase {
  readonly key: string;
  readonly label: string;
  readonly hint?: string;
  readonly optional?: boolean;
}
/** One property of an element as a field. What a key needs more than one control for has an editor of its own. */
export type FieldSpec =
  | (FieldBase & { readonly type: 'quantity'; readonly kind: QuantityKind })
  | (FieldBase & { readonly type: 'text'; readonly long?: boolean })
  | (FieldBase & { readonly type: 'choice'; readonly choices: readonly Choice[]; readonly none?: string })
  | (FieldBase & { readonly type: 'flag' });

const TAG: FieldSpec = { type: 'text', key: 'tag', label: 'Tag', optional: true };
const ELEVATION: FieldSpec = { type: 'quantity', key: 'elevationM', label: 'Elevation', kind: 'length' };
const AREA: FieldSpec = { type: 'text', key: 'area', label: 'Area', optional: true };
const NOTE: FieldSpec = { type: 'text', key: 'note', label: 'Note', optional: true, long: true };

const TRAP_TYPE: FieldSpec = {
  type: 'choice',
  key: 'trapType',
  label: 'Trap type',
  choices: TRAP_TYPES.map((value) => ({ value, words: TRAP_TYPE_WORDS[value] })),
  none: 'Not given',
  optional: true,
};
const INLET: FieldSpec = { type: 'quantity', key: 'inletPressurePa', label: 'Inlet pressure', kind: 'pressure' };
const LOAD: FieldSpec = { type: 'quantity', key: 'loadKgS', label: 'Load', kind: 'massFlow' };
const VESSEL_PRESSURE: FieldSpec = { type: 'quantity', key: 'pressurePa', label: 'Pressure', kind: 'pressure' };
const RECEIVER_PRESSURE: FieldSpec = { ...VESSEL_PRESSURE, optional: true, hint: 'Empty: vented to the atmosphere' };
const FLOW: FieldSpec = { type: 'quantity', key: 'flowKgS', label: 'Flow', kind: 'massFlow' };
const TEMPERATURE: FieldSpec = { type: 'quantity', key: 'temperatureK', label: 'Temperature', kind: 'temperature' };
const PEAK: FieldSpec = { type: 'quantity', key: 'peakFactor', label: 'Peak factor', kind: 'factor' };

/** What is asked when a node is placed: what it cannot be computed without. */
export const ASKED_FIELDS: Readonly<Record<NodeKind, readonly FieldSpec[]>> = {
  trap: [TAG, ELEVATION, INLET, LOAD, TRAP_TYPE],
  junction: [TAG, ELEVATION],
  receiver: [TAG, ELEVATION, RECEIVER_PRESSURE],
  flashVessel: [TAG, ELEVATION, VESSEL_PRESSURE],
  pumpedInlet: [TAG, ELEVATION, FLOW, TEMPERATURE],
};

/** Every property of a node that one control can set; a trap's service has its own editor. */
export function nodeFields(node: NetworkNode, document: NetworkDocument): readonly FieldSpec[] {
  switch (node.kind) {
    case 'trap':
      return [TAG, ELEVATION, INLET, LOAD, ...trapFields(document), AREA, NOTE];
    case 'junction':
      return [TAG, ELEVATION, AREA, NOTE];
    case 'receiver':
      return [TAG, ELEVATION, RECEIVER_PRESSURE, AREA, NOTE];
    case 'flashVessel':
      return [TAG, ELEVATION, VESSEL_PRESSURE, AREA, NOTE];
    case 'pumpedInlet':
      return [
        TAG,
        ELEVATION,
        FLOW,
        TEMPERATURE,
        PEAK,
        {
          type: 'quantity',
          key: 'availablePressurePa',
          label: 'Pressure the pump can give',
          kind: 'pressure',
          optional: true,
        },
        AREA,
        NOTE,
      ];
  }
}

function trapFields(document: NetworkDocument): FieldSpec[] {
  const models = [...document.trapModels.values()].map(({ value }) => ({ value: value.id, words: value.name }));
  return [
    TRAP_TYPE,
    { type: 'choice', key: 'trapModel', label: 'Trap model', choices: models, none: 'None', optional: true },
    { type: 'quantity', key: 'sizingFactor', label: 'Sizing factor', kind: 'factor' },
    {
      type: 'choice',
      key: 'discharge',
      label: 'Discharge',
      choices: DISCHARGES.map((value) => ({ value, words: value === 'intermittent' ? 'Intermittent' : 'Continuous' })),
    },
    PEAK,
    { type: 'quantity', key: 'subcoolingK', label: 'Subcooling', kind: 'temperatureDifference' },
    {
      type: 'quantity',
      key: 'loadTolerance',
      label: 'Load known to',
      kind: 'fraction',
      hint: 'Plus or minus this share',
    },
    {
      type: 'quantity',
      key: 'maximumPressurePa',
      label: 'Safety valve set at',
      kind: 'pressure',
      optional: true,
      hint: 'The most that can stand before the trap',
    },
    { type: 'text', key: 'batch', label: 'Batch', optional: true, hint: 'Traps of one batch discharge together' },
  ];
}

export const PIPE_FIELDS_BEFORE_SIZE: readonly FieldSpec[] = [
  TAG,
  { type: 'quantity', key: 'lengthM', label: 'Length', kind: 'length' },
];
export const PIPE_FIELDS_AFTER_SIZE: readonly FieldSpec[] = [
  { type: 'quantity', key: 'roughnessM', label: 'Roughness', kind: 'roughness' },
  {
    type: 'quantity',
    key: 'lossCoefficient',
    label: 'Further loss coefficient',
    kind: 'factor',
    hint: 'Added to the fittings',
  },
  { type: 'quantity', key: 'heatLossWM', label: 'Heat loss', kind: 'heatLossPerLength' },
  { type: 'flag', key: 'checkValve', label: 'Check valve' },
];
export const PIPE_FIELDS_LAST: readonly FieldSpec[] = [AREA, NOTE];
