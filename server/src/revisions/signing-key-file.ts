import { appendFileSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { ConfigError } from '../platform/config';
import { readSecretFile } from '../platform/secret-file';
import type { SignatureKeys } from './signature-keys';
import { SigningKey } from './signing-key';
import { VerifyingKeys } from './verifying-keys';

export interface OpenedKeys extends SignatureKeys {
  /** There was none before. */
  readonly isNew: boolean;
}

/** Beside the private key: the public one, and those of the keys before it, which verify what they signed. */
export function publicKeyFileOf(signingKeyFile: string): string {
  return `${signingKeyFile.replace(/\.pem$/, '')}.pub.pem`;
}

/**
 * The key that signatures are made with; where there is none one is made.
 * @param mayMake false where something was signed already: then the key is missing, not yet to be made
 * @throws ConfigError in words when the file cannot be used
 */
export function openSigningKey(file: string, mayMake: boolean): OpenedKeys {
  const isNew = !existsSync(file);
  if (isNew && !mayMake) {
    throw new ConfigError(
      `The signing key ${file} is missing, although revisions were signed with one. Put it back from where it is kept; to go on with another one, see docs/operations.md.`,
    );
  }
  if (isNew) makeKey(file);
  const signingKey = readKey(file);
  noteDown(publicKeyFileOf(file), signingKey);
  return { signingKey, verifyingKeys: readVerifyingKeys(publicKeyFileOf(file)), isNew };
}

/** @throws when the file cannot be read; ConfigError when there is no key in it */
export function readVerifyingKeys(file: string): VerifyingKeys {
  const keys = VerifyingKeys.ofPem(readFileSync(file, 'utf8'));
  if (keys.isEmpty) throw new ConfigError(`There is no Ed25519 public key in ${file}.`);
  return keys;
}

function makeKey(file: string): void {
  mkdirSync(dirname(file), { recursive: true, mode: 0o700 });
  // on the disk before the first signature is: a power cut must not leave one that nobody can go on from
  writeFileSync(file, SigningKey.generate().privatePem(), { mode: 0o600, flag: 'wx', flush: true });
}

function readKey(file: string): SigningKey {
  const { secret, mistake } = readSecretFile(file, 'RISEBACK_SIGNING_KEY_FILE');
  if (secret === undefined) throw new ConfigError(mistake ?? `RISEBACK_SIGNING_KEY_FILE: ${file} cannot be read.`);
  const key = SigningKey.ofPem(secret);
  if (key === undefined) {
    throw new ConfigError(
      `RISEBACK_SIGNING_KEY_FILE: ${file} holds no Ed25519 private key. Make one with: openssl genpkey -algorithm ed25519`,
    );
  }
  return key;
}

function noteDown(file: string, { keyId, publicPem }: SigningKey): void {
  const known = existsSync(file) ? VerifyingKeys.ofPem(readFileSync(file, 'utf8')) : undefined;
  if (known?.has(keyId) !== true) appendFileSync(file, publicPem, { mode: 0o644, flush: true });
}
