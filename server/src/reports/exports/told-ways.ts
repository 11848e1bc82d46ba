import type { SolveResult, TrapResult } from '@riseback/contracts';
import { endOfWalk, type ToldWay } from './ledger-tables';
import type { SolvedCase } from './solved-cases';
import type { TableSource } from './table-source';

type WithResult = SolvedCase & { readonly result: SolveResult };

/**
 * The ways whose accounts are told: of each vessel or receiver the trap that stands highest against it in any case, then the traps
 * that were asked for, each in its own highest case.
 */
export function toldWays(source: TableSource, cases: readonly SolvedCase[], wanted: readonly string[]): ToldWay[] {
  const ways = highestOfTraps(cases.filter(hasResult));
  const governing = new Map<string, { readonly way: ToldWay; readonly backPressurePa: number }>();
  for (const { way, trap } of ways.values()) {
    const end = endOfWalk(source, trap);
    const before = governing.get(end);
    if (before === undefined || trap.backPressurePa > before.backPressurePa)
      governing.set(end, { way, backPressurePa: trap.backPressurePa });
  }
  const told = new Map([...governing.values()].map(({ way }) => [way.trapId, way]));
  for (const trapId of wanted) {
    const way = ways.get(trapId)?.way;
    if (way !== undefined) told.set(trapId, way);
  }
  return [...told.values()];
}

interface HighestOfTrap {
  readonly way: ToldWay;
  readonly trap: TrapResult;
}

function highestOfTraps(cases: readonly WithResult[]): Map<string, HighestOfTrap> {
  const highest = new Map<string, HighestOfTrap>();
  for (const solved of cases) {
    for (const trap of solved.result.traps) {
      const before = highest.get(trap.id);
      if (before === undefined || trap.backPressurePa > before.trap.backPressurePa)
        highest.set(trap.id, { way: { trapId: trap.id, solved }, trap });
    }
  }
  return highest;
}

function hasResult(solved: SolvedCase): solved is WithResult {
  return solved.result !== undefined;
}
