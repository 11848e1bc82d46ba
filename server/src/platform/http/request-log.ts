import { randomUUID } from 'node:crypto';
import type { RequestHandler } from 'express';
import { pinoHttp } from 'pino-http';
import type { Log } from '../log';

/** One line a request, with the id that its answer carries. No query, header, cookie or body: they may hold secrets. */
export function requestLog(log: Log): RequestHandler {
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
    customSuccessObject: (req, res, object: { ms?: number }) => ({
      ms: object.ms,
      method: req.method,
      path: pathOf(req.url),
      status: res.statusCode,
    }),
    customErrorObject: (req, res, _error, object: { ms?: number }) => ({
      ms: object.ms,
      method: req.method,
      path: pathOf(req.url),
      status: res.statusCode,
    }),
    customSuccessMessage: () => 'request',
    customErrorMessage: () => 'request',
    // A 5xx is logged as an error by the problem handler, with its cause.
    customLogLevel: () => 'info',
  });
}

function pathOf(url: string | undefined): string {
  return (url ?? '').split('?', 1)[0] ?? '';
}
