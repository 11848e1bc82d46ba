import { drillRestore, restoreBackup } from '../src/platform/backup/restore';
import { databasePath, fileFromHere, runCommand } from './command-line';

const USAGE = `Puts a backup in the place of the database. The server must be stopped; the database that is there is kept beside it.
  npm run restore -- FILE
  npm run restore -- FILE --drill     only tries: restores beside the database, checks, reports and removes it again
`;

await runCommand(USAGE, () => {
  const words = process.argv.slice(2);
  const [name, ...rest] = words.filter((word) => word !== '--drill');
  if (name === undefined || rest.length > 0) return undefined;
  const file = fileFromHere(name);
  if (words.includes('--drill')) {
    const { contentHash, madeAt } = drillRestore(file, databasePath());
    process.stdout.write(`${file}: can be restored; taken ${madeAt}, content hash ${contentHash} before and after\n`);
    return 0;
  }
  const { contentHash, madeAt, before } = restoreBackup(file, databasePath(), new Date());
  process.stdout.write(`${databasePath()}: restored from the backup of ${madeAt}, content hash ${contentHash}\n`);
  if (before !== undefined) process.stdout.write(`The database that was there is now ${before}\n`);
  return 0;
});
