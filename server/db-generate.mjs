// `npm run db:generate -- --name what-changed`: writes the migration that brings the tables to schema.ts, as STRICT tables.
import { spawnSync } from 'node:child_process';
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { root } from './install.mjs';

const folder = join(root, 'drizzle');
const before = new Set(readdirSync(folder));
const kit = join(root, 'node_modules', 'drizzle-kit', 'bin.cjs');
const { status } = spawnSync(process.execPath, [kit, 'generate', ...process.argv.slice(2)], {
  cwd: root,
  stdio: 'inherit',
});
if (status !== 0) process.exit(status ?? 1);

for (const name of readdirSync(folder).filter((file) => file.endsWith('.sql') && !before.has(file))) {
  const path = join(folder, name);
  const sql = readFileSync(path, 'utf8');
  writeFileSync(path, addStrict(sql));
  // A rebuilt table is dropped after its copy: what points at it with ON DELETE CASCADE must be looked at by a person.
  if (/DROP TABLE/i.test(sql)) process.stdout.write(`Read ${name} with care: it drops or rebuilds a table.\n`);
}

/** drizzle-kit cannot write STRICT; its CREATE TABLE statements, those of rebuilt tables too, end in a line of their own. */
function addStrict(sql) {
  return sql.replaceAll(/^(CREATE TABLE [\s\S]*?\n\));$/gm, '$1 STRICT;');
}
