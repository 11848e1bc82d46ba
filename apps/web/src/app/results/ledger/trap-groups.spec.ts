import type { SolveResult, TrapResult, Verdict } from '@riseback/contracts';
import { fromFile, NetworkFileShape } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { groupTraps, trapOfElement } from './trap-groups';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const trapNode = (id: string, tag: string) => ({
  id,
  tag,
  kind: 'trap',
  elevationM: 0,
  inletPressurePa: 6e5,
  loadKgS: 0.05,
});
const pipe = (id: string, from: string, to: string) => ({ id, from, to, lengthM: 5, insideDiameterM: 0.02 });

/** Three traps to a vessel, one of them against its pipe's arrow, one to a vented receiver, one to nowhere. */
const document = fromFile(
  NetworkFileShape.parse({
    format: 'riseback-network',
    version: 1,
    name: 'Two ways',
    nodes: [
      { id: 'R', kind: 'receiver', tag: 'VR-1', elevationM: 0, vented: true },
      { id: 'V', kind: 'flashVessel', tag: 'FV-1', elevationM: 0, pressurePa: 204_746 },
      trapNode('A', 'TR-10'),
      trapNode('B', 'TR-9'),
      trapNode('C', 'TR-1'),
      trapNode('D', 'TR-2'),
      trapNode('E', 'TR-3'),
    ],
    pipes: [pipe('LA', 'A', 'V'), pipe('LB', 'V', 'B'), pipe('LC', 'C', 'V'), pipe('LD', 'D', 'R')],
  }),
);

const result = (id: string, verdict: Verdict | null, backPressurePa: number, walk: string): TrapResult => ({
  id,
  backPressurePa,
  receiverPressurePa: walk === 'LD' ? 101_325 : 204_746,
  staticPa: 0,
  frictionPa: 0,
  flashPa: 0,
  differentialPa: 6e5 - backPressurePa,
  handCheck: { staticPa: 0, backPressurePa },
  walk: [walk],
  checks: verdict === null ? [] : [{ code: 'differential', verdict, message: '', text: [] }],
  notChecked: [],
});
const solved: SolveResult = {
  case: '',
  converged: true,
  iterations: 1,
  nodes: [],
  pipes: [],
  warnings: [],
  traps: [
    result('A', 'pass', 3e5, 'LA'),
    result('B', 'pass', 3e5, 'LB'),
    result('C', 'fail', 2.1e5, 'LC'),
    result('D', null, 7e5, 'LD'),
  ],
};

describe('groupTraps', () => {
  const grouped = groupTraps(document, solved, units);

  it('groups by where the way ends, whatever way the arrows point, and says what stands there', () => {
    expect(grouped.groups.map(({ title, traps }) => [title, traps.map(({ tag }) => tag)])).toEqual([
      ['To receiver VR-1, vented', ['TR-2']],
      ['To flash vessel FV-1, 15.0 psig', ['TR-1', 'TR-9', 'TR-10']],
    ]);
  });

  it('puts the worst first and knows the one that governs', () => {
    expect(grouped.governing?.tag).toBe('TR-1');
    expect(grouped.groups[1]?.traps.map(({ status }) => status)).toEqual(['fail', 'pass', 'pass']);
  });

  it('keeps traps without a result apart, and one scale for all', () => {
    expect(grouped.unsolved.map(({ id }) => id)).toEqual(['E']);
    expect(grouped.scaleMaximumPa).toBe(7e5);
  });

  it('finds the trap that an element leads to', () => {
    expect(trapOfElement(document, grouped, 'A')?.id).toBe('A');
    expect(trapOfElement(document, grouped, 'LB')?.id).toBe('B');
    expect(trapOfElement(document, grouped, 'V')?.id).toBe('C');
    expect(trapOfElement(document, grouped, 'E')).toBeNull();
  });
});
