import type { TrapResult } from '@riseback/contracts';
import type { NetworkFile } from '@riseback/network';
import { liftProfileBands, type ProfileBand, type SolveResult } from '@riseback/solver';

/** Apart by more than this, the bands along the way are not the ones that the trap's result tells, Pa. */
const SAME_PA = 50;

/**
 * The bands along a trap's way, where they lead to the bands that its result tells: not where flows divide otherwise by each method,
 * nor for a trap whose numbers are for another discharge than the pipes'.
 */
export function bandsAlong(
  file: NetworkFile,
  result: SolveResult,
  { id, spread, credible }: TrapResult,
): readonly ProfileBand[] | undefined {
  if (spread === undefined || credible === undefined) return undefined;
  const bands = liftProfileBands(file, result, id);
  const atTrap = bands?.[0];
  if (atTrap === undefined) return undefined;
  const apart = [
    atTrap.spreadLowPa - spread.lowPa,
    atTrap.spreadHighPa - spread.highPa,
    atTrap.credibleLowPa - credible.lowPa,
    atTrap.credibleHighPa - credible.highPa,
  ];
  return apart.every((pa) => Math.abs(pa) < SAME_PA) ? bands : undefined;
}
