import { existsSync } from 'node:fs';
import Sqlite from 'better-sqlite3';
import { drizzle } from 'drizzle-orm/better-sqlite3';
import { checkAudit } from '../src/platform/db/audit-check';
import { auditHeadLogOf, readAuditHeads } from '../src/platform/db/audit-head-log';
import * as schema from '../src/platform/db/schema';
import { UnusableDatabaseError } from '../src/platform/db/unusable-database';
import { databasePath, fileFromHere, runCommand } from './command-line';

const USAGE = `Follows the audit log from its first entry to its last and compares it with the heads noted beside the database.
  npm run verify-audit
  npm run verify-audit -- HEADS     with a copy of audit-head.log that was kept elsewhere
Ends with 0 when everything matches and 1 at the first thing that does not. The server may run.
`;

await runCommand(USAGE, () => {
  const [name, ...rest] = process.argv.slice(2);
  if (rest.length > 0) return undefined;
  const path = databasePath();
  if (!existsSync(path)) throw new UnusableDatabaseError(`There is no database ${path}: name it in RISEBACK_DB`);
  const headLog = name === undefined ? auditHeadLogOf(path) : fileFromHere(name);
  // first, so that what is written meanwhile is in the database at least
  const heads = readAuditHeads(headLog);
  const sqlite = new Sqlite(path, { readonly: true, fileMustExist: true });
  try {
    const { entries, headHash, mismatch, notes } = checkAudit(drizzle(sqlite, { schema }), heads);
    for (const note of notes) process.stdout.write(`${note}\n`);
    if (mismatch !== undefined) {
      process.stdout.write(`${mismatch.what}\n`);
      return 1;
    }
    const compared = heads.length === 0 ? `no head was noted in ${headLog}` : `compared with ${headLog}`;
    process.stdout.write(`${entries} entries follow one from another, up to hash ${headHash}; ${compared}\n`);
    return 0;
  } finally {
    sqlite.close();
  }
});
