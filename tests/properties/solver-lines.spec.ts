import { isRefusal, solveNetwork } from '@riseback/solver';
import { describe, expect, it } from 'vitest';
import { found, networkFile, refused, solved, trapOf } from '../fixtures/solver/small-networks';

describe('a level line that begins to flash', () => {
  // Hotter and hotter condensate through x = 0 to 0.01: where liquid turns to a little flash the line must not seem to get cheaper
  // all at once. From common sense of the method: no published figure.
  it('shows no collapse of its pressure drop', () => {
    const drops: number[] = [];
    for (let subcoolingK = 8; subcoolingK >= 0; subcoolingK -= 0.05) {
      const file = networkFile({
        nodes: [
          { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 121_000, loadKgS: 0.5, subcoolingK },
          { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: 101_325 },
        ],
        pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 20, size: { nps: '1-1/4', schedule: '40' } }],
      });
      const result = solved(file);
      expect(found(result.nodes, 'R1').quality).toBeLessThan(0.012);
      drops.push(trapOf(result, 'T1').backPressurePa - 101_325);
    }
    for (const [i, drop] of drops.entries()) {
      // the next hotter condensate, 0.05 K on, never costs less than 97 % of this
      expect(drops[i + 1] ?? drop).toBeGreaterThan(0.97 * drop);
    }
  });
});

describe('2,000 pipes in one line', () => {
  const line = (count: number) => {
    const nodes: object[] = [{ id: 'R', kind: 'receiver', elevationM: 0, vented: true }];
    const pipes: object[] = [];
    for (let i = 0; i < count; i++) {
      const last = i === count - 1;
      nodes.push(
        last
          ? { id: `N${i}`, kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.02 }
          : { id: `N${i}`, kind: 'junction', elevationM: 0 },
      );
      pipes.push({ id: `L${i}`, from: `N${i}`, to: i === 0 ? 'R' : `N${i - 1}`, lengthM: 1, insideDiameterM: 0.08 });
    }
    return networkFile({ nodes, pipes });
  };

  it('neither overflow nor lose a pipe of the walk', () => {
    const result = solved(line(2000));
    expect(trapOf(result, 'N1999').walk.length).toBe(2000);
  });

  it('take no more than linear time', () => {
    const timed = (count: number): number => {
      const file = line(count);
      const times = Array.from({ length: 6 }, () => {
        // processor time: what else runs on the machine does not count
        const start = process.cpuUsage();
        solved(file);
        return process.cpuUsage(start).user;
      });
      return Math.min(...times);
    };
    timed(2000);
    // eight times the pipes; quadratic time would be 64 times, and memory may cost the longer line a factor of two and a half
    expect(timed(16_000) / timed(2000)).toBeLessThan(20);
  });
});

describe('networks that cannot be solved', () => {
  const receiver = { id: 'R1', kind: 'receiver', elevationM: 5, vented: true };
  const trap = { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.02 };
  const riser = { id: 'L1', from: 'T1', to: 'R1', lengthM: 6, insideDiameterM: 0.03 };
  const pointers = (drawn: { nodes: object[]; pipes: object[] }) =>
    refused(networkFile(drawn)).errors.map(({ pointer }) => pointer);

  it('name a cut-off element', () => {
    const nodes = [receiver, trap, { ...trap, id: 'T2' }];
    expect(pointers({ nodes, pipes: [riser] })).toEqual(['/nodes/2']);
  });

  it('name a zero-length pipe', () => {
    expect(pointers({ nodes: [receiver, trap], pipes: [{ ...riser, lengthM: 0 }] })).toEqual(['/pipes/0/lengthM']);
  });

  it('name a pipe shorter than its rise', () => {
    expect(pointers({ nodes: [receiver, trap], pipes: [{ ...riser, lengthM: 4 }] })).toEqual(['/pipes/0/lengthM']);
  });

  it('name an unknown pipe size', () => {
    const pipe = { id: 'L1', from: 'T1', to: 'R1', lengthM: 6, size: { nps: '7', schedule: '40' } };
    expect(pointers({ nodes: [receiver, trap], pipes: [pipe] })).toEqual(['/pipes/0/size']);
  });

  it('name a roughness that fills the bore', () => {
    const pipe = { ...riser, insideDiameterM: 0.004, roughnessM: 0.003 };
    expect(pointers({ nodes: [receiver, trap], pipes: [pipe] })).toEqual(['/pipes/0/roughnessM']);
  });

  it('leave out, in a live solve, what reaches no receiver, and list it', () => {
    const lost = { ...trap, id: 'T2' };
    const stub = { id: 'L2', from: 'T2', to: 'J9', lengthM: 2, insideDiameterM: 0.03 };
    const nodes = [receiver, trap, lost, { id: 'J9', kind: 'junction', elevationM: 0 }];
    const outcome = solveNetwork(networkFile({ nodes, pipes: [riser, stub] }), { partial: true });
    if (isRefusal(outcome)) throw new Error('refused');
    expect(outcome.partial).toBe(true);
    expect(outcome.leftOut).toEqual(['T2', 'J9', 'L2']);
    expect(outcome.traps.map(({ id }) => id)).toEqual(['T1']);
  });

  it('name the element and the value where computing finds no solution', () => {
    const small = { ...riser, lengthM: 5000, insideDiameterM: 0.004 };
    const outcome = solveNetwork(networkFile({ nodes: [receiver, { ...trap, loadKgS: 0.5 }], pipes: [small] }), {
      partial: false,
    });
    if (isRefusal(outcome)) throw new Error('refused');
    expect(outcome.converged).toBe(false);
    expect(outcome.problem?.errors[0]?.pointer).toBe('/pipes/0');
    expect(outcome.problem?.detail).toMatch(/L1.*pressure.*10000000/);
  });
});
