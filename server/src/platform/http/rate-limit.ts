import type { RequestHandler } from 'express';
import { ipKeyGenerator } from 'express-rate-limit';
import type { SessionGate } from '../auth/session-gate';
import { tooManyRequests } from '../problem';

/** All but /healthz, which costs nothing and must answer whoever supervises the process. */
export const RATE_LIMITED = ['/api', '/readyz'];

const WINDOW_MS = 60_000;
/** Someone not signed in has little to ask for. */
const ANONYMOUS_SHARE = 0.1;
/** Beyond this many in a minute, newcomers are counted together: a flood of addresses must not eat the memory. */
const MOST_KEYS = 100_000;
const NEWCOMERS = 'newcomers';

/**
 * A stop for runaway scripts, not for people: `perMinute` requests a minute for each session, a tenth of that for each
 * address without one. Guessing passwords has a guard of its own. Counted here rather than by a package's promises, which cost a
 * tenth of all that a small read takes.
 */
export function apiRateLimit(perMinute: number, gate: SessionGate): RequestHandler {
  const counts = new Map<string, number>();
  let endsAt = 0;
  return (req, res, next) => {
    const now = performance.now();
    if (now >= endsAt) {
      counts.clear();
      endsAt = now + WINDOW_MS;
    }
    const sessionId = gate.identify(req, res)?.sessionId;
    const asked = sessionId ?? ipKeyGenerator(req.ip ?? '');
    const key = counts.has(asked) || counts.size < MOST_KEYS ? asked : NEWCOMERS;
    const count = (counts.get(key) ?? 0) + 1;
    counts.set(key, count);
    const most = sessionId === undefined ? Math.ceil(perMinute * ANONYMOUS_SHARE) : perMinute;
    if (count <= most) next();
    else next(tooManyRequests('Too many requests in a minute. Wait a little, then go on.', (endsAt - now) / 1000));
  };
}
