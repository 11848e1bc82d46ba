import { createHmac, createSecretKey, hkdfSync, timingSafeEqual, type KeyObject } from 'node:crypto';
import jwt from 'jsonwebtoken';
import * as z from 'zod';

const AUDIENCE = 'riseback-session';
/** Named again at verification: a token must not choose its own algorithm. */
const ALGORITHM = 'HS256';

const Claims = z.object({ sid: z.string(), iat: z.number(), exp: z.number() });

/** What a valid token says; whether its session still lives is the row's word. */
export interface TokenClaims {
  readonly sessionId: string;
  readonly issuedAt: Date;
}

/** Signs and reads the two values that a browser holds: the session's token and the proof against forged requests. */
export class SessionTokens {
  private readonly tokenKey: KeyObject;
  private readonly forgeryKey: KeyObject;

  constructor(secret: string) {
    this.tokenKey = derive(secret, 'session token');
    this.forgeryKey = derive(secret, 'forgery proof');
  }

  sign(sessionId: string, issuedAt: Date, expiresAt: Date): string {
    const claims = { sid: sessionId, iat: seconds(issuedAt), exp: seconds(expiresAt) };
    return jwt.sign(claims, this.tokenKey, { algorithm: ALGORITHM, audience: AUDIENCE });
  }

  /** @returns undefined for a token that is forged, expired, malformed or meant for something else */
  read(token: string, now: Date): TokenClaims | undefined {
    try {
      const options: jwt.VerifyOptions = { algorithms: [ALGORITHM], audience: AUDIENCE, clockTimestamp: seconds(now) };
      const claims = Claims.parse(jwt.verify(token, this.tokenKey, options));
      return { sessionId: claims.sid, issuedAt: new Date(claims.iat * 1000) };
    } catch {
      return undefined;
    }
  }

  /** What the browser must repeat in X-XSRF-TOKEN; bound to the session, so that one planted by another is worthless. */
  forgeryProof(sessionId: string): string {
    return createHmac('sha256', this.forgeryKey).update(sessionId).digest('base64url');
  }

  proves(sessionId: string, proof: string | undefined): boolean {
    if (proof === undefined) return false;
    const expected = Buffer.from(this.forgeryProof(sessionId));
    const given = Buffer.from(proof);
    return expected.length === given.length && timingSafeEqual(expected, given);
  }
}

function derive(secret: string, purpose: string): KeyObject {
  // As a KeyObject: of bare bytes jsonwebtoken first tries to make a public key, at each token, which takes 0.7 ms.
  return createSecretKey(Buffer.from(hkdfSync('sha256', secret, 'riseback', purpose, 32)));
}

function seconds(date: Date): number {
  return Math.floor(date.getTime() / 1000);
}
