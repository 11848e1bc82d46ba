import { type NetworkFile, readNetworkFile } from '@riseback/network';
import { compareNetworks } from '@riseback/revisions';
import { describe, expect, it } from 'vitest';
import { inputRows } from './input-rows';

type Loose = Record<string, unknown>;

const trap = { id: 'T1', kind: 'trap', tag: 'TR-101', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 };
const receiver = { id: 'R1', kind: 'receiver', tag: 'VR-1', elevationM: 3.048, vented: true };
const branch = (id: string, tag: string, more: Loose = {}) => ({
  id,
  tag,
  from: 'T1',
  to: 'R1',
  lengthM: 12.192,
  size: { nps: '1-1/2', schedule: '80' },
  ...more,
});
const tags = ['CR-18', 'CR-19', 'CR-20', 'CR-22', 'CR-9'];
const pipes = tags.map((tag, i) => branch(`L${String(i)}`, tag));

function file(changes: Loose = {}): NetworkFile {
  const read = readNetworkFile({
    format: 'riseback-network',
    version: 1,
    name: 'Small',
    nodes: [trap, receiver],
    pipes,
    trapModels: [{ id: 'M1', name: 'Marl B40' }],
    cases: [{ id: 'design', name: 'Design' }],
    ...changes,
  });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

function rows(before: NetworkFile, after: NetworkFile, comments: [string, number[]][] = []) {
  return inputRows(compareNetworks(before, after), { before, after }, 'us', new Map(comments));
}

const short = (before: NetworkFile, after: NetworkFile, comments?: [string, number[]][]) =>
  rows(before, after, comments).map((row) => [row.names.join(', '), row.quantity, row.before, row.after]);

const widened = file({ pipes: pipes.map((pipe) => ({ ...pipe, size: { nps: '2', schedule: '80' } })) });

describe('what was changed, in words', () => {
  it('folds equal changes of many elements into one row, tags counted up by their ends', () => {
    expect(short(file(), widened)).toEqual([['CR-9, CR-18 to CR-20, CR-22', 'Size', '1½″ sch 80', '2″ sch 80']]);
  });

  it('leaves an element with comments by itself', () => {
    expect(short(file(), widened, [['L1', [3]]]).map(([what]) => what)).toEqual(['CR-9, CR-18, CR-20, CR-22', 'CR-19']);
  });

  it('prints numbers in the person’s units and what is not given as a dash', () => {
    // 0.1 kg/s × 3600 / 0.45359237 = 793.66 lb/h; 120 psig + 14.6959 psi = 134.6959 psi × 6894.757 = 928,696 Pa
    const after = file({ nodes: [{ ...trap, loadKgS: 0.1, maximumPressurePa: 928_696 }, receiver] });
    expect(short(file(), after)).toEqual([
      ['TR-101', 'Load', '397 lb/h', '794 lb/h'],
      ['TR-101', 'Safety valve set at', '–', '120.0 psig'],
    ]);
  });

  it('takes a key that stands in another’s place for one change', () => {
    const bored = pipes.map(({ size, ...pipe }) =>
      pipe.id === 'L0' ? { ...pipe, insideDiameterM: 0.0508 } : { ...pipe, size },
    );
    const held = file({
      pipes: bored,
      nodes: [trap, { id: 'R1', kind: 'receiver', tag: 'VR-1', elevationM: 3.048, pressurePa: 204_746.5 }],
    });
    expect(short(file(), held)).toEqual([
      ['VR-1', 'Pressure', 'Vented', '15.0 psig'],
      ['CR-18', 'Size', '1½″ sch 80', '2 in'],
    ]);
  });

  it('calls other elements by their tags, models by their names', () => {
    const after = file({
      nodes: [{ ...trap, trapModel: 'M1' }, receiver, { id: 'J1', kind: 'junction', tag: 'JN-1', elevationM: 3.048 }],
      pipes: [branch('L0', 'CR-18', { to: 'J1' }), ...pipes.slice(1)],
    });
    expect(short(file(), after)).toEqual([
      ['JN-1', 'Junction', '–', 'added'],
      ['TR-101', 'Trap model', '–', 'Marl B40'],
      ['CR-18', 'To', 'VR-1', 'JN-1'],
    ]);
  });

  it('tells what an added element was given, without its defaults', () => {
    const after = file({
      pipes: [...pipes, branch('L9', 'CR-30', { checkValve: true, fittings: [{ kind: 'elbow90', count: 2 }] })],
    });
    // a float-thermostatic trap has a sizing factor of 2, drains continuously and serves at one pressure unless it says otherwise
    const drip = {
      ...trap,
      id: 'T2',
      tag: 'TR-102',
      trapType: 'floatThermostatic',
      sizingFactor: 2,
      discharge: 'continuous',
    };
    expect(rows(file(), file({ nodes: [trap, receiver, drip] }))[0]?.details).toBe(
      'elevation 0 ft; inlet pressure 74.9 psig; load 397 lb/h; trap type Float-thermostatic',
    );
    const [row] = rows(file(), after);
    expect(row).toMatchObject({ names: ['CR-30'], quantity: 'Pipe', before: '–', after: 'added' });
    expect(row?.details).toMatch(
      /^from TR-101; to VR-1; length 40 ft; size 1½″ sch 80; fittings 2 .*; check valve Yes$/,
    );
  });

  it('tells an added case by what it changes, and a change within a case by case and element', () => {
    const after = file({
      cases: [
        { id: 'design', name: 'Design', overrides: [{ node: 'R1', pressurePa: 204_746.5 }] },
        { id: 'stuck', name: 'TR-101 failed open', loadFactor: 0.5, overrides: [{ node: 'T1', state: 'failedOpen' }] },
      ],
    });
    expect(
      rows(file(), after).map(({ names, quantity, after: to, details }) => [names.join(), quantity, to, details]),
    ).toEqual([
      ['Case TR-101 failed open', 'Operating case', 'added', 'load 50 %; TR-101 failed open'],
      ['Design: VR-1', 'Pressure', '15.0 psig', ''],
    ]);
  });

  it('puts method and limits first, in plain words; a limit of its own beside the default', () => {
    const after = file({
      site: { atmosphericPressurePa: 98_000 },
      method: { friction: 'friedel', acceleration: false },
      limits: { velocity: { watchMS: 20.32 } },
    });
    // 25 m/s = 25 / 0.3048 × 60 = 4921 ft/min; 20.32 m/s = 4000 ft/min; 101,325 Pa = 14.696 psia; 98,000 Pa = 14.214
    expect(short(file(), after)).toEqual([
      ['Site conditions', 'Atmospheric pressure', '14.70 psia', '14.21 psia'],
      ['Method', 'Acceleration', 'Counted', 'Left out'],
      ['Method', 'Friction', 'Flash vapour (dry returns)', 'Friedel'],
      ['Limit: Velocity', 'Flashing: watch above', '4,921 ft/min (default)', '4,000 ft/min'],
    ]);
  });

  it('puts what only moves a symbol last', () => {
    const after = file({ nodes: [{ ...trap, position: { x: 3, y: 4 }, note: 'seen on site' }, receiver] });
    const all = rows(file(), after);
    expect(all.map(({ quantity, drawingOnly }) => [quantity, drawingOnly])).toEqual([
      ['Note', false],
      ['Place on the drawing', true],
    ]);
  });
});
