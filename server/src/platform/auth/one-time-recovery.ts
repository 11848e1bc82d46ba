import { createHash, randomInt } from 'node:crypto';

const HOW_MANY = 10;
const GROUPS = 6;
const GROUP_LENGTH = 4;
/** RFC 4648's base32 in small letters: no 0, 1, 8, 9 to be taken for letters. */
const LETTERS = 'abcdefghijklmnopqrstuvwxyz234567';

/** Ten codes of 120 random bits, `xxxx-xxxx-xxxx-xxxx-xxxx-xxxx`. */
export function newRecoveryCodes(): string[] {
  return Array.from({ length: HOW_MANY }, () => Array.from({ length: GROUPS }, newGroup).join('-'));
}

/** However it was typed: capitals, spaces and dashes do not matter. Undefined for what cannot be a recovery code. */
export function plainRecoveryCode(typed: string): string | undefined {
  const plain = typed.toLowerCase().replaceAll(/[\s-]/g, '');
  return /^[a-z2-7]{24}$/.test(plain) ? plain : undefined;
}

/** What is stored. A plain hash does: 120 random bits cannot be searched, unlike what people choose. */
export function recoveryCodeHash(plain: string): string {
  return createHash('sha256').update(`recovery code\n${plain}`).digest('base64url');
}

function newGroup(): string {
  return Array.from({ length: GROUP_LENGTH }, () => LETTERS.charAt(randomInt(LETTERS.length))).join('');
}
