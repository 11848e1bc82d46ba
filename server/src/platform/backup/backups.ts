import { existsSync, rmSync } from 'node:fs';
import type Sqlite from 'better-sqlite3';
import { isBackup, publish, UnusableBackupError, type BackupFacts } from './sealed-copy';

/** About half a megabyte between two looks at what else there is to do. */
const PAGES_A_STEP = 128;

export interface BackupsParts {
  /** The writing connection: what it writes meanwhile goes into the copy, which another connection would begin again. */
  readonly source: Sqlite.Database;
  readonly seal: (path: string, madeAt: string) => BackupFacts | Promise<BackupFacts>;
  readonly now: () => Date;
  /** Told of each: when it was made, or undefined for one that failed. */
  readonly ended?: (madeAt: Date | undefined) => void;
}

/** Takes backups, one at a time. */
export class Backups {
  private last: Promise<unknown> = Promise.resolve();
  private stopping = false;

  constructor(private readonly parts: BackupsParts) {}

  /**
   * Copies the database as it is at the end of the copying, checks the copy and only then puts it in the place of an
   * older one: whatever fails on the way, a full disk too, leaves that one whole.
   * @param path absolute; its folder exists
   * @throws UnusableBackupError when `path` is a file that is no backup, or the copy is not whole
   */
  make(path: string): Promise<BackupFacts> {
    const made = this.last.then(() => this.copy(path));
    this.last = made.then(
      ({ madeAt }) => this.parts.ended?.(new Date(madeAt)),
      () => this.parts.ended?.(undefined),
    );
    return made;
  }

  /** Ends a backup under way and takes no more: the database is about to be closed. */
  async stop(): Promise<void> {
    this.stopping = true;
    await this.last;
  }

  private async copy(path: string): Promise<BackupFacts> {
    if (existsSync(path) && !isBackup(path)) {
      throw new UnusableBackupError(
        `${path} is there already and is no backup: it is left as it is; name another file`,
      );
    }
    const part = `${path}.part`;
    rmSync(part, { force: true });
    try {
      await this.parts.source.backup(part, { progress: () => this.nextStep() });
      const facts = await this.parts.seal(part, this.parts.now().toISOString());
      publish(part, path);
      return facts;
    } finally {
      for (const left of [part, `${part}-journal`, `${part}-wal`, `${part}-shm`]) rmSync(left, { force: true });
    }
  }

  private nextStep(): number {
    if (this.stopping) throw new Error('the server is stopping');
    return PAGES_A_STEP;
  }
}
