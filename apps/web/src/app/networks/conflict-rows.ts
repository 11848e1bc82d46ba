import { jsonEqual, type NetworkDocument } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { type Conflict, placeKey, type Side, sideOf } from './conflicts';
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
      key: placeKey(place),
      conflict,
      what: place.key === undefined ? name : `${name}, ${propertyWord(place.key).toLowerCase()}`,
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
  if (place.key !== undefined) return valueWords(place.key, side.value, units);
  const sides = [before, theirs, mine].flatMap((one) => (one.there ? [entriesOf(one.value)] : []));
  const keys = new Set(sides.flatMap((one) => [...one.keys()]));
  const differing = [...keys].filter((key) => sides.some((one) => !jsonEqual(one.get(key), sides[0]?.get(key))));
  if (differing.length === 0) return side === before ? 'There' : side === mine && !before.there ? 'Added' : 'Kept';
  const own = entriesOf(side.value);
  return differing.map((key) => `${propertyWord(key)}: ${valueWords(key, own.get(key), units)}`).join('; ');
}

function entriesOf(value: unknown): ReadonlyMap<string, unknown> {
  return new Map<string, unknown>(Object.entries(value ?? {}));
}
