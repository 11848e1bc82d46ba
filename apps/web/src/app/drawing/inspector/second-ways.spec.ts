import { fromFile, NetworkFileShape } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { hasSecondWays } from './second-ways';

const trap = (id: string) => ({ id, kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.1 });
const junction = (id: string) => ({ id, kind: 'junction', elevationM: 0 });
const receiver = (id: string) => ({ id, kind: 'receiver', elevationM: 0, vented: true });
const vessel = (id: string) => ({ id, kind: 'flashVessel', elevationM: 0, pressurePa: 2e5 });

function secondWays(nodes: unknown[], ...ways: string[]): boolean {
  const pipes = ways.map((way, i) => {
    const [from, to] = way.split(' ');
    return { id: `L${String(i)}`, from, to, lengthM: 5, insideDiameterM: 0.05 };
  });
  return hasSecondWays(
    fromFile(NetworkFileShape.parse({ format: 'riseback-network', version: 1, name: 'N', nodes, pipes })),
  );
}

describe('second ways down', () => {
  const row = [trap('T1'), junction('J1'), junction('J2'), receiver('R1')];

  it('are not in a tree, nor in one that drains through a flash vessel', () => {
    expect(secondWays(row, 'T1 J1', 'J1 J2', 'J2 R1')).toBe(false);
    const nodes = [trap('T1'), vessel('V1'), trap('T2'), junction('J1'), receiver('R1')];
    expect(secondWays(nodes, 'T1 V1', 'T2 J1', 'V1 J1', 'J1 R1')).toBe(false);
  });

  it('are a loop, pipes side by side, and two receivers that drain one node', () => {
    expect(secondWays(row, 'T1 J1', 'J1 J2', 'J1 R1', 'J2 R1')).toBe(true);
    expect(secondWays(row, 'T1 J1', 'J1 J2', 'J1 J2', 'J2 R1')).toBe(true);
    expect(secondWays([...row, receiver('R2')], 'T1 J1', 'J1 J2', 'J1 R2', 'J2 R1')).toBe(true);
  });

  it('do not count where nothing drains', () => {
    expect(secondWays([...row, junction('J3')], 'T1 R1', 'J1 J2', 'J2 J3', 'J3 J1')).toBe(false);
    expect(secondWays(row)).toBe(false);
  });
});
