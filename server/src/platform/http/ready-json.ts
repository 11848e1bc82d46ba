import type { Request, Response } from 'express';

/** A body that lies ready, with a tag that any other body would not have. */
export interface ReadyJson {
  readonly json: Buffer;
  readonly etag: string;
}

/** 200 with the body, or 304 without it for a reader that names its tag in If-None-Match. */
export function sendReadyJson(req: Request, res: Response, { json, etag }: ReadyJson): void {
  res.set('ETag', etag);
  if (req.fresh) res.status(304).end();
  else res.type('json').send(json);
}
