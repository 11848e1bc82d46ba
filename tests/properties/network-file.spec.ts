import {
  fileCanonicalText,
  fromFile,
  MAXIMUM_MISTAKES,
  readNetworkFile,
  solverInputText,
  toFile,
  type NetworkFile,
} from '@riseback/network';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { SEED, ternQuay, ternQuayJson } from './network-arbitraries';

type Container = Record<string, unknown> | unknown[];

/** Every object and list in a JSON value, with its path. */
function containersOf(json: unknown): { path: string[]; container: Container }[] {
  const found: { path: string[]; container: Container }[] = [];
  const visit = (value: unknown, path: string[]): void => {
    if (typeof value !== 'object' || value === null) return;
    found.push({ path, container: value as Container });
    for (const [key, item] of Object.entries(value)) visit(item, [...path, key]);
  };
  visit(json, []);
  return found;
}

function unescape(token: string): string {
  return token.replaceAll('~1', '/').replaceAll('~0', '~');
}

/** Whether a pointer leads to a place in the value, or to a key that its object lacks. */
function leadsSomewhere(json: unknown, pointer: string): boolean {
  if (pointer === '') return true;
  if (!pointer.startsWith('/')) return false;
  const tokens = pointer.slice(1).split('/').map(unescape);
  let at = json;
  for (const [i, token] of tokens.entries()) {
    if (typeof at !== 'object' || at === null) return false;
    if (!Object.hasOwn(at, token)) return i === tokens.length - 1 && !Array.isArray(at);
    at = new Map(Object.entries(at)).get(token);
  }
  return true;
}

function expectNamedMistakes(json: unknown): void {
  const read = readNetworkFile(json);
  if (read.ok) return;
  expect(read.errors.length).toBeGreaterThan(0);
  expect(read.errors.length).toBeLessThanOrEqual(MAXIMUM_MISTAKES + 1);
  for (const { pointer, detail } of read.errors) {
    expect(leadsSomewhere(json, pointer), `${pointer}: ${detail}`).toBe(true);
    expect(detail.length).toBeGreaterThan(5);
    expect(detail.length).toBeLessThan(800);
  }
}

const nasty = fc.oneof(
  fc.jsonValue(),
  fc.constantFrom<unknown>(
    null,
    NaN,
    Infinity,
    -1,
    1e308,
    '',
    'T1',
    [],
    {},
    [[]],
    true,
    '\ud800',
    JSON.parse('{"__proto__":{"x":1}}'),
  ),
  fc.string(),
  fc.double(),
);

const wreck = fc.record({
  place: fc.nat(),
  key: fc.nat(),
  how: fc.constantFrom('replace', 'delete', 'add', 'double'),
  name: fc.oneof(fc.string(), fc.constantFrom('__proto__', 'constructor', 'a/b~c', 'toString', 'id', 'kind', 'node')),
  value: nasty,
});
type Wreck = typeof wreck extends fc.Arbitrary<infer T> ? T : never;

function define(container: object, key: string, value: unknown): void {
  // assignment to __proto__ would not make a key
  Object.defineProperty(container, key, { value, enumerable: true, configurable: true, writable: true });
}

function isList(container: Container): container is unknown[] {
  return Array.isArray(container);
}

function wreckFile(json: unknown, { place, key, how, name, value }: Wreck): void {
  const containers = containersOf(json);
  const { container } = containers[place % containers.length] ?? { container: {} };
  const keys = Object.keys(container);
  const chosen = keys[key % Math.max(keys.length, 1)];
  if (isList(container)) {
    if (how === 'double' && container.length > 0) container.splice(0, 0, container[key % container.length]);
    else if (how === 'delete') container.splice(key % Math.max(container.length, 1), 1);
    else container[key % Math.max(container.length, 1)] = value;
    return;
  }
  if (how === 'add' || chosen === undefined) define(container, name, value);
  else if (how === 'delete') Reflect.deleteProperty(container, chosen);
  else define(container, chosen, value);
}

describe('reading a file', () => {
  it('names every mistake of a wrecked file by a pointer that leads somewhere, and never crashes', () => {
    fc.assert(
      fc.property(fc.array(wreck, { minLength: 1, maxLength: 12 }), (wrecks) => {
        const json = ternQuayJson();
        for (const one of wrecks) wreckFile(json, one);
        expectNamedMistakes(json);
      }),
      { seed: SEED, numRuns: 400 },
    );
  });

  it('takes anything at all', () => {
    fc.assert(
      fc.property(fc.oneof(fc.anything(), fc.jsonValue({ maxDepth: 8 })), (json) => {
        expect(() => readNetworkFile(json)).not.toThrow();
        expect(readNetworkFile(json).ok).toBe(false);
      }),
      { seed: SEED, numRuns: 500 },
    );
  });

  it('names each unknown key at its own place', () => {
    fc.assert(
      fc.property(
        fc.uniqueArray(fc.tuple(fc.nat(), fc.stringMatching(/^zz[a-z/~]{0,8}$/)), { maxLength: 8 }),
        (extras) => {
          const json = ternQuayJson();
          const objects = containersOf(json).filter(({ container }) => !Array.isArray(container));
          const expected = new Set<string>();
          for (const [place, name] of extras) {
            const { path, container } = objects[place % objects.length] ?? { path: [], container: {} };
            define(container, name, 1);
            expected.add(`/${[...path, name].map((key) => key.replaceAll('~', '~0').replaceAll('/', '~1')).join('/')}`);
          }
          const read = readNetworkFile(json);
          expect(new Set(read.ok ? [] : read.errors.map(({ pointer }) => pointer))).toEqual(expected);
        },
      ),
      { seed: SEED, numRuns: 200 },
    );
  });
});

function shuffled<T>(list: readonly T[], keys: readonly number[]): T[] {
  return list
    .map((item, i) => ({ item, key: keys[i % keys.length] ?? 0 }))
    .sort((a, b) => a.key - b.key)
    .map(({ item }) => item);
}

describe('a file and its document', () => {
  it('come out equal in whatever order the elements stand, and that order changes neither hash text', () => {
    const file = ternQuay();
    fc.assert(
      fc.property(fc.array(fc.double({ noNaN: true }), { minLength: 50, maxLength: 97 }), (keys) => {
        const mixed: NetworkFile = {
          ...file,
          nodes: shuffled(file.nodes, keys),
          pipes: shuffled(file.pipes, keys),
          trapModels: shuffled(file.trapModels, keys),
          cases: shuffled(file.cases, keys),
          gauges: shuffled(file.gauges, keys),
        };
        expect(toFile(fromFile(mixed))).toEqual(mixed);
        expect(fileCanonicalText(mixed)).toBe(fileCanonicalText(file));
        expect(solverInputText(fromFile(mixed))).toBe(solverInputText(fromFile(file)));
      }),
      { seed: SEED, numRuns: 100 },
    );
  });
});
