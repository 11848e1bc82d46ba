import { createHash, createPublicKey, verify, type KeyObject } from 'node:crypto';

const BLOCK = /-----BEGIN PUBLIC KEY-----[^-]+-----END PUBLIC KEY-----/g;

/** SHA-256 of the public key in DER, which tells keys apart. */
export function keyIdOf(publicKey: KeyObject): string {
  return createHash('sha256')
    .update(publicKey.export({ type: 'spki', format: 'der' }))
    .digest('hex');
}

export function pemOf(publicKey: KeyObject): string {
  return publicKey.export({ type: 'spki', format: 'pem' }).toString();
}

/** The public keys that signatures are verified with: the present one, and those before it. No secret is among them. */
export class VerifyingKeys {
  private readonly keys = new Map<string, KeyObject>();

  constructor(publicKeys: readonly KeyObject[]) {
    for (const key of publicKeys) this.keys.set(keyIdOf(key), key);
  }

  /** Of a text that holds one or more public keys in PEM; what is no Ed25519 key is left out. */
  static ofPem(text: string): VerifyingKeys {
    return new VerifyingKeys((text.match(BLOCK) ?? []).flatMap(readKey));
  }

  get isEmpty(): boolean {
    return this.keys.size === 0;
  }

  has(keyId: string): boolean {
    return this.keys.has(keyId);
  }

  /** Of one key, or all of them one after the other. */
  pem(keyId?: string): string {
    const chosen = [...this.keys].filter(([id]) => keyId === undefined || id === keyId);
    return chosen.map(([, key]) => pemOf(key)).join('');
  }

  /** @param signature base64; another text for the same bytes counts as changed */
  verifies(text: string, signature: string, keyId: string): boolean {
    const key = this.keys.get(keyId);
    const bytes = Buffer.from(signature, 'base64');
    if (key === undefined || bytes.toString('base64') !== signature) return false;
    return verify(null, Buffer.from(text), key, bytes);
  }
}

function readKey(pem: string): KeyObject[] {
  try {
    const key = createPublicKey(pem);
    return key.asymmetricKeyType === 'ed25519' ? [key] : [];
  } catch {
    return [];
  }
}
