import { jsonEqual, type NetworkDocument } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { type Conflict, conflictKey } from './conflicts';
import { limitOf } from './limit-rows';
import { type Place, type Side, sideOf } from './place';
import { propertyWord, valueWords } from './property-words';

/** A conflict as the person sees it. */
export interface ConflictRow {
  readonly key: string;
  readonly conflict: Conflict;
  /** The element and the property, "TR-101, load". */
  readonly what: string;
  readonly who: string;
  readonly before: string;
  readonly theirs: string;
  readonly mine: string;
}

export function conflictRows(
  conflicts: readonly Conflict[],
  present: NetworkDocument,
  units: DisplayUnits,
): ConflictRow[] {
  return conflicts.map((conflict) => {
    const { place, name, who, before, mine } = conflict;
    const theirs = sideOf(present, place);
    const words = (side: Side) => sideWords(side, conflict, theirs, units);
    return {
      key: conflictKey(conflict),
      conflict,
      what: [name, ...placeWords(place)].join(', '),
      who,
      before: words(before),
      theirs: words(theirs),
      mine: words(mine),
    };
  });
}

/** A property's value; of an element as a whole, what of it is not as it was. */
function sideWords(side: Side, { place, before, mine }: Conflict, theirs: Side, units: DisplayUnits): string {
  if (!side.there) return side === before ? 'Not there' : 'Removed';
  if (place.key !== undefined) return valueAt(place, side.value, units);
  const sides = [before, theirs, mine].flatMap((one) => (one.there ? [entriesOf(one.value)] : []));
  const keys = new Set(sides.flatMap((one) => [...one.keys()]));
  const differing = [...keys].filter((key) => sides.some((one) => !jsonEqual(one.get(key), sides[0]?.get(key))));
  if (differing.length === 0) return side === before ? 'There' : side === mine && !before.there ? 'Added' : 'Kept';
  const own = entriesOf(side.value);
  return differing.map((key) => `${propertyWord(key)}: ${valueWords(key, own.get(key), units)}`).join('; ');
}

/** "load"; of a part of the settings "limits, velocity, liquid: watch above". */
function placeWords(place: Place): string[] {
  if (place.key === undefined) return [];
  const limit = limitAt(place);
  const parts = limit === undefined ? (place.path ?? []).map(propertyWord) : [limit.check, limit.label];
  return [propertyWord(place.key), ...parts].map((word) => word.toLowerCase());
}

function valueAt(place: Place, value: unknown, units: DisplayUnits): string {
  const limit = limitAt(place);
  return limit !== undefined && typeof value === 'number'
    ? formatQuantity(value, limit.kind, units, { withUnit: true })
    : valueWords(place.path?.at(-1) ?? place.key ?? '', value, units);
}

function limitAt({ key, path: [code = '', name = ''] = [] }: Place) {
  return key === 'limits' ? limitOf(code, name) : undefined;
}

function entriesOf(value: unknown): ReadonlyMap<string, unknown> {
  return new Map<string, unknown>(Object.entries(value ?? {}));
}
