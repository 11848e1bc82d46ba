import type { RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import type { SessionGate } from '../auth/session-gate';
import { tooManyRequests } from '../problem';

/** All but /healthz, which costs nothing and must answer whoever supervises the process. */
export const RATE_LIMITED = ['/api', '/readyz'];

const WINDOW_MS = 60_000;
/** Someone not signed in has little to ask for. */
const ANONYMOUS_SHARE = 0.1;

/**
 * A stop for runaway scripts, not for people: `perMinute` requests a minute for each session, a tenth of that for each
 * address without one. Guessing passwords has a guard of its own.
 */
export function apiRateLimit(perMinute: number, gate: SessionGate): RequestHandler {
  return rateLimit({
    windowMs: WINDOW_MS,
    limit: (req, res) => (gate.identify(req, res) === undefined ? Math.ceil(perMinute * ANONYMOUS_SHARE) : perMinute),
    keyGenerator: (req, res) => gate.identify(req, res)?.sessionId ?? ipKeyGenerator(req.ip ?? ''),
    standardHeaders: false,
    legacyHeaders: false,
    // It would print its advice to the console; the settings it checks are ours to test.
    validate: false,
    handler: (_req, _res, next) => {
      next(tooManyRequests('Too many requests in a minute. Wait a little, then go on.', WINDOW_MS / 1000));
    },
  });
}
