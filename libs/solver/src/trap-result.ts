import type { NetworkFile, TrapModel } from '@riseback/network';
import { bandedChecks } from './banded-checks';
import type { TrapBands } from './bands';
import type { LimitsInForce } from './check-limits';
import type { OwnRun } from './coincidence';
import type { OperatingTrap } from './operating-case';
import type { PressureWalk } from './pressure-walk';
import type { ReturnTree } from './return-tree';
import type { TrapResult } from './solve-result';
import { checkTrap, isolatedUnchecked, type TrapUnderCheck } from './trap-checks';

/** A trap of a solved network. */
export interface SolvedTrap {
  readonly file: NetworkFile;
  readonly tree: ReturnTree;
  readonly walk: PressureWalk;
  readonly limits: LimitsInForce;
  readonly trap: OperatingTrap;
  readonly index: number;
  readonly model: TrapModel | undefined;
  readonly ownRun: OwnRun | undefined;
  readonly bands: TrapBands | undefined;
}

export function trapResult(solved: SolvedTrap): TrapResult {
  const { file, tree, walk, trap, index, ownRun, bands } = solved;
  const { inletPressurePa, liveSteamKgS } = trap;
  const backPressurePa = ownRun?.backPressurePa ?? (walk.pressurePa[index] as number);
  const receiverPressurePa = walk.pressurePa[tree.endOfWalk[index] as number] as number;
  const handStaticPa = walk.handCheckPa[index] as number;
  const { checks, notChecked } = checksOf(solved, backPressurePa);
  const result: TrapResult = {
    id: trap.node.id,
    basis: ownRun?.basis ?? 'average',
    backPressurePa,
    receiverPressurePa,
    staticPa: ownRun?.staticPa ?? (walk.staticPa[index] as number),
    frictionPa: ownRun?.frictionPa ?? (walk.frictionPa[index] as number),
    flashPa: ownRun?.flashPa ?? (walk.flashPa[index] as number),
    differentialPa: inletPressurePa - backPressurePa,
    handCheck: { staticPa: handStaticPa, backPressurePa: receiverPressurePa + handStaticPa },
    walk: idsOfWalk(file, tree, index),
    checks,
    notChecked,
  };
  // most traps have neither, and copying a result once more would cost as much as making it
  if (liveSteamKgS === undefined && bands === undefined) return result;
  return { ...result, ...(liveSteamKgS === undefined ? {} : { liveSteamKgS }), ...bands };
}

function idsOfWalk({ pipes }: NetworkFile, { outPipe, drainsTo }: ReturnTree, start: number): string[] {
  let length = 0;
  for (let node = start; outPipe[node] !== -1; node = drainsTo[node] as number) length++;
  // of its length from the start: grown pipe by pipe, walks would leave behind what they grew out of, and stay longer than they are
  const ids = new Array<string>(length);
  let node = start;
  for (let i = 0; i < length; i++, node = drainsTo[node] as number) {
    ids[i] = (pipes[outPipe[node] as number] as { id: string }).id;
  }
  return ids;
}

function checksOf(
  { file, trap, model, limits, bands }: SolvedTrap,
  backPressurePa: number,
): Pick<TrapResult, 'checks' | 'notChecked'> {
  if (trap.isolated) return { checks: [], notChecked: isolatedUnchecked(trap.node) };
  const { node, inletPressurePa, loadKgS, modulation } = trap;
  const { atmosphericPressurePa } = file.site;
  const at: TrapUnderCheck = {
    trap: node,
    model,
    inletPressurePa,
    backPressurePa,
    loadKgS,
    atmosphericPressurePa,
    limits,
    modulation,
  };
  const { checks, notChecked } = checkTrap(at);
  return { checks: bands === undefined ? checks : bandedChecks(checks, at, bands.credible), notChecked };
}
