import express, { type Request, type Response } from 'express';
import { badRequest, payloadTooLarge, type ProblemError, unsupportedMediaType } from '../problem';
import { findSyntaxError } from './json-syntax';

/** body-parser's own errors carry these. */
interface BodyParserError {
  readonly type: string;
  readonly body?: string;
}

/**
 * The JSON body of a request, read only after its access rule has passed, so that nobody can make the server read 32 MB
 * without a right to send them.
 * @throws ProblemError 400 not JSON, 413 over the limit, 415 another kind of content
 */
export async function readJsonBody(req: Request, res: Response, limitBytes: number): Promise<unknown> {
  const hasBody = req.headers['content-length'] !== undefined || req.headers['transfer-encoding'] !== undefined;
  const isJson = Boolean(req.is(['application/json', 'application/*+json']));
  if (hasBody && req.headers['content-length'] !== '0' && !isJson) {
    throw unsupportedMediaType('Send the body as JSON, with the header Content-Type: application/json.');
  }
  await new Promise<void>((resolve, reject) => {
    // `strict: false`: a bare number is JSON; saying what is expected instead is the schema's business.
    const read = express.json({ limit: limitBytes, strict: false, type: () => true });
    read(req, res, (error?: unknown) => {
      if (error === undefined) resolve();
      else reject(isBodyParserError(error) ? problemOfBody(error, limitBytes) : (error as Error));
    });
  });
  return req.body as unknown;
}

function isBodyParserError(error: unknown): error is BodyParserError {
  return error instanceof Error && 'type' in error && typeof error.type === 'string';
}

function problemOfBody(error: BodyParserError, limitBytes: number): ProblemError {
  switch (error.type) {
    case 'entity.too.large':
      return payloadTooLarge(`The body may hold ${String(limitBytes / (1024 * 1024))} MB at most.`);
    case 'encoding.unsupported':
    case 'charset.unsupported':
      return unsupportedMediaType('Send the body as UTF-8, plain or compressed with gzip.');
    case 'entity.parse.failed': {
      const place = findSyntaxError(error.body ?? '');
      const where =
        place === undefined ? '' : `: the mistake is at line ${String(place.line)}, column ${String(place.column)}`;
      return badRequest(`The body is not JSON${where}.`, [{ pointer: '', detail: `not JSON${where}` }]);
    }
    default:
      return badRequest('The body did not arrive whole.');
  }
}
