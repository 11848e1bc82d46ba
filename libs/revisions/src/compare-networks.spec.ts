import { type NetworkFile, readNetworkFile } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { compareNetworks, countChanges } from './compare-networks';

type Loose = Record<string, unknown>;

const trap = { id: 'T1', kind: 'trap', tag: 'TR-1', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 };
const junction = { id: 'J1', kind: 'junction', elevationM: 3 };
const receiver = { id: 'R1', kind: 'receiver', elevationM: 3, vented: true };
const pipe = { id: 'L1', from: 'T1', to: 'J1', lengthM: 6, size: { nps: '1', schedule: '80' } };
const header = { id: 'L2', from: 'J1', to: 'R1', lengthM: 30, insideDiameterM: 0.03 };
const design = { id: 'design', name: 'Design', overrides: [{ node: 'T1', loadKgS: 0.08 }] };

function file(changes: Loose = {}): NetworkFile {
  const read = readNetworkFile({
    format: 'riseback-network',
    version: 1,
    name: 'Small',
    nodes: [trap, junction, receiver],
    pipes: [pipe, header],
    cases: [design],
    ...changes,
  });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

const short = (before: NetworkFile, after: NetworkFile) =>
  compareNetworks(before, after).elements.map(({ in: list, id, kind, keys }) => [
    kind,
    list,
    id,
    ...keys.map(({ key }) => key),
  ]);

describe('two network files', () => {
  it('that are equal differ in nothing, also where one leaves a default out', () => {
    const spelled = file({ nodes: [{ ...trap, subcoolingK: 0, loadTolerance: 0.1 }, junction, receiver] });
    expect(compareNetworks(file(), spelled)).toEqual({ settings: [], elements: [], reordered: [] });
  });

  it('tell an element by its id: a new tag is a change, a new id another element', () => {
    expect(short(file(), file({ nodes: [{ ...trap, tag: 'TR-9' }, junction, receiver] }))).toEqual([
      ['changed', 'nodes', 'T1', 'tag'],
    ]);
    const renamed = file({
      nodes: [{ ...trap, id: 'T2' }, junction, receiver],
      pipes: [{ ...pipe, from: 'T2' }, header],
      cases: [],
    });
    expect(short(file(), renamed)).toEqual([
      ['added', 'nodes', 'T2'],
      ['removed', 'nodes', 'T1'],
      ['changed', 'pipes', 'L1', 'from'],
      ['removed', 'cases', 'design'],
    ]);
  });

  it('give old and new value by key, absent keys included', () => {
    const bored = { id: 'L1', from: 'T1', to: 'J1', lengthM: 7, insideDiameterM: 0.05 };
    const [change] = compareNetworks(file(), file({ pipes: [bored, header] })).elements;
    expect(change?.keys).toEqual([
      { key: 'lengthM', from: 6, to: 7, drawingOnly: false },
      { key: 'insideDiameterM', from: undefined, to: 0.05, drawingOnly: false },
      { key: 'size', from: { nps: '1', schedule: '80' }, to: undefined, drawingOnly: false },
    ]);
  });

  it('count what only moves a symbol apart', () => {
    const moved = file({
      nodes: [{ ...trap, position: { x: 10, y: 0 } }, junction, receiver],
      pipes: [{ ...pipe, bends: [{ x: 5, y: 5 }], lengthM: 7 }, header],
    });
    expect(countChanges(compareNetworks(file(), moved))).toEqual({ inputs: 1, drawingOnly: 2 });
  });

  it('name each setting by itself', () => {
    const after = file({
      name: 'Larger',
      site: { atmosphericPressurePa: 90_000 },
      method: { friction: 'friedel', coincidence: 'ownPeak' },
      limits: { velocity: { watchMS: 20, failMS: 30 } },
    });
    expect(compareNetworks(file(), after).settings).toEqual([
      { path: ['name'], from: 'Small', to: 'Larger' },
      { path: ['site', 'atmosphericPressurePa'], from: 101_325, to: 90_000 },
      { path: ['method', 'coincidence'], from: 'average', to: 'ownPeak' },
      { path: ['method', 'friction'], from: 'flashVapour', to: 'friedel' },
      { path: ['limits', 'velocity', 'failMS'], from: undefined, to: 30 },
      { path: ['limits', 'velocity', 'watchMS'], from: undefined, to: 20 },
    ]);
  });

  it('take an override that is not there for one that changes nothing', () => {
    const after = file({ cases: [{ ...design, overrides: [{ node: 'R1', pressurePa: 150_000 }] }] });
    const { elements } = compareNetworks(file(), after);
    expect(elements).toEqual([
      {
        in: 'overrides',
        id: 'design/R1',
        kind: 'added',
        before: undefined,
        after: { node: 'R1', pressurePa: 150_000 },
        keys: [{ key: 'pressurePa', from: undefined, to: 150_000, drawingOnly: false }],
      },
      {
        in: 'overrides',
        id: 'design/T1',
        kind: 'removed',
        before: { node: 'T1', loadKgS: 0.08 },
        after: undefined,
        keys: [{ key: 'loadKgS', from: 0.08, to: undefined, drawingOnly: false }],
      },
    ]);
  });

  it('let an added case carry its own overrides: it is one change', () => {
    const stuck = { id: 'stuck', name: 'TR-1 failed open', overrides: [{ node: 'T1', state: 'failedOpen' }] };
    const comparison = compareNetworks(file(), file({ cases: [design, stuck] }));
    expect(countChanges(comparison)).toEqual({ inputs: 1, drawingOnly: 0 });
    expect(comparison.elements[0]).toMatchObject({ in: 'cases', kind: 'added', after: stuck });
  });

  it('tell another order of what both have, not the place of what one has more', () => {
    const turned = file({ nodes: [junction, trap, receiver] });
    expect(compareNetworks(file(), turned)).toEqual({ settings: [], elements: [], reordered: ['nodes'] });
    const inserted = file({ nodes: [{ ...junction, id: 'J0' }, trap, junction, receiver] });
    expect(compareNetworks(file(), inserted).reordered).toEqual([]);
  });

  it('tell another kind under the same id as a change of that element', () => {
    const turned = file({
      nodes: [trap, { id: 'J1', kind: 'flashVessel', elevationM: 3, pressurePa: 2e5 }, receiver],
    });
    expect(short(file(), turned)).toEqual([['changed', 'nodes', 'J1', 'kind', 'pressurePa']]);
  });
});
