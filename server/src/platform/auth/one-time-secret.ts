import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';
import { Secret, TOTP } from 'otpauth';

const SECRET_BYTES = 20;
const PERIOD_S = 30;
/** Codes of the half-minute before and after count too: clocks of telephones are not ours. */
const STEPS_EITHER_WAY = 1;
const NONCE_BYTES = 12;
const TAG_BYTES = 16;
const CIPHER = 'aes-256-gcm';

/** What codes are made of, RFC 6238 with what every authenticator can: SHA-1, six digits, half a minute. */
export function newOneTimeSecret(): string {
  return new Secret({ buffer: new Uint8Array(randomBytes(SECRET_BYTES)).buffer }).base32;
}

/** The otpauth:// address that an authenticator reads from a picture. */
export function authenticatorAddress(secret: string, email: string): string {
  return generatorOf(secret, email).toString();
}

/** @returns the half-minute that the six digits belong to, counted from 1970; undefined when they are of none near `at` */
export function stepOfCode(secret: string, digits: string, at: Date): number | undefined {
  // otpauth compares buffers, and throws for six characters that are no ASCII digits
  if (!/^[0-9]{6}$/.test(digits)) return undefined;
  const timestamp = at.getTime();
  const delta = generatorOf(secret).validate({ token: digits, timestamp, window: STEPS_EITHER_WAY });
  return delta === null ? undefined : Math.floor(timestamp / (PERIOD_S * 1000)) + delta;
}

function generatorOf(secret: string, label = ''): TOTP {
  return new TOTP({ issuer: 'Riseback', label, secret, algorithm: 'SHA1', digits: 6, period: PERIOD_S });
}

/**
 * Keeps secrets unreadable in the database and its backups: AES-256-GCM under a key derived from the session secret,
 * bound to the person, so that a sealed secret moved to another row is worthless (docs/decisions/0052).
 */
export class SecretSeal {
  private readonly key: Buffer;

  constructor(sessionSecret: string) {
    this.key = Buffer.from(hkdfSync('sha256', sessionSecret, 'riseback', 'one-time codes', 32));
  }

  seal(secret: string, personId: string): string {
    const nonce = randomBytes(NONCE_BYTES);
    const cipher = createCipheriv(CIPHER, this.key, nonce).setAAD(Buffer.from(personId));
    const sealed = Buffer.concat([cipher.update(secret, 'utf8'), cipher.final()]);
    return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString('base64url');
  }

  /** @returns undefined when it was sealed under another key or for another person, or was changed */
  open(sealed: string, personId: string): string | undefined {
    const bytes = Buffer.from(sealed, 'base64url');
    try {
      const nonce = bytes.subarray(0, NONCE_BYTES);
      const decipher = createDecipheriv(CIPHER, this.key, nonce, { authTagLength: TAG_BYTES })
        .setAAD(Buffer.from(personId))
        .setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
      return Buffer.concat([decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES)), decipher.final()]).toString();
    } catch {
      return undefined;
    }
  }
}
