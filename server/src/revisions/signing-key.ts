import { createPrivateKey, createPublicKey, generateKeyPairSync, sign, type KeyObject } from 'node:crypto';
import { keyIdOf, pemOf } from './verifying-keys';

/** The Ed25519 key that signatures are made with (RFC 8032). It never enters the database, a log or an answer. */
export class SigningKey {
  readonly publicKey: KeyObject;
  readonly keyId: string;

  private constructor(private readonly privateKey: KeyObject) {
    this.publicKey = createPublicKey(privateKey);
    this.keyId = keyIdOf(this.publicKey);
  }

  static generate(): SigningKey {
    return new SigningKey(generateKeyPairSync('ed25519').privateKey);
  }

  /** @returns undefined for what is no Ed25519 private key */
  static ofPem(pem: string): SigningKey | undefined {
    try {
      const key = createPrivateKey(pem);
      return key.asymmetricKeyType === 'ed25519' ? new SigningKey(key) : undefined;
    } catch {
      return undefined;
    }
  }

  get publicPem(): string {
    return pemOf(this.publicKey);
  }

  /** PKCS #8, to be kept in a file that its owner alone can read. */
  privatePem(): string {
    return this.privateKey.export({ type: 'pkcs8', format: 'pem' }).toString();
  }

  /** @returns base64 */
  sign(text: string): string {
    return sign(null, Buffer.from(text), this.privateKey).toString('base64');
  }
}
