import { fromFile, readNetworkFile } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { inOwnOrder, walkOrder } from './walk-order';

/** T1 and T2 in the hall run over J1 to J2, and on over the rack to R1; 6, 9, 30 and 20 m of pipe. */
function document() {
  const node = { elevationM: 0 };
  const pipe = { insideDiameterM: 0.05 };
  const read = readNetworkFile({
    format: 'riseback-network',
    version: 1,
    name: 'Walk',
    nodes: [
      { ...node, id: 'T1', kind: 'trap', area: 'Hall', inletPressurePa: 6e5, loadKgS: 0.1 },
      { ...node, id: 'T2', kind: 'trap', area: 'Hall', inletPressurePa: 6e5, loadKgS: 0.1 },
      { ...node, id: 'J1', kind: 'junction', area: 'Hall' },
      { ...node, id: 'J2', kind: 'junction', area: 'Rack' },
      { ...node, id: 'R1', kind: 'receiver', vented: true },
    ],
    pipes: [
      { ...pipe, id: 'L1', from: 'T1', to: 'J1', lengthM: 6 },
      { ...pipe, id: 'L2', from: 'T2', to: 'J1', lengthM: 9 },
      { ...pipe, id: 'L3', from: 'J1', to: 'J2', lengthM: 30 },
      { ...pipe, id: 'L4', from: 'J2', to: 'R1', lengthM: 20 },
    ],
    gauges: [
      { ...node, id: 'atVessel', node: 'R1' },
      { ...node, id: 'onRack', pipe: 'L4', distanceM: 5 },
      { ...node, id: 'atHeader', node: 'J1' },
      { ...node, id: 'gone', node: 'J1', retired: true },
      { ...node, id: 'farTrap', node: 'T2' },
      { ...node, id: 'nearTrap', pipe: 'L1', distanceM: 1 },
      { ...node, id: 'alongHall', pipe: 'L3', distanceM: 10 },
    ],
  });
  if (!read.ok) throw new Error(JSON.stringify(read));
  return fromFile(read.file);
}

describe('walkOrder', () => {
  it('goes area by area, and with the flow within each', () => {
    // to go, by hand: T2 59, L1 after 1 m 55, J1 50, L3 after 10 m 40; L4 after 5 m 15; R1 0, without an area
    expect(walkOrder(document()).map(({ id }) => id)).toEqual([
      'farTrap',
      'nearTrap',
      'atHeader',
      'alongHall',
      'onRack',
      'atVessel',
    ]);
  });
});

describe('inOwnOrder', () => {
  const cards = ['a', 'b', 'c'].map((id) => ({ gauge: { id } }));
  const ids = (own: readonly string[]) => inOwnOrder(cards, own).map(({ gauge }) => gauge.id);

  it('puts the person’s own order first, and what is new after it', () => {
    expect(ids([])).toEqual(['a', 'b', 'c']);
    expect(ids(['c', 'a'])).toEqual(['c', 'a', 'b']);
    expect(ids(['gone', 'b'])).toEqual(['b', 'a', 'c']);
  });
});
