import type { NetworkFile } from '@riseback/network';
import type { TrapCheck, TrapResult } from '@riseback/solver';
import type { GaugePrediction } from './predicted-at-gauge';

/** A trap's result, as far as its back-pressure limit goes. */
export type MarginTrap = Pick<TrapResult, 'id' | 'backPressurePa' | 'walk'> & {
  readonly checks: readonly (Pick<TrapCheck, 'code' | 'verdict'> & {
    readonly value?: number | undefined;
    readonly limit?: number | undefined;
  })[];
};

/**
 * How far the nearest of the traps whose way passes a gauge is from its back-pressure limit, Pa. The check `backPressureFraction` gives
 * value and limit as shares of the inlet's gauge pressure, so the limit stands at back pressure × limit/value.
 * @returns undefined where no such trap is within its limit
 */
export function leastMarginPa(
  { site: { atmosphericPressurePa } }: Pick<NetworkFile, 'site'>,
  traps: readonly MarginTrap[],
  { below, tap }: GaugePrediction,
): number | undefined {
  const pipe = below[0]?.pipe;
  const node = tap.at === 'node' ? tap.node : undefined;
  const margins = traps.flatMap(({ id, backPressurePa, walk, checks }) => {
    if (id !== node && (pipe === undefined || !walk.includes(pipe))) return [];
    const check = checks.find(({ code }) => code === 'backPressureFraction');
    const { value = 0, limit = 0 } = check ?? {};
    return value <= 0 || limit <= value ? [] : [(limit / value - 1) * (backPressurePa - atmosphericPressurePa)];
  });
  return margins.length === 0 ? undefined : Math.min(...margins);
}
