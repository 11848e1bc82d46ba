import type { TrapResult } from '@riseback/contracts';
import { worstVerdict } from '../results/verdict';

/** A trap that fails tells most; else one to watch; else the first. */
export function trapToShow(traps: Iterable<TrapResult>): { readonly id: string; readonly fails: boolean } | null {
  const judged = [...traps].map(({ id, checks }) => ({ id, verdict: worstVerdict(checks) }));
  const found =
    judged.find(({ verdict }) => verdict === 'fail') ?? judged.find(({ verdict }) => verdict === 'watch') ?? judged[0];
  return found === undefined ? null : { id: found.id, fails: found.verdict === 'fail' };
}
