import type { NetworkFile, TrapModel } from '@riseback/network';
import { bandedChecks } from './banded-checks';
import type { TrapBands } from './bands';
import type { LimitsInForce } from './check-limits';
import type { OwnRun } from './coincidence';
import type { OperatingTrap } from './operating-case';
import type { PressureWalk } from './pressure-walk';
import type { ReturnTree } from './return-tree';
import type { TrapResult } from './solve-result';
import { stepsFrom } from './steps-of-walk';
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
  const stands = ownRun ?? {
    basis: 'average',
    backPressurePa: walk.pressurePa[index] as number,
    staticPa: walk.staticPa[index] as number,
    frictionPa: walk.frictionPa[index] as number,
    flashPa: walk.flashPa[index] as number,
  };
  const { basis, backPressurePa, staticPa, frictionPa, flashPa } = stands;
  const receiverPressurePa = walk.pressurePa[tree.endOfWalk[index] as number] as number;
  const handStaticPa = walk.handCheckPa[index] as number;
  return {
    id: trap.node.id,
    basis,
    backPressurePa,
    receiverPressurePa,
    staticPa,
    frictionPa,
    flashPa,
    differentialPa: inletPressurePa - backPressurePa,
    handCheck: { staticPa: handStaticPa, backPressurePa: receiverPressurePa + handStaticPa },
    ...(liveSteamKgS === undefined ? {} : { liveSteamKgS }),
    ...bands,
    walk: stepsFrom(tree, index).map(({ pipe }) => (file.pipes[pipe] as { id: string }).id),
    ...checksOf(solved, backPressurePa),
  };
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
    ...(modulation === undefined ? {} : { modulation }),
  };
  const { checks, notChecked } = checkTrap(at);
  return { checks: bands === undefined ? checks : bandedChecks(checks, at, bands.credible), notChecked };
}
