import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { readSecretFile, type SecretInFile } from './secret-file';

export interface SecretSources {
  readonly secret: string | undefined;
  readonly file: string | undefined;
  /** Where a development server keeps one it made itself, so that a restart signs nobody out. */
  readonly generatedFile: string | undefined;
}

const LEAST_BYTES = 32;
/** Below this many different characters a text of 32 is a word repeated, not random. */
const LEAST_DIFFERENT = 10;
/** What stands in examples and is put in by hand. In 64 random base64 characters the shortest turns up once in ten million. */
const WORDS_OF_EXAMPLES = ['secret', 'password', 'changeme', 'change-me', 'change_me', 'riseback', 'example'];

export function findSessionSecret({ secret, file, generatedFile }: SecretSources): SecretInFile {
  if (secret !== undefined && file !== undefined) {
    return { mistake: 'RISEBACK_SESSION_SECRET and RISEBACK_SESSION_SECRET_FILE are both set; keep one of them.' };
  }
  if (secret !== undefined) return { secret, setting: 'RISEBACK_SESSION_SECRET' };
  if (file !== undefined) return readSecretFile(file, 'RISEBACK_SESSION_SECRET_FILE');
  if (generatedFile === undefined) return {};
  if (!existsSync(generatedFile)) {
    mkdirSync(dirname(generatedFile), { recursive: true });
    writeFileSync(generatedFile, `${randomBytes(48).toString('base64')}\n`, { mode: 0o600, flag: 'wx' });
  }
  return readSecretFile(generatedFile, generatedFile);
}

/** Why a secret is too weak to sign sessions, or undefined when it is not. */
export function secretMistake(secret: string): string | undefined {
  const bytes = Buffer.byteLength(secret);
  if (bytes < LEAST_BYTES) return `must hold at least ${String(LEAST_BYTES)} random bytes; it holds ${String(bytes)}`;
  if (new Set(secret).size < LEAST_DIFFERENT) return 'must be random; it repeats a few characters';
  if (isRepeatedPiece(secret)) return 'must be random; it repeats itself';
  if (isMostlyInSequence(secret)) return 'must be random; its characters follow one another';
  const lower = secret.toLowerCase();
  if (WORDS_OF_EXAMPLES.some((word) => lower.includes(word)))
    return 'must be random; it holds a word that examples use';
  return undefined;
}

function isRepeatedPiece(text: string): boolean {
  // A text made of one piece over and over is found again inside itself, off by the piece.
  return (text + text).indexOf(text, 1) <= text.length / 2;
}

/** Such as 0123… or abcd…, up or down. */
function isMostlyInSequence(text: string): boolean {
  const codes = Array.from(text, (character) => character.codePointAt(0) ?? 0);
  const following = codes.slice(1).filter((code, i) => Math.abs(code - (codes[i] ?? 0)) <= 1);
  return following.length > text.length / 2;
}
