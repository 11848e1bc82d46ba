import { SigningKey } from './signing-key';
import { VerifyingKeys } from './verifying-keys';

/** What signatures are made with, and what they are verified with. */
export interface SignatureKeys {
  readonly signingKey: SigningKey;
  readonly verifyingKeys: VerifyingKeys;
}

/** For as long as the process lives, as the database in memory that it signs in. */
export function passingKeys(): SignatureKeys {
  const signingKey = SigningKey.generate();
  return { signingKey, verifyingKeys: new VerifyingKeys([signingKey.publicKey]) };
}
