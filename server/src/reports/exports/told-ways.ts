import type { SolveResult, TrapResult } from '@riseback/contracts';
import { headersOf } from './headers';
import type { ToldWay } from './ledger-tables';
import type { SolvedCase } from './solved-cases';

type WithResult = SolvedCase & { readonly result: SolveResult };

/**
 * The ways whose accounts are told: of each header the trap that stands highest in any case, then the traps that were asked for, each in
 * its own highest case.
 */
export function toldWays(cases: readonly SolvedCase[], wanted: readonly string[]): ToldWay[] {
  const highest = highestOfTraps(cases.filter(hasResult));
  const headers = headersOf([...highest.values()].map(({ trap }) => ({ trapId: trap.id, walk: trap.walk })));
  const governing = new Map<string, HighestOfTrap>();
  for (const each of highest.values()) {
    const header = headers.get(each.trap.id) ?? '';
    const before = governing.get(header);
    if (before === undefined || each.trap.backPressurePa > before.trap.backPressurePa) governing.set(header, each);
  }
  const told = new Map([...governing.values()].map(({ way }) => [way.trapId, way]));
  for (const trapId of wanted) {
    const way = highest.get(trapId)?.way;
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
