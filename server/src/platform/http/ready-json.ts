import { promisify } from 'node:util';
import { gzip } from 'node:zlib';
import type { Request, Response } from 'express';

const pack = promisify(gzip);
/** Less is sent as soon as it is packed. */
const WORTH_PACKING_BYTES = 8 * 1024;

/** A body that lies ready, with a tag that any other body would not have. */
export interface ReadyJson {
  readonly json: Buffer;
  readonly etag: string;
}

/** Made at the first request that takes it, in libuv's threads; the body is kept by whoever made it. */
const packedForms = new WeakMap<ReadyJson, Promise<Buffer>>();

/** 200 with the body, packed for those who take that, or 304 without it for a reader that names its tag in If-None-Match. */
export async function sendReadyJson(req: Request, res: Response, ready: ReadyJson): Promise<void> {
  const packs = ready.json.length > WORTH_PACKING_BYTES && req.acceptsEncodings('gzip') === 'gzip';
  res.vary('Accept-Encoding').set('ETag', packs ? ready.etag.replace(/"$/, '-gzip"') : ready.etag);
  if (req.fresh) {
    res.status(304).end();
    return;
  }
  if (packs) res.set('Content-Encoding', 'gzip');
  res.type('json').send(packs ? await packed(ready) : ready.json);
}

function packed(ready: ReadyJson): Promise<Buffer> {
  const form = packedForms.get(ready) ?? pack(ready.json);
  packedForms.set(ready, form);
  return form;
}
