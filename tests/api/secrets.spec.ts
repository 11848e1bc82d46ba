import { randomBytes } from 'node:crypto';
import { chmodSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readConfig } from '../../server/src/platform/config';
import { secretFileMistake } from '../../server/src/platform/secret-file';
import { secretMistake } from '../../server/src/platform/session-secret';

const GOOD = randomBytes(48).toString('base64');
const production = { NODE_ENV: 'production', RISEBACK_DB: ':memory:' };

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-secrets-'));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

/** Why the start stops; '' when it does not. */
function refusal(env: Record<string, string>): string {
  try {
    readConfig({ ...production, ...env });
    return '';
  } catch (error) {
    return String(error);
  }
}

describe('a secret in the environment', () => {
  it.each([
    { what: 'too short', secret: GOOD.slice(0, 31), because: 'at least 32 random bytes; it holds 31' },
    { what: 'one character', secret: 'x'.repeat(64), because: 'repeats a few characters' },
    {
      what: 'a few characters',
      secret: 'abcabcabcabcabcabcabcabcabcabcabcabcabc',
      because: 'repeats a few characters',
    },
    { what: 'a phrase twice', secret: 'horse battery staple horse battery staple ', because: 'repeats itself' },
    { what: 'the digits of base 16', secret: '0123456789abcdef0123456789abcdef', because: 'repeats itself' },
    { what: 'the alphabet', secret: 'abcdefghijklmnopqrstuvwxyz0123456789', because: 'follow one another' },
    {
      what: 'a row of an example',
      secret: 'change-me-to-something-long-and-random',
      because: 'a word that examples use',
    },
    { what: 'its own name', secret: 'this-is-my-Session-Secret-for-the-plant', because: 'a word that examples use' },
  ])('stops the start when it is weak, and the message says how to make one: $what', ({ secret, because }) => {
    const message = refusal({ RISEBACK_SESSION_SECRET: secret });
    expect(message).toContain('RISEBACK_SESSION_SECRET');
    expect(message).toContain(because);
    expect(message).toContain('openssl rand -base64 48');
    expect(message).not.toContain(secret);
  });

  it.each([
    { kind: 'base64', make: () => randomBytes(48).toString('base64') },
    { kind: 'base64url of 24 bytes', make: () => randomBytes(24).toString('base64url') },
    { kind: 'hexadecimal', make: () => randomBytes(32).toString('hex') },
  ])('is taken when it is random: $kind', ({ make }) => {
    for (let i = 0; i < 500; i += 1) expect(secretMistake(make())).toBeUndefined();
  });

  it('is demanded in production, and one place for it', () => {
    expect(refusal({})).toContain('openssl rand -base64 48');
    const both = refusal({ RISEBACK_SESSION_SECRET: GOOD, RISEBACK_SESSION_SECRET_FILE: join(folder, 'any') });
    expect(both).toContain('keep one of them');
  });
});

describe('a secret in a file', () => {
  const file = (name: string, content: string, mode: number) => {
    const path = join(folder, name);
    writeFileSync(path, content);
    chmodSync(path, mode);
    return path;
  };
  const refusalOf = (path: string) => refusal({ RISEBACK_SESSION_SECRET_FILE: path });

  it('is taken from one that its owner alone may read', () => {
    expect(refusalOf(file('good', `${GOOD}\n`, 0o600))).toBe('');
    expect(refusalOf(file('read-only', GOOD, 0o400))).toBe('');
  });

  it.each([0o644, 0o640, 0o604, 0o660, 0o622, 0o601])('is refused from one of mode %o, with the remedy', (mode) => {
    const message = refusalOf(file(`mode-${mode.toString(8)}`, GOOD, mode));
    expect(message).toContain('RISEBACK_SESSION_SECRET_FILE: others may read the file');
    expect(message).toContain('chmod 600');
    expect(message).not.toContain(GOOD);
  });

  it('is refused from one that another account owns, who could change it', () => {
    expect(secretFileMistake({ mode: 0o100600, uid: 1001 }, 1000)).toContain('chown');
    expect(secretFileMistake({ mode: 0o100600, uid: 1001 }, 0)).toContain('chown');
    expect(secretFileMistake({ mode: 0o100600, uid: 1000 }, 1000)).toBeUndefined();
    // What root gives is root's to change anyway.
    expect(secretFileMistake({ mode: 0o100400, uid: 0 }, 1000)).toBeUndefined();
  });

  it('is refused when it is weak, empty, missing or no file, with the setting’s name', () => {
    mkdirSync(join(folder, 'a-folder'));
    expect(refusalOf(file('weak', 'x'.repeat(64), 0o600))).toContain('openssl rand -base64 48');
    expect(refusalOf(file('empty', '\n', 0o600))).toContain('it holds 0');
    for (const path of [join(folder, 'none'), join(folder, 'a-folder')]) {
      const message = refusalOf(path);
      expect(message).toContain('RISEBACK_SESSION_SECRET_FILE: ');
      expect(message).toMatch(/cannot be read; check its path|chmod 600/);
    }
  });
});
