import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { RequestHandler } from 'express';
import { pinoHttp } from 'pino-http';
import type { Log } from '../log';

/** Answers that say whom something was kept from. */
const REFUSALS = [403, 404];

/**
 * One line a request, with the id that its answer carries. No query, header, cookie or body: they may hold secrets.
 * @param personOf whose session the request came with; a refusal's line says it
 */
export function requestLog(log: Log, personOf: (req: IncomingMessage) => string | undefined): RequestHandler {
  const line = (req: IncomingMessage, res: ServerResponse, { ms }: { ms?: number }) => {
    const person = REFUSALS.includes(res.statusCode) ? personOf(req) : undefined;
    return {
      ...{ ms, method: req.method, path: pathOf(req.url), status: res.statusCode },
      ...(person === undefined ? {} : { person }),
    };
  };
  return pinoHttp({
    logger: log,
    genReqId: (_req, res) => {
      // Ours, never the client's: an id chosen outside could hide one request behind another.
      const id = randomUUID();
      res.setHeader('X-Request-Id', id);
      return id;
    },
    quietReqLogger: true,
    quietResLogger: true,
    customAttributeKeys: { reqId: 'id', responseTime: 'ms' },
    customSuccessObject: (req, res, object: { ms?: number }) => line(req, res, object),
    customErrorObject: (req, res, _error, object: { ms?: number }) => line(req, res, object),
    customSuccessMessage: () => 'request',
    customErrorMessage: () => 'request',
    // A 5xx is logged as an error by the problem handler, with its cause.
    customLogLevel: () => 'info',
  });
}

function pathOf(url: string | undefined): string {
  return (url ?? '').split('?', 1)[0] ?? '';
}
