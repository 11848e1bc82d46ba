import { applyBatch, fromFile, type NetworkDocument, readNetworkFile } from '@riseback/network';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ELEMENT_LISTS, type ListId } from '../list-definitions';
import { trialContext, trialDocument } from '../testing/trial-document';
import type { BlockPlan } from './block-plan';
import { writeCopiedCells, writeCsv, readCopiedCells, readCsv } from './block-text';
import { rowsOf, startingMapping } from './block-rows';

function list(id: ListId) {
  const found = ELEMENT_LISTS.find((each) => each.id === id);
  if (found === undefined) throw new Error(id);
  return found;
}

/** A block with its headings, planned as the preview plans it. */
function planned(
  id: ListId,
  text: string,
  document = trialDocument(),
  system: 'us' | 'si' = 'us',
  clears = false,
): BlockPlan {
  const read = readCopiedCells(text);
  if (!read.ok) throw new Error(read.detail);
  const context = trialContext(document, system);
  const target = list(id).block(context);
  const mapping = startingMapping(read.block, target, context.units, { keys: [], fromKey: '' });
  return target.plan(rowsOf(read.block, mapping, target, { ids: [], fromRow: 0 }, { clears }));
}

function after(plan: BlockPlan, document = trialDocument()): NetworkDocument {
  expect(plan.bad).toEqual([]);
  expect(plan.refusal).toBe('');
  const applied = applyBatch(document, plan.ops);
  if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
  return applied.document;
}

describe('a pasted block', () => {
  it('changes rows that it names and adds the others, with the units of its headings', () => {
    const plan = planned(
      'traps',
      'Tag\tElevation, m\tInlet (kPa)\tLoad kg/h\tType\nTR-2\t1.5\t500\t36\tinverted bucket\nTR-77\t2\t400\t72\tFloat-thermostatic',
    );
    expect(plan.rows.map(({ name, fate }) => [name, fate])).toEqual([
      ['TR-2', 'changed'],
      ['TR-77', 'new'],
    ]);
    const { nodes } = after(plan);
    // a kilogram an hour is 1/3600 kg/s; 500 kPa on a gauge are 601,325 Pa at 101,325 Pa of air
    expect(nodes.get('T1')?.value).toMatchObject({ elevationM: 1.5, inletPressurePa: 601_325, loadKgS: 0.01 });
    // a float trap's own sizing factor (common practice, docs/network-file.md)
    expect(nodes.get('T3')?.value).toMatchObject({
      tag: 'TR-77',
      loadKgS: 0.02,
      sizingFactor: 2,
      discharge: 'continuous',
    });
  });

  it('places new nodes where nothing stands and moves none', () => {
    const before = after(planned('junctions', 'Tag\tElevation\nH1\t10\nH2\t10'));
    const plan = planned('traps', 'Tag\tElevation\tInlet\tLoad\nA\t0\t75\t10\nB\t0\t75\t10\nC\t0\t75\t10', before);
    const next = after(plan, before);
    for (const [id, { value }] of before.nodes) expect(next.nodes.get(id)?.value).toEqual(value);
    const spots = [...next.nodes.values()]
      .flatMap(({ value }) => value.position ?? [])
      .map(({ x, y }) => `${String(x)},${String(y)}`);
    expect(new Set(spots).size).toBe(spots.length);
    expect(planned('traps', 'Tag\tElevation\tInlet\tLoad\nA\t0\t75\t10\nB\t0\t75\t10\nC\t0\t75\t10', before)).toEqual(
      plan,
    );
  });

  it('leads pipes from tag to tag, with size and schedule together', () => {
    const plan = planned(
      'pipes',
      'Tag\tFrom\tTo\tLength\tSize\tSchedule\nCR-9\tTR-10\tj1\t12 ft\t1 1/4 in\t40\nCR-1\t\t\t\t2\t160',
    );
    const { pipes } = after(plan);
    expect(pipes.get('L3')?.value).toMatchObject({ from: 'T2', to: 'J1', size: { nps: '1-1/4', schedule: '40' } });
    expect(pipes.get('L1')?.value).toMatchObject({ size: { nps: '2', schedule: '160' }, lengthM: 12 });
  });

  it('puts gauges on elements and along pipes', () => {
    const { gauges } = after(
      planned(
        'gauges',
        'Tag\tOn\tFrom its start\tElevation\tAccuracy, %\tCalibrated on\nPI-1\tCR-1\t3 m\t1 m\t1.6\t2026-03-01\nPI-2\tFV-1\t\t1 m',
      ),
    );
    expect(gauges.get('G2')?.value).toMatchObject({
      tag: 'PI-1',
      pipe: 'L1',
      distanceM: 3,
      accuracy: 0.016,
      calibratedOn: '2026-03-01',
    });
    expect(gauges.get('G3')?.value).toMatchObject({ node: 'V1' });
  });

  it('makes a constant service modulating only with both temperatures', () => {
    const whole = planned('traps', 'Tag\tService\tHeated from, °C\tHeated to, °C\nTR-2\tModulating\t60\t80');
    expect(after(whole).nodes.get('T1')?.value).toMatchObject({
      service: { kind: 'modulating', secondaryInletK: 333.15 },
    });
    const half = planned('traps', 'Tag\tService\tHeated from, °C\nTR-2\tModulating\t60');
    expect(half.bad).toMatchObject([{ key: 'secondaryOutletK', title: 'Heated to' }]);
  });

  it('clears by an empty cell only where that was asked for and the key may be left out', () => {
    const text = 'Tag\tArea\tModel\tSafety valve\tSubcooling\tLoad\nTR-2\t\t\t\t\t\nTR-77\t\t\t\t\t5';
    const one = text.slice(0, text.lastIndexOf('\n'));
    expect(planned('traps', one).ops).toEqual([]);
    const trap = after(planned('traps', one, trialDocument(), 'us', true)).nodes.get('T1')?.value;
    for (const key of ['area', 'trapModel', 'maximumPressurePa']) expect(trap).not.toHaveProperty(key);
    // a load always stands there; subcooling takes its default
    expect(trap).toMatchObject({ loadKgS: 0.05, subcoolingK: 0 });
    // a new row has nothing to clear, and still says what it needs
    expect(planned('traps', text, trialDocument(), 'us', true).bad.map(({ row }) => row)).toContain(3);
  });

  it('says at the cell what cannot be cleared', () => {
    const plan = planned('vessels', 'Tag\tPressure\nFV-1\t', trialDocument(), 'us', true);
    expect(plan.bad).toMatchObject([{ rowName: 'FV-1', reason: 'A flash vessel always has a pressure.' }]);
  });

  it('reads keys of the network file in their own units', () => {
    const { nodes } = after(planned('traps', 'tag\tinletPressurePa\tloadKgS\nTR-2\t400000\t0.02'));
    expect(nodes.get('T1')?.value).toMatchObject({ inletPressurePa: 400_000, loadKgS: 0.02 });
  });
});

describe('a bad cell', () => {
  it.each<[ListId, string, string, RegExp]>([
    ['traps', 'Tag\tLoad\nTR-2\tabc', 'loadKgS', /number/],
    ['traps', 'Tag\tLoad\nTR-2\t5 psig', 'loadKgS', /psig is a pressure/],
    ['traps', 'Tag\tType\nTR-2\tbell', 'trapType', /“bell” is not one of Not given, Inverted bucket/],
    ['traps', 'Tag\tLoad\nTR-9\t5', 'elevationM', /Elevation is missing: a new trap needs it/],
    ['traps', 'Tag\tSubcooling\nTR-2\t600', 'subcoolingK', /at most 540 °F/],
    ['traps', 'Tag\tLoad\nTR-2\t5\ntr-2\t6', 'tag', /Row 2 has this tag too/],
    ['traps', 'Tag\tLoad\n\t5', 'tag', /nobody can tell/],
    ['traps', 'Tag\tElevation\tInlet\tLoad\nFV-1\t1\t75\t5', 'tag', /FV-1 is the tag of a flash vessel/],
    ['pipes', 'Tag\tFrom\tTo\tLength\tSize\tSchedule\nX\tTR-10\tnowhere\t5\t1\t80', 'to', /called nowhere/],
    ['pipes', 'Tag\tFrom\tTo\tLength\nX\tTR-10\tJ1\t5', 'nps', /either a size or/],
    ['pipes', 'Tag\tSize\nCR-1\t3 apples', 'nps', /not a nominal size/],
    ['vessels', 'Tag\tKind\tElevation\nX\tTank\t5', 'kind', /Receiver or Flash vessel/],
    [
      'gauges',
      'Tag\tOn\tElevation\tRange from\tRange to\nX\tJ1\t5\t100\t50',
      'rangeHighPa',
      /range ends above its start/,
    ],
  ])('in %s is named with what is wrong: %j', (id, text, key, reason) => {
    const plan = planned(id, text);
    expect(plan.ops).toEqual([]);
    expect(plan.bad).toContainEqual(expect.objectContaining({ key, reason: expect.stringMatching(reason) as string }));
  });

  it('keeps the whole block from being taken', () => {
    const plan = planned('traps', 'Tag\tLoad\nTR-2\t5\nTR-10\tx');
    expect(plan.rows.map(({ fate }) => fate)).toEqual(['changed', 'bad']);
    expect(plan.ops).toEqual([]);
  });
});

describe('what goes out comes in as it was', () => {
  const text = fc
    .string({ unit: 'grapheme', minLength: 1, maxLength: 20 })
    .map((each) => each.trim())
    .filter((each) => each !== '');
  const positive = (max: number) => fc.double({ min: 1e-3, max, noNaN: true });
  const elevationM = fc.double({ min: -50, max: 50, noNaN: true });
  const maybe = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: undefined });
  const network = fc.record({
    traps: fc.uniqueArray(
      fc.record(
        {
          kind: fc.constant('trap'),
          elevationM,
          inletPressurePa: fc.double({ min: 101_325, max: 2e6, noNaN: true }),
          loadKgS: positive(5),
          loadTolerance: fc.double({ min: 0, max: 1, noNaN: true }),
          area: text,
          note: text,
          trapType: fc.constantFrom('invertedBucket', 'floatThermostatic', 'thermodynamic'),
          trapModel: fc.constant('M1'),
          batch: text,
          service: fc.oneof(
            fc.constant({ kind: 'constant' }),
            fc.record({
              kind: fc.constant('modulating'),
              control: fc.constantFrom('varyingInlet', 'varyingFlow'),
              secondaryInletK: fc.double({ min: 250, max: 300, noNaN: true }),
              secondaryOutletK: fc.double({ min: 300, max: 400, noNaN: true }),
            }),
          ),
        },
        { requiredKeys: ['kind', 'elevationM', 'inletPressurePa', 'loadKgS'] },
      ),
      { maxLength: 5 },
    ),
    pipes: fc.array(
      fc.record(
        {
          lengthM: positive(500),
          fittings: fc.array(
            fc.record({ kind: fc.constantFrom('elbow90', 'gateValve', 'exit'), count: fc.integer({ min: 1, max: 9 }) }),
            { maxLength: 3 },
          ),
          heatLossWM: positive(500),
          checkValve: fc.boolean(),
          route: fc.array(fc.record({ lengthM: positive(20), riseM: elevationM }), { minLength: 1, maxLength: 3 }),
          note: text,
        },
        { requiredKeys: ['lengthM'] },
      ),
      { maxLength: 4 },
    ),
    bore: maybe(fc.double({ min: 0.01, max: 1, noNaN: true })),
    gauge: fc.record({
      rangeLowPa: fc.double({ min: -1e5, max: 0, noNaN: true }),
      rangeHighPa: positive(1e6),
      accuracy: fc.double({ min: 0, max: 1, noNaN: true }),
      resolutionPa: positive(1e4),
      waterLeg: fc.boolean(),
    }),
    points: fc.uniqueArray(fc.record({ differentialPa: positive(1e6), flowKgS: positive(3) }), {
      selector: ({ differentialPa }) => Math.round(differentialPa),
      minLength: 1,
      maxLength: 4,
    }),
  });

  it.each(['us', 'si'] as const)('in %s units, by CSV and by the clipboard', (system) => {
    fc.assert(
      fc.property(network, (parts) => {
        const document = documentOf(parts);
        for (const each of ELEMENT_LISTS) {
          const target = each.block(trialContext(document, system));
          const ids = each.table(trialContext(document, system)).ids;
          const sheet = target.sheet(
            target.fields.map(({ key }) => key),
            ids,
          );
          for (const read of [readCsv(writeCsv(sheet)), readCopiedCells(writeCopiedCells(sheet))]) {
            if (!read.ok) throw new Error(read.detail);
            const { units } = trialContext(document, system);
            const mapping = startingMapping(read.block, target, units, { keys: [], fromKey: '' });
            const plan = target.plan(rowsOf(read.block, mapping, target, { ids: [], fromRow: 0 }));
            expect(plan.bad).toEqual([]);
            expect(plan.ops).toEqual([]);
            // and a reader with other units changes nothing either
            const other = each.block(trialContext(document, system === 'us' ? 'si' : 'us'));
            const otherUnits = { ...units, system: system === 'us' ? ('si' as const) : ('us' as const) };
            const again = other.plan(
              rowsOf(read.block, startingMapping(read.block, other, otherUnits, { keys: [], fromKey: '' }), other, {
                ids: [],
                fromRow: 0,
              }),
            );
            expect(again.bad).toEqual([]);
            expect(again.ops).toEqual([]);
          }
        }
      }),
      { numRuns: 25 },
    );
  });
});

function documentOf(parts: {
  traps: readonly object[];
  pipes: readonly object[];
  bore: number | undefined;
  gauge: object;
  points: readonly { differentialPa: number }[];
}): NetworkDocument {
  const traps = parts.traps.map((trap, i) => ({ ...trap, id: `T${String(i)}`, tag: `=TR-${String(i)}` }));
  const read = readNetworkFile({
    format: 'riseback-network',
    version: 1,
    name: 'Trial',
    nodes: [
      ...traps,
      { id: 'J1', kind: 'junction', elevationM: 3 },
      { id: 'R1', kind: 'receiver', elevationM: 1, vented: true },
      { id: 'V1', kind: 'flashVessel', tag: 'V-1', elevationM: 1, pressurePa: 2e5 },
    ],
    pipes: parts.pipes.map((pipe, i) => ({
      ...pipe,
      id: `L${String(i)}`,
      from: 'J1',
      to: 'R1',
      ...(i === 0 && parts.bore !== undefined
        ? { insideDiameterM: parts.bore }
        : { size: { nps: '1-1/2', schedule: '80' } }),
    })),
    trapModels: [
      {
        id: 'M1',
        name: 'Marl, "B" 40',
        capacity: [...parts.points].sort((a, b) => a.differentialPa - b.differentialPa),
      },
    ],
    gauges: [
      { id: 'G1', node: 'J1', elevationM: 3, ...parts.gauge },
      ...(parts.pipes.length > 0 ? [{ id: 'G2', pipe: 'L0', distanceM: 1, elevationM: 3 }] : []),
    ],
  });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return fromFile(read.file);
}
