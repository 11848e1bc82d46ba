import { existsSync } from 'node:fs';
import { orderBackup } from '../src/platform/backup/backup-control';
import { Backups } from '../src/platform/backup/backups';
import { sealCopy, type BackupFacts } from '../src/platform/backup/sealed-copy';
import { openDatabase, UnusableDatabaseError } from '../src/platform/db/database';
import { holdExclusively } from '../src/platform/exclusive-use';
import { databasePath, fileFromHere, runCommand } from './command-line';

const USAGE = `Takes a backup of the database, whether its server runs or not.
  npm run backup -- FILE
An older backup under the same name is replaced when the new one is whole and on the disk.
`;

await runCommand(USAGE, async () => {
  const [name, ...rest] = process.argv.slice(2);
  if (name === undefined || rest.length > 0) return undefined;
  const file = fileFromHere(name);
  const { contentHash, madeAt } = (await orderBackup(databasePath(), file)) ?? (await backUpHere(databasePath(), file));
  process.stdout.write(`${file}: taken ${madeAt}, checked, content hash ${contentHash}\n`);
  return 0;
});

/** No server runs, and none can start meanwhile. */
async function backUpHere(path: string, file: string): Promise<BackupFacts> {
  if (!existsSync(path)) throw new UnusableDatabaseError(`There is no database ${path}: name it in RISEBACK_DB`);
  const hold = holdExclusively(path);
  try {
    const { $client: source } = openDatabase(path, { mayMigrate: false });
    try {
      return await new Backups({ source, seal: sealCopy, now: () => new Date() }).make(file);
    } finally {
      source.close();
    }
  } finally {
    hold.release();
  }
}
