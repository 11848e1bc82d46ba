import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';

export interface SecretSources {
  readonly secret: string | undefined;
  readonly file: string | undefined;
  /** Where a development server keeps one it made itself, so that a restart signs nobody out. */
  readonly generatedFile: string | undefined;
}

export interface FoundSecret {
  readonly secret?: string;
  /** The setting or file it came from. */
  readonly setting?: string;
  readonly mistake?: string;
}

const LEAST_BYTES = 32;
/** Below this many different characters a text of 32 is a word repeated, not random. */
const LEAST_DIFFERENT = 10;

export function findSessionSecret({ secret, file, generatedFile }: SecretSources): FoundSecret {
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
  return undefined;
}

function readSecretFile(path: string, setting: string): FoundSecret {
  let text: string;
  try {
    // Windows has no such mode bits: there the folder's own rights protect the file.
    const readableByOthers = process.platform !== 'win32' && (statSync(path).mode & 0o077) !== 0;
    if (readableByOthers) return { mistake: `${setting}: others may read the file; allow its owner only (chmod 600).` };
    text = readFileSync(path, 'utf8').trim();
  } catch {
    return { mistake: `${setting}: the file cannot be read.` };
  }
  return { secret: text, setting };
}
