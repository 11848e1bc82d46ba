import { describe, expect, it } from 'vitest';
import { NetworkFileShape } from './network-file';
import { MAXIMUM_MISTAKES, readNetworkFile } from './read-network-file';
import { fileOf, junction, pipe, smallJson, trap } from './spec-network';

const containing = (text: string): unknown => expect.stringContaining(text);
const matching = (pattern: RegExp): unknown => expect.stringMatching(pattern);

function mistakes(json: unknown): Record<string, string> {
  const read = readNetworkFile(json);
  return read.ok ? {} : Object.fromEntries(read.errors.map(({ pointer, detail }) => [pointer, detail]));
}

describe('what a file may leave out', () => {
  // the table of docs/network-file.md; types, discharges and factors are common practice
  it.each([
    { type: undefined, discharge: 'continuous', peakFactor: 1, sizingFactor: 3 },
    { type: 'invertedBucket', discharge: 'intermittent', peakFactor: 2, sizingFactor: 3 },
    { type: 'thermodynamic', discharge: 'intermittent', peakFactor: 2, sizingFactor: 3 },
    { type: 'thermostatic', discharge: 'continuous', peakFactor: 1, sizingFactor: 3 },
    { type: 'floatThermostatic', discharge: 'continuous', peakFactor: 1, sizingFactor: 2 },
  ])('a trap of type $type takes the defaults of its type', ({ type, ...expected }) => {
    const given = type === undefined ? trap('T1') : trap('T1', { trapType: type });
    const [read] = fileOf(smallJson({ nodes: [given], pipes: [] })).nodes;
    expect(read).toEqual({ ...given, ...expected, loadTolerance: 0.1, subcoolingK: 0, service: { kind: 'constant' } });
  });

  it('a trap that is given as intermittent has a peak of twice its average', () => {
    const [read] = fileOf(smallJson({ nodes: [trap('T1', { discharge: 'intermittent' })], pipes: [] })).nodes;
    expect(read).toMatchObject({ peakFactor: 2 });
  });

  it('an orifice must give its sizing factor', () => {
    const json = smallJson({ nodes: [trap('T1', { trapType: 'orifice' })], pipes: [] });
    expect(mistakes(json)).toEqual({ '/nodes/0/sizingFactor': containing('orifice') });
  });

  it('what is optional stays absent, and no key holds undefined', () => {
    const file = fileOf(smallJson());
    expect(JSON.parse(JSON.stringify(file))).toStrictEqual(file);
    expect(Object.keys(file.pipes[0] ?? {})).not.toContain('tag');
  });

  it('reading element by element gives what the schema of the whole file gives', () => {
    const json = smallJson({ cases: [{ id: 'c', name: 'C', overrides: [{ node: 'T1', loadKgS: 1 }] }] });
    expect(fileOf(json)).toStrictEqual(NetworkFileShape.parse(json));
  });
});

describe('mistakes', () => {
  it('each stands at its own pointer, and each is a sentence that says what would do', () => {
    const nodes = [
      trap('T1', { colour: 'red', elevationM: 'high' }),
      { id: 'X', kind: 'tee' },
      { id: 'R1', kind: 'receiver', elevationM: 1 },
      { id: 'J 1', kind: 'junction', elevationM: 1 },
      7,
    ];
    expect(mistakes(smallJson({ nodes, pipes: [], 'a/b~c': 1, name: undefined }))).toEqual({
      '/name': 'name is missing',
      '/a~1b~0c': 'The key "a/b~c" is not known here',
      '/nodes/0/colour': 'The key "colour" is not known here',
      '/nodes/0/elevationM': 'elevationM must be a number, not "high"',
      '/nodes/1/kind': matching(/^kind must be one of "trap", "junction", .* not "tee"$/),
      '/nodes/2': 'A receiver has either pressurePa or "vented": true',
      '/nodes/3/id': containing('starts with a letter or digit'),
      '/nodes/4': 'This must be an object, not 7',
    });
  });

  it('says that a name must not be empty, not how many characters it lacks', () => {
    expect(mistakes(smallJson({ name: '' }))).toEqual({ '/name': 'name must not be empty' });
  });

  it('a rule over two keys is told beside a mistake in a third', () => {
    const { insideDiameterM: _, ...bare } = pipe('L9', 'T1', 'J1');
    expect(Object.keys(mistakes(smallJson({ pipes: [{ ...bare, lengthM: -1 }] })))).toEqual([
      '/pipes/0/lengthM',
      '/pipes/0',
    ]);
  });

  it('ids are unique over nodes and pipes together, and in each other list', () => {
    const model = { id: 'M1', name: 'M' };
    const json = smallJson({ pipes: [pipe('T1', 'T1', 'J1')], trapModels: [model, model] });
    expect(Object.keys(mistakes(json))).toEqual(['/pipes/0/id', '/trapModels/1/id']);
  });

  it('references lead to elements of the file', () => {
    const json = smallJson({
      nodes: [trap('T1', { trapModel: 'M9' }), junction('J1')],
      pipes: [pipe('L1', 'T1', 'gone')],
      cases: [{ id: 'c', name: 'C', overrides: [{ node: 'gone' }] }],
      gauges: [
        { id: 'G1', node: 'gone', elevationM: 0 },
        { id: 'G2', pipe: 'gone', distanceM: 1, elevationM: 0 },
      ],
    });
    expect(Object.keys(mistakes(json))).toEqual([
      '/nodes/0/trapModel',
      '/pipes/0/to',
      '/gauges/0/node',
      '/gauges/1/pipe',
      '/cases/0/overrides/0/node',
    ]);
  });

  it('an override fits the kind of its node and stands once in its case', () => {
    const overrides = [
      { node: 'T1', flowKgS: 1 },
      { node: 'R1', pressurePa: 1e5 },
      { node: 'R1' },
      { node: 'J1', state: 'isolated' },
    ];
    expect(Object.keys(mistakes(smallJson({ cases: [{ id: 'c', name: 'C', overrides }] })))).toEqual([
      '/cases/0/overrides/0/flowKgS',
      '/cases/0/overrides/2/node',
      '/cases/0/overrides/3/state',
    ]);
  });
});

describe('hostile files', () => {
  it('a hundred mistakes are told, with a note that there are more', () => {
    const read = readNetworkFile(smallJson({ pipes: Array.from({ length: 150_000 }, () => 1) }));
    expect(read.ok ? [] : read.errors).toHaveLength(MAXIMUM_MISTAKES + 1);
    expect(read.ok ? undefined : read.errors.at(-1)).toEqual({
      pointer: '',
      detail: containing('more mistakes'),
    });
  });

  it('a list longer than any network is refused, at the top and inside an element', () => {
    const long = Array.from({ length: 1_000_000 }, () => 1);
    expect(mistakes(smallJson({ gauges: long }))['/gauges']).toMatch(/at most 50000/);
    expect(mistakes(smallJson({ pipes: [pipe('L1', 'T1', 'J1', 1, { fittings: long })] }))).toEqual({
      '/pipes/0/fittings': matching(/at most 50000/),
    });
  });

  it('nesting without end is one unknown key', () => {
    const deep: unknown = JSON.parse(`${'{"a":'.repeat(100_000)}1${'}'.repeat(100_000)}`);
    expect(Object.keys(mistakes(smallJson({ deep })))).toEqual(['/deep']);
    expect(Object.keys(mistakes(smallJson({ limits: deep })))).toEqual(['/limits/a']);
  });

  it('keys of every object are no keys of a file', () => {
    const json: unknown = JSON.parse(
      '{"format":"riseback-network","version":1,"name":"n","__proto__":{"nodes":[]},"nodes":[{"__proto__":{"kind":"junction"},"id":"toString","elevationM":0}]}',
    );
    expect(Object.keys(mistakes(json))).toEqual(['/__proto__', '/nodes/0/kind']);
  });
});
