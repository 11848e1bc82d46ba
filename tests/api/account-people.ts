import { Secret, TOTP } from 'otpauth';
import request from 'supertest';
import type { Hasher } from '../../server/src/platform/auth/passwords';
import { Client, HOST, type TestServer } from './test-server';

export const PASSWORD = 'four plain words here';
export const MINUTE = 60_000;

/** Notes what is compared and costs nothing: what these tests are about is not how slow bcrypt is. */
export class NotingHasher implements Hasher {
  readonly compared: { readonly text: string; readonly hash: string }[] = [];

  hash(text: string): Promise<string> {
    return Promise.resolve(`noted:${text}`);
  }

  matches(text: string, hash: string): Promise<boolean> {
    this.compared.push({ text, hash });
    return Promise.resolve(hash === `noted:${text}`);
  }
}

/** Ines, whose password is PASSWORD under a NotingHasher, in a session. */
export function addInes(server: TestServer): Client {
  server.addPerson('ines', `noted:${PASSWORD}`);
  return new Client(server, server.session('ines'));
}

export function signIn(server: TestServer, body: object, address = '192.0.2.1'): request.Test {
  return request(server.app.handler)
    .post('/api/session')
    .set('Host', HOST)
    .set('X-Forwarded-For', address)
    .send({ email: 'ines@ternquay.example', password: PASSWORD, ...body });
}

export interface Authenticator {
  readonly secret: string;
  readonly recoveryCodes: readonly string[];
}

/** The six digits by another's reckoning than the server's: otpauth asked for what a telephone shows. */
export function codeAt(secret: string, time: Date): string {
  return new TOTP({ secret: Secret.fromBase32(secret) }).generate({ timestamp: time.getTime() });
}

/** Turns codes on; the code that confirmed is spent, so time moves on past it. */
export async function turnCodesOn(server: TestServer, client: Client, password = PASSWORD): Promise<Authenticator> {
  const begun = await client.post('/api/one-time-codes', { password }).expect(201);
  const { secret } = begun.body as { secret: string };
  const code = codeAt(secret, server.now());
  const confirmed = await client.post('/api/one-time-codes/confirmation', { code }).expect(200);
  server.pass(MINUTE);
  return { secret, ...(confirmed.body as { recoveryCodes: string[] }) };
}
