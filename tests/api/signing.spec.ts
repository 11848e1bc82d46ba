import { createPublicKey, verify } from 'node:crypto';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { RevisionBench } from './revision-samples';

let bench: RevisionBench;
beforeEach(async () => {
  bench = new RevisionBench();
  await bench.begin();
});
afterEach(() => bench.close());

it('is a signature that another program verifies with the public key alone', async () => {
  const signed = await bench.sign(await bench.submitted());
  expect(signed.state).toBe('approved');
  const [signature] = signed.signatures;
  if (signature === undefined) throw new Error('it was signed');
  const pem = (await bench.server.as('anonymous').get('/api/signing-key').expect(200)).text;
  const key = createPublicKey(pem);
  expect(verify(null, Buffer.from(signature.statement), key, Buffer.from(signature.signature, 'base64'))).toBe(true);
});

it('verifies', async () => {
  const revision = await bench.sign(await bench.submitted());
  expect(await bench.verify(revision)).toMatchObject({ sound: true });
});
