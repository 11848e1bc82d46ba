import type { ErrorRequestHandler, Request, Response } from 'express';
import type { Problem } from '@riseback/contracts';
import type { Log } from '../log';
import { badRequest, problemOf, ProblemError, unavailable } from '../problem';

/**
 * Turns whatever a request ended with into a problem object. Only a ProblemError's own words leave the server: a stack,
 * a statement or a path of ours helps nobody but an attacker, so the rest goes to the log under the request's id.
 */
export function problemHandler(log: Log): ErrorRequestHandler {
  return (error: unknown, req, res, next) => {
    if (res.headersSent) {
      next(error);
      return;
    }
    const known = knownProblem(error);
    if (known === undefined) log.error({ id: req.id, err: error }, 'request failed');
    else if (known.problem.status >= 500) log.error({ id: req.id, err: error }, known.problem.title);
    sendProblem(
      req,
      res,
      known ??
        new ProblemError(
          problemOf(
            'internal',
            'The fault is ours. Give the administrator the number below; it finds the cause in the log.',
          ),
        ),
    );
  };
}

export function sendProblem(req: Request, res: Response, error: ProblemError): void {
  const problem: Problem = { ...error.problem, instance: `/requests/${String(req.id)}` };
  res.status(problem.status).set(error.headers).set('Cache-Control', 'no-store').type('application/problem+json');
  res.send(JSON.stringify(problem));
}

function knownProblem(error: unknown): ProblemError | undefined {
  if (error instanceof ProblemError) return error;
  // The router's own: a path that cannot be decoded, such as /api/%
  if (error instanceof URIError) return badRequest('The address is not correctly encoded.');
  if (
    isSqliteError(error) &&
    ['SQLITE_FULL', 'SQLITE_IOERR', 'SQLITE_READONLY', 'SQLITE_BUSY'].some((code) => error.code.startsWith(code))
  ) {
    return unavailable('Nothing can be saved at the moment. What you sent was not stored; try again later.');
  }
  return undefined;
}

function isSqliteError(error: unknown): error is Error & { code: string } {
  return (
    error instanceof Error && 'code' in error && typeof error.code === 'string' && error.code.startsWith('SQLITE_')
  );
}
