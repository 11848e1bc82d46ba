import { drawnNetwork } from '@riseback/figures';
import { fromFile, NetworkFileShape } from '@riseback/network';
import { compareNetworks, compareSolves } from '@riseback/revisions';
import { describe, expect, it } from 'vitest';
import { changesAt, goneElements } from './changes-at';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const trap = { id: 'T1', kind: 'trap', tag: 'TR-101', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 };
const receiver = { id: 'R1', kind: 'receiver', tag: 'VR-1', elevationM: 3, vented: true };
const pipe = { id: 'L1', tag: 'CR-1', from: 'T1', to: 'R1', lengthM: 6, insideDiameterM: 0.03 };
const file = (changes: object = {}) =>
  NetworkFileShape.parse({
    format: 'riseback-network',
    version: 1,
    name: 'Small',
    nodes: [trap, receiver],
    pipes: [pipe],
    cases: [{ id: 'design', name: 'Design' }],
    ...changes,
  });
const result = (backPressurePa: number, verdict: 'pass' | 'fail') => ({
  converged: true,
  traps: [{ id: 'T1', backPressurePa, differentialPa: 1e5, checks: [{ verdict }] }],
  warnings: [],
});

describe('what is otherwise at an element of the drawing', () => {
  it('says what was changed, in short and to be read out', () => {
    const after = file({
      nodes: [{ ...trap, loadKgS: 0.06, elevationM: 1, position: { x: 5, y: 5 } }, receiver],
      pipes: [pipe, { ...pipe, id: 'L2', tag: 'CR-2' }],
    });
    const changes = changesAt(compareNetworks(file(), after), null, units);
    expect(changes.get('T1')).toMatchObject({
      kind: 'changed',
      words: 'elevation +2',
      spoken: 'changed: elevation, load, moved',
    });
    expect(changes.get('L2')).toMatchObject({ kind: 'added', words: 'added', spoken: 'added' });
    expect(changes.has('L1')).toBe(false);
  });

  it('counts what a case sets to the element it sets it at', () => {
    const after = file({
      cases: [{ id: 'design', name: 'Design', overrides: [{ node: 'T1', state: 'failedOpen' }] }],
    });
    expect(changesAt(compareNetworks(file(), after), null, units).get('T1')).toMatchObject({
      kind: 'changed',
      words: 'state',
    });
  });

  it('marks a trap that nobody touched by how far it moved, and by the verdict it had', () => {
    // 2 psi = 13,789.5 Pa
    const effects = compareSolves(result(3e5, 'fail'), result(3e5 - 13_789.5, 'pass'));
    expect(changesAt(compareNetworks(file(), file()), effects, units).get('T1')).toEqual({
      kind: null,
      words: '',
      change: '−2.0',
      way: 'down',
      spoken: 'back pressure down by 2.0 psi, fail before',
    });
    const still = compareSolves(result(3e5, 'pass'), result(3e5 + 100, 'pass'));
    expect(changesAt(compareNetworks(file(), file()), still, units).size).toBe(0);
  });

  it('knows what is there no more by its tag', () => {
    const before = file({ pipes: [pipe, { ...pipe, id: 'L2', tag: 'CR-2' }] });
    expect(goneElements(compareNetworks(before, file()), drawnNetwork(fromFile(before)))).toEqual([
      { id: 'L2', name: 'CR-2', kind: 'pipe' },
    ]);
  });
});
