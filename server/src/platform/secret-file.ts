import { closeSync, fstatSync, openSync, readFileSync } from 'node:fs';

/** A secret and where it came from, or why it is not taken. */
export interface SecretInFile {
  readonly secret?: string;
  /** The setting or file it came from. */
  readonly setting?: string;
  readonly mistake?: string;
}

/** @param setting what names the file, for the message */
export function readSecretFile(path: string, setting: string): SecretInFile {
  let open: number | undefined;
  try {
    // Opened once, so that what is read is the very file whose rights were looked at.
    open = openSync(path, 'r');
    // Windows has no such owner and mode bits: there the folder's own rights protect the file.
    const ownUid = process.getuid?.();
    const mistake = ownUid === undefined ? undefined : secretFileMistake(fstatSync(open), ownUid);
    if (mistake !== undefined) return { mistake: `${setting}: ${mistake}` };
    return { secret: readFileSync(open, 'utf8').trim(), setting };
  } catch {
    return { mistake: `${setting}: the file cannot be read; check its path and that the server's account owns it.` };
  } finally {
    if (open !== undefined) closeSync(open);
  }
}

/** Others who may write the file choose the secret; others who may read it sign themselves in as anyone. */
export function secretFileMistake(file: { mode: number; uid: number }, ownUid: number): string | undefined {
  if ((file.mode & 0o077) !== 0) return 'others may read the file; allow its owner only (chmod 600).';
  if (file.uid !== ownUid && file.uid !== 0)
    return 'the file belongs to another account; give it to the one that the server runs as (chown).';
  return undefined;
}
