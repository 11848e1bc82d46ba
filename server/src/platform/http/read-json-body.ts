import express, { type Request, type RequestHandler, type Response } from 'express';
import { badRequest, payloadTooLarge, type ProblemError, unsupportedMediaType } from '../problem';
import type { UploadRule } from '../routes/route-table';
import { notJson } from './json-text';

/** body-parser's own errors carry these. */
interface BodyParserError {
  readonly type: string;
  readonly body?: string;
}

/**
 * The JSON body of a request, read only after its access rule has passed, so that nobody can make the server read a network file
 * without a right to send them.
 * @throws ProblemError 400 not JSON, 413 over the limit, 415 another kind of content
 */
export async function readJsonBody(req: Request, res: Response, limitBytes: number): Promise<unknown> {
  demandJson(req);
  // `strict: false`: a bare number is JSON; saying what is expected instead is the schema's business.
  return read(req, res, express.json({ limit: limitBytes, strict: false, type: () => true }), limitBytes);
}

/** As `readJsonBody`, but unpacked only: whoever gets it reads it where that holds up nobody. */
export async function readBodyBytes(req: Request, res: Response, limitBytes: number): Promise<Uint8Array> {
  demandJson(req);
  const charset = /;\s*charset\s*=\s*"?([^";\s]+)/i.exec(req.get('content-type') ?? '')?.[1];
  if (charset !== undefined && charset.toLowerCase() !== 'utf-8') throw notUtf8();
  const body = await read(req, res, express.raw({ limit: limitBytes, type: () => true }), limitBytes);
  return body instanceof Uint8Array ? body : new Uint8Array();
}

/** A body that is no JSON. `declared` is the one of `types` that its header says; what the bytes are is the handler's to find out. */
export interface UploadedBytes {
  readonly bytes: Uint8Array;
  readonly declared: string;
}

/** The bytes of an upload of one of the types. @throws ProblemError 413 over the limit, 415 another kind of content */
export async function readUpload(
  req: Request,
  res: Response,
  { types, limitBytes }: UploadRule,
): Promise<UploadedBytes> {
  const declared = req.is([...types]);
  if (hasBody(req) && typeof declared !== 'string') {
    throw unsupportedMediaType(`Send the file as it is, with the header Content-Type: ${types.join(' or ')}.`);
  }
  const body = await read(req, res, express.raw({ limit: limitBytes, type: () => true }), limitBytes);
  return { bytes: body instanceof Uint8Array ? body : new Uint8Array(), declared: declared || '' };
}

function hasBody(req: Request): boolean {
  const sends = req.headers['content-length'] !== undefined || req.headers['transfer-encoding'] !== undefined;
  return sends && req.headers['content-length'] !== '0';
}

function demandJson(req: Request): void {
  const isJson = Boolean(req.is(['application/json', 'application/*+json']));
  if (hasBody(req) && !isJson) {
    throw unsupportedMediaType('Send the body as JSON, with the header Content-Type: application/json.');
  }
}

async function read(req: Request, res: Response, parser: RequestHandler, limitBytes: number): Promise<unknown> {
  await new Promise<void>((resolve, reject) => {
    void parser(req, res, (error?: unknown) => {
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
      return notUtf8();
    case 'entity.parse.failed':
      return notJson(error.body ?? '');
    default:
      return badRequest('The body did not arrive whole.');
  }
}

function notUtf8(): ProblemError {
  return unsupportedMediaType('Send the body as UTF-8, plain or compressed with gzip.');
}
