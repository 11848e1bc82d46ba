import {
  COINCIDENCE_WORDS,
  CONTROL_WORDS,
  DISCHARGE_WORDS,
  FRICTION_WORDS,
  STATIC_LIFT_WORDS,
  TRAP_TYPE_WORDS,
  VOID_FRACTION_WORDS,
} from '@riseback/contracts';
import { FITTINGS } from '@riseback/hydraulics';
import type { NetworkFile, PipeRun, Trap } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { STATE_WORDS } from '../../cases/case-changes';
import { limitOf } from '../../networks/limit-rows';
import { propertyWord, valueWords } from '../../networks/property-words';
import { nameOf } from '../../shared/element-words';
import { sizeWords } from '../../what-if/trial-subjects';

/** What ids of other elements are called, in the file that names them. */
export type Names = (id: string) => string;

export function namesIn({ nodes, pipes, trapModels }: NetworkFile): Names {
  const names = new Map([...nodes, ...pipes].map((element) => [element.id, nameOf(element)]));
  for (const { id, name } of trapModels) names.set(id, name);
  return (id) => names.get(id) ?? id;
}

/** How values of one of two files are told: by the tags it gives, and gauge pressures above its own atmosphere. */
export interface Telling {
  readonly names: Names;
  readonly units: DisplayUnits;
}

/** What is shown for a value that is not there, as a grey dash. */
export const ABSENT = '–';

const CODES: ReadonlyMap<string, Readonly<Record<string, string>>> = new Map(
  Object.entries({
    trapType: TRAP_TYPE_WORDS,
    discharge: DISCHARGE_WORDS,
    state: STATE_WORDS,
    friction: FRICTION_WORDS,
    staticLift: STATIC_LIFT_WORDS,
    voidFraction: VOID_FRACTION_WORDS,
    coincidence: COINCIDENCE_WORDS,
  }),
);
const REFERENCES = new Set(['from', 'to', 'node', 'pipe', 'trapModel']);

/** A value of an element's key in words, numbers in the person's units, other elements by their tags. */
export function keyWords(key: string, value: unknown, { names, units }: Telling): string {
  if (value === undefined || (Array.isArray(value) && value.length === 0)) return ABSENT;
  if (typeof value === 'string') return REFERENCES.has(key) ? names(value) : (CODES.get(key)?.[value] ?? value);
  switch (key) {
    case 'position':
    case 'bends':
      return 'moved';
    case 'vented':
      return 'Vented';
    case 'service':
      return serviceWords(value as Trap['service'], units);
    case 'fittings':
      return (value as PipeRun['fittings'])
        .map(({ kind, count }) => `${String(count)} ${FITTINGS[kind].name}`)
        .join('; ');
    case 'route':
      return routeWords(value as NonNullable<PipeRun['route']>, units);
    case 'size':
      return sizeWords({ size: value } as PipeRun, units);
    default:
      return valueWords(key, value, units);
  }
}

/** Where a setting stands and what it is: "Method", "Friction". */
export function settingTitle(path: readonly string[]): { what: string; quantity: string } {
  const [group = '', key = '', name = ''] = path;
  if (group === 'name') return { what: 'Network', quantity: 'Name' };
  if (group === 'site') return { what: 'Site conditions', quantity: propertyWord(key) };
  if (group === 'method') return { what: 'Method', quantity: propertyWord(key) };
  const limit = limitOf(key, name);
  return { what: `Limit: ${limit?.check ?? key}`, quantity: limit?.label ?? name };
}

/** A setting's value; a limit that the network does not set itself is the default, and says so. */
export function settingWords(path: readonly string[], value: unknown, units: DisplayUnits): string {
  const [group = '', key = '', name = ''] = path;
  const print = (si: number, kind: Parameters<typeof formatQuantity>[1]) =>
    formatQuantity(si, kind, units, { withUnit: true });
  if (group === 'limits') {
    const limit = limitOf(key, name);
    if (limit === undefined) return String(value ?? ABSENT);
    return typeof value === 'number' ? print(value, limit.kind) : `${print(limit.defaultSi, limit.kind)} (default)`;
  }
  if (key === 'acceleration') return value === true ? 'Counted' : 'Left out';
  return keyWords(key, value, { names: (id) => id, units });
}

function serviceWords(service: Trap['service'], units: DisplayUnits): string {
  if (service.kind === 'constant') return 'Constant';
  const [from, to] = [service.secondaryInletK, service.secondaryOutletK].map((kelvin) =>
    formatQuantity(kelvin, 'temperature', units, { withUnit: true }),
  );
  return `${CONTROL_WORDS[service.control]}, heating from ${from ?? ''} to ${to ?? ''}`;
}

/** "12 ft up 4, 18 ft down 1", by the pieces in the direction of flow. */
function routeWords(route: NonNullable<PipeRun['route']>, units: DisplayUnits): string {
  const length = (metres: number, withUnit: boolean) => formatQuantity(metres, 'length', units, { withUnit });
  return route
    .map(({ lengthM, riseM }) => {
      const way = riseM === 0 ? 'level' : `${riseM > 0 ? 'up' : 'down'} ${length(Math.abs(riseM), false)}`;
      return `${length(lengthM, true)} ${way}`;
    })
    .join(', ');
}
