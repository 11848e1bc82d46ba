import type { SavedLibraryModel } from '@riseback/contracts';
import type { FileTrapModel } from '@riseback/network';
import { type DisplayUnits, formatQuantity, type QuantityKind } from '@riseback/units';
import { TRAP_TYPE_WORDS } from '../shared/element-words';

/** What a trap model is made of, in a network or in the library. */
export type ModelContent = Omit<FileTrapModel, 'id'> & Pick<SavedLibraryModel, 'trapType' | 'retired'>;

type RatingKey =
  'orificeDiameterM' | 'maximumDifferentialPa' | 'bodyPressurePa' | 'bodyTemperatureK' | 'maximumBackPressureFraction';

/** The ratings in the order of a maker's sheet. */
export const RATINGS: readonly { readonly key: RatingKey; readonly word: string; readonly kind: QuantityKind }[] = [
  { key: 'orificeDiameterM', word: 'Orifice', kind: 'diameter' },
  { key: 'maximumDifferentialPa', word: 'Largest differential', kind: 'pressureDifference' },
  { key: 'bodyPressurePa', word: 'Body pressure', kind: 'pressure' },
  { key: 'bodyTemperatureK', word: 'Body temperature', kind: 'temperature' },
  { key: 'maximumBackPressureFraction', word: 'Largest back-pressure fraction', kind: 'fraction' },
];

/** The ratings that a model gives, in the person's units. */
export function ratingRows(model: ModelContent, units: DisplayUnits): { word: string; value: string }[] {
  return RATINGS.flatMap(({ key, word, kind }) => {
    const si = model[key];
    return si === undefined ? [] : [{ word, value: formatQuantity(si, kind, units, { withUnit: true }) }];
  });
}

export interface ModelDifference {
  readonly word: string;
  readonly before: string;
  readonly after: string;
}

/** What differs between two versions of a model, in words; capacities point by point. */
export function modelDifferences(before: ModelContent, after: ModelContent, units: DisplayUnits): ModelDifference[] {
  const type = ({ trapType }: ModelContent) => (trapType === undefined ? undefined : TRAP_TYPE_WORDS[trapType]);
  return [
    ...different('Name', before.name, after.name),
    ...different('Trap type', type(before), type(after)),
    ...RATINGS.flatMap(({ key, word, kind }) =>
      before[key] === after[key] ? [] : different(word, ...pair(before[key], after[key], kind, units)),
    ),
    ...capacityDifferences(before, after, units),
    ...different('In the library', before.retired ? 'retired' : 'in use', after.retired ? 'retired' : 'in use'),
  ];
}

function capacityDifferences(before: ModelContent, after: ModelContent, units: DisplayUnits): ModelDifference[] {
  const flows = ({ capacity = [] }: ModelContent) =>
    new Map(capacity.map(({ differentialPa, flowKgS }) => [differentialPa, flowKgS]));
  const [old, now] = [flows(before), flows(after)];
  return [...new Set([...old.keys(), ...now.keys()])]
    .sort((a, b) => a - b)
    .filter((differentialPa) => old.get(differentialPa) !== now.get(differentialPa))
    .map((differentialPa) => {
      const at = formatQuantity(differentialPa, 'pressureDifference', units, { withUnit: true });
      const [was, is] = pair(old.get(differentialPa), now.get(differentialPa), 'massFlow', units);
      return { word: `Capacity at ${at}`, before: was ?? NOT_GIVEN, after: is ?? NOT_GIVEN };
    });
}

const NOT_GIVEN = 'not given';

/** Two values as text, with all their digits where the usual ones would print them alike. */
function pair(
  before: number | undefined,
  after: number | undefined,
  kind: QuantityKind,
  units: DisplayUnits,
): [string | undefined, string | undefined] {
  const text = (si: number | undefined, decimals?: number) =>
    si === undefined
      ? undefined
      : formatQuantity(si, kind, units, { withUnit: true, ...(decimals === undefined ? {} : { decimals }) });
  const usual: [string | undefined, string | undefined] = [text(before), text(after)];
  return usual[0] === usual[1] ? [text(before, 6), text(after, 6)] : usual;
}

function different(word: string, before: string | undefined, after: string | undefined): ModelDifference[] {
  return before === after ? [] : [{ word, before: before ?? NOT_GIVEN, after: after ?? NOT_GIVEN }];
}
