import type Sqlite from 'better-sqlite3';
import type { Config } from '../config';
import type { Log } from '../log';
import { listenForBackupOrders } from './backup-control';
import { BackupSchedule } from './backup-schedule';
import { Backups } from './backups';
import { sealAside } from './seal-aside';

export interface KeepBackupsParts {
  readonly config: Pick<Config, 'databasePath' | 'backups'>;
  readonly source: Sqlite.Database;
  readonly now: () => Date;
  readonly log: Log;
  readonly ended: (madeAt: Date | undefined) => void;
}

/** A running server's backups: by schedule where a folder is set, and by the command at any time. */
export async function keepBackups({
  config,
  source,
  now,
  log,
  ended,
}: KeepBackupsParts): Promise<{ stop(): Promise<void> }> {
  if (config.databasePath === ':memory:') return { stop: () => Promise.resolve() };
  const backups = new Backups({ source, seal: sealAside, now, ended });
  const schedule =
    config.backups === undefined
      ? undefined
      : new BackupSchedule(backups, config.backups, config.databasePath, now, log);
  const control = await listenForBackupOrders(config.databasePath, backups).catch((error: unknown) => {
    log.warn({ err: error }, 'npm run backup cannot reach this server');
    return undefined;
  });
  schedule?.start();
  return {
    stop: async () => {
      schedule?.stop();
      control?.close();
      await backups.stop();
    },
  };
}
