import { CHOKED_PRESSURE_RATIO, napierOrificeFlowKgS, orificeSteamFlowKgS } from '@riseback/hydraulics';
import { readNetworkFile, type NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { isRefusal, solveNetwork, type SolveResult, type TrapResult } from './index';

const ORIFICE_M = 0.006;
const INLET_PA = 5e5;

/** Traps on one junction and a line to the receiver whose bore decides how much the steam is held back. */
function plant(boreM: number, open: readonly object[], traps = 2): NetworkFile {
  const ids = Array.from({ length: traps }, (_, i) => `T${String(i + 1)}`);
  const read = readNetworkFile({
    format: 'riseback-network',
    version: 1,
    name: 'Open traps',
    nodes: [
      ...ids.map((id) => ({ id, kind: 'trap', elevationM: 0, inletPressurePa: INLET_PA, loadKgS: 0.02 })),
      { id: 'J', kind: 'junction', elevationM: 0 },
      { id: 'R', kind: 'receiver', elevationM: 0, pressurePa: 1.2e5 },
    ],
    pipes: [
      ...ids.map((id) => ({ id: `L${id}`, from: id, to: 'J', lengthM: 2, insideDiameterM: 0.04 })),
      { id: 'L', from: 'J', to: 'R', lengthM: 30, insideDiameterM: boreM },
    ],
    cases: [{ id: 'open', name: 'Open', overrides: open }],
  });
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

const open = (node: string, more: object = { orificeDiameterM: ORIFICE_M }): object => ({
  node,
  state: 'failedOpen',
  ...more,
});

function solve(file: NetworkFile, caseId = 'open'): SolveResult {
  const outcome = solveNetwork(file, { partial: false, caseId });
  if (isRefusal(outcome)) throw new Error(outcome.problem.detail);
  return outcome;
}

const trap = (result: SolveResult, id: string): TrapResult => {
  const it = result.traps.find((candidate) => candidate.id === id);
  if (it === undefined) throw new Error(`no trap ${id}`);
  return it;
};

describe('a trap that has failed open', () => {
  it('passes Napier’s flow of its orifice where the return does not hold it back, with the heat of saturated steam', () => {
    const result = solve(plant(0.1, [open('T1')]));
    const { liveSteamKgS = NaN, backPressurePa } = trap(result, 'T1');
    expect(backPressurePa).toBeLessThan(CHOKED_PRESSURE_RATIO * INLET_PA);
    expect(liveSteamKgS).toBe(napierOrificeFlowKgS(INLET_PA, ORIFICE_M));
    const { liquidEnthalpyJKg, vapourEnthalpyJKg } = saturationState(INLET_PA);
    const mixed = (0.02 * liquidEnthalpyJKg + liveSteamKgS * vapourEnthalpyJKg) / (0.02 + liveSteamKgS);
    const node = result.nodes.find(({ id }) => id === 'T1');
    expect(relativeError(node?.enthalpyJKg ?? NaN, mixed)).toBeLessThan(1e-12);
    expect(relativeError(node?.massFlowKgS ?? NaN, 0.02 + liveSteamKgS)).toBeLessThan(1e-12);
    expect(trap(result, 'T2').liveSteamKgS).toBeUndefined();
  });

  it.each([1, 2, 3])('passes against the back pressure that it makes, %i of them on one narrow line', (count) => {
    const traps = ['T1', 'T2', 'T3'].slice(0, count);
    const result = solve(
      plant(
        0.015,
        traps.map((id) => open(id)),
        3,
      ),
    );
    for (const id of traps) {
      const { backPressurePa, liveSteamKgS = NaN } = trap(result, id);
      expect(backPressurePa).toBeGreaterThan(CHOKED_PRESSURE_RATIO * INLET_PA);
      expect(backPressurePa).toBeLessThan(INLET_PA);
      const passes = orificeSteamFlowKgS(INLET_PA, backPressurePa, ORIFICE_M);
      expect(Math.abs(liveSteamKgS - passes)).toBeLessThan(2e-6 * napierOrificeFlowKgS(INLET_PA, ORIFICE_M));
    }
  });

  it('passes nothing where the return stands above its inlet already', () => {
    const result = solve(plant(0.004, [open('T1')]));
    expect(trap(result, 'T1').backPressurePa).toBeGreaterThan(INLET_PA);
    expect(trap(result, 'T1').liveSteamKgS).toBe(0);
  });

  it('says how much it blows, and takes the orifice of its override before that of its model', () => {
    const base = plant(0.1, [open('T1')]);
    const model = { id: 'M', name: 'Model', orificeDiameterM: 0.003 };
    const nodes = base.nodes.map((node) => (node.kind === 'trap' ? { ...node, trapModel: 'M' } : node));
    const file = { ...base, nodes, trapModels: [model] };
    const finding = solve(file).warnings.find(({ code }) => code === 'failedOpen');
    expect(finding).toMatchObject({ element: 'T1', value: napierOrificeFlowKgS(INLET_PA, ORIFICE_M) });
    const byModel = { ...file, cases: plant(0.1, [open('T1', {})]).cases };
    expect(trap(solve(byModel), 'T1').liveSteamKgS).toBe(napierOrificeFlowKgS(INLET_PA, 0.003));
  });

  it.each([true, false])('is refused by name where no orifice is known (live solve: %s)', (partial) => {
    const outcome = solveNetwork(plant(0.1, [open('T2', {})]), { partial, caseId: 'open' });
    if (!isRefusal(outcome)) throw new Error('not refused');
    expect(outcome.problem.errors.map(({ pointer }) => pointer)).toEqual(['/cases/0/overrides/0']);
    expect(outcome.problem.detail).toMatch(/T2 .*orificeDiameterM/);
  });
});
