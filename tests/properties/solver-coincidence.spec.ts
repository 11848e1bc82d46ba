import type { NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { found, networkFile, refused, solved, ternQuay, trapOf } from '../fixtures/solver/small-networks';

function withCoincidence(file: NetworkFile, coincidence: NetworkFile['method']['coincidence']): NetworkFile {
  return { ...file, method: { ...file.method, coincidence } };
}

function withLoads(file: NetworkFile, loadOf: (id: string, loadKgS: number) => number): NetworkFile {
  const nodes = file.nodes.map((node) =>
    node.kind === 'trap' ? { ...node, loadKgS: loadOf(node.id, node.loadKgS) } : node,
  );
  return { ...file, nodes };
}

/** Traps alike on one header to a receiver above, each on a branch of its own to the same junction. */
function header(traps: readonly object[], more: object = {}): NetworkFile {
  const ids = traps.map((_, i) => `T${String(i + 1)}`);
  return networkFile({
    nodes: [
      ...traps.map((trap, i) => ({
        id: ids[i],
        kind: 'trap',
        elevationM: 0,
        inletPressurePa: 5e5,
        loadKgS: 0.02,
        trapType: 'invertedBucket',
        ...trap,
      })),
      { id: 'J', kind: 'junction', elevationM: 0 },
      { id: 'R', kind: 'receiver', elevationM: 3, pressurePa: 1.2e5 },
    ],
    pipes: [
      ...ids.map((id) => ({ id: `L${id}`, from: id, to: 'J', lengthM: 3, insideDiameterM: 0.027, heatLossWM: 40 })),
      { id: 'H', from: 'J', to: 'R', lengthM: 40, insideDiameterM: 0.041 },
    ],
    ...more,
  });
}

describe('each trap at its own peak', () => {
  it.each([
    ['the demo plant', ternQuay()],
    ['a header that loses heat', header([{}, { peakFactor: 5 }, { subcoolingK: 20 }, { discharge: 'continuous' }])],
  ])('stands as the network does with that trap’s load multiplied, all others at theirs: %s', (_name, file) => {
    const average = solved(file, { caseId: '' });
    const own = solved(withCoincidence(file, 'ownPeak'), { caseId: '' });
    expect(own.nodes).toEqual(average.nodes);
    expect(own.pipes).toEqual(average.pipes);
    for (const node of file.nodes) {
      if (node.kind !== 'trap') continue;
      const atPeak = withLoads(file, (id, loadKgS) => (id === node.id ? loadKgS * node.peakFactor : loadKgS));
      const expected = trapOf(solved(atPeak, { caseId: '' }), node.id);
      const trap = trapOf(own, node.id);
      expect(trap.basis).toBe(node.discharge === 'intermittent' ? 'ownPeak' : 'average');
      expect(relativeError(trap.backPressurePa, expected.backPressurePa)).toBeLessThan(1e-9);
      expect(Math.abs(trap.flashPa - expected.flashPa)).toBeLessThan(1e-3);
      const partsPa = trap.receiverPressurePa + trap.staticPa + trap.frictionPa + trap.flashPa;
      expect(Math.abs(partsPa - trap.backPressurePa)).toBeLessThan(1e-5);
    }
  });

  it('judges capacity on the average load all the same', () => {
    const capacity = [{ differentialPa: 1e5, flowKgS: 0.06 }];
    const file = header([{ trapModel: 'M', peakFactor: 2 }], { trapModels: [{ id: 'M', name: 'Model', capacity }] });
    const check = (network: NetworkFile) =>
      trapOf(solved(network), 'T1').checks.find(({ code }) => code === 'capacity');
    expect(check(withCoincidence(file, 'ownPeak'))?.limit).toBe(check(file)?.limit);
  });

  it('is found in a network with meshes too, by solving it whole', () => {
    const second = { id: 'H2', from: 'J', to: 'R', lengthM: 60, insideDiameterM: 0.041 };
    const plain = header([{}, {}]);
    const file = networkFile({ nodes: plain.nodes, pipes: [...plain.pipes, second] });
    const atPeak = withLoads(file, (id, loadKgS) => (id === 'T1' ? 2 * loadKgS : loadKgS));
    const own = trapOf(solved(withCoincidence(file, 'ownPeak')), 'T1');
    expect(relativeError(own.backPressurePa, trapOf(solved(atPeak), 'T1').backPressurePa)).toBeLessThan(1e-6);
  });
});

describe('probable coincidence', () => {
  const backPa = (file: NetworkFile, id = 'T1'): number => trapOf(solved(file), id).backPressurePa;
  // no heat loss: with one enthalpy everywhere a flow is all that a sum of loads changes
  const alike = (traps: readonly object[]): NetworkFile => {
    const file = header(traps);
    return { ...file, pipes: file.pipes.map((pipe) => ({ ...pipe, heatLossWM: 0 })) };
  };

  it.each([
    // one other at its peak half of the time: 95 % of the time it gives up to its peak
    { name: 'two with peak factor 2', traps: [{}, {}], others: 2 },
    // of three others, each at 4 × for a quarter of the time, at most two coincide 95 % of the time (binomial: 0.984; one: 0.844)
    { name: 'four with peak factor 4', traps: Array.from({ length: 4 }, () => ({ peakFactor: 4 })), others: 8 / 3 },
    // a peak for less than a twentieth of the time is not probable, but its average stays
    { name: 'two, the other with peak factor 50', traps: [{ peakFactor: 4 }, { peakFactor: 50 }], others: 1 },
    { name: 'a batch of three', traps: Array.from({ length: 3 }, () => ({ batch: 'retorts' })), others: 2 },
    { name: 'others that discharge continuously', traps: [{}, { discharge: 'continuous', peakFactor: 3 }], others: 1 },
  ])('of $name is the same network at the loads that then flow', ({ traps, others }) => {
    const file = alike(traps);
    const peak = file.nodes[0]?.kind === 'trap' ? file.nodes[0].peakFactor : NaN;
    const then = withLoads(file, (id, loadKgS) => loadKgS * (id === 'T1' ? peak : others));
    const probable = withCoincidence(file, 'probable');
    expect(trapOf(solved(probable), 'T1').basis).toBe('probable');
    expect(relativeError(backPa(probable), backPa(then))).toBeLessThan(1e-9);
  });

  it('is never below the average, and names every trap of the demo plant', () => {
    const average = solved(ternQuay(), { caseId: 'design' });
    const probable = solved(withCoincidence(ternQuay(), 'probable'), { caseId: 'design' });
    for (const trap of probable.traps) {
      expect(trap.backPressurePa).toBeGreaterThanOrEqual(found(average.traps, trap.id).backPressurePa - 1e-6);
      expect(trap.basis).toBe('probable');
    }
  });

  it('is refused by name in a network with meshes', () => {
    const plain = header([{}, {}]);
    const second = { id: 'H2', from: 'J', to: 'R', lengthM: 60, insideDiameterM: 0.041 };
    const file = networkFile({
      nodes: plain.nodes,
      pipes: [...plain.pipes, second],
      method: { coincidence: 'probable' },
    });
    expect(refused(file).errors.map(({ pointer }) => pointer)).toEqual(['/method/coincidence']);
  });
});
