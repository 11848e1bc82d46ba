import { existsSync } from 'node:fs';
import type { Verification } from '@riseback/contracts';
import Sqlite from 'better-sqlite3';
import { drizzle } from 'drizzle-orm/better-sqlite3';
import { auditHeadLogOf, readAuditHeads } from '../src/platform/db/audit-head-log';
import * as schema from '../src/platform/db/schema';
import { UnusableDatabaseError } from '../src/platform/db/unusable-database';
import { publicKeyFileOf, readVerifyingKeys } from '../src/revisions/signing-key-file';
import { verifyRevision } from '../src/revisions/verification';
import { ENGINE_VERSION } from '../src/solve/engine-version';
import { solveCases } from '../src/solve/solve-cases';
import type { SolvePort } from '../src/solve/solve-port';
import { databasePath, fileFromHere, runCommand, signingKeyFile } from './command-line';

const USAGE = `Verifies a revision: what was frozen, what became of it, its signatures with the public key alone, and the log. Then it solves
the frozen inputs again and says by how much the present engine differs.
  npm run verify-revision -- ID
  npm run verify-revision -- ID --public-key FILE     with a copy of the public key that was kept elsewhere
Ends with 0 when everything matches, 1 at the first thing that does not, 2 when there is no such revision. The server may run;
no secret is needed.
`;

/** In this very process, and for as long as it takes. */
const here: SolvePort = {
  solve: (_key, job) => Promise.resolve({ end: 'finished', outcomes: solveCases(job), solveMs: 0 }),
};

await runCommand(USAGE, async () => {
  const asked = readArguments(process.argv.slice(2));
  if (asked === undefined) return undefined;
  const path = databasePath();
  if (!existsSync(path)) throw new UnusableDatabaseError(`There is no database ${path}: name it in RISEBACK_DB`);
  const keys = readVerifyingKeys(asked.keyFile ?? publicKeyFileOf(signingKeyFile() ?? ''));
  const sqlite = new Sqlite(path, { readonly: true, fileMustExist: true });
  try {
    const heads = () => readAuditHeads(auditHeadLogOf(path));
    const parts = { db: drizzle(sqlite, { schema }), keys, heads, solver: here, engineVersion: ENGINE_VERSION };
    const verification = await verifyRevision(asked.id, parts);
    if (verification === undefined) {
      process.stderr.write(`There is no revision ${asked.id} in ${path}\n`);
      return 2;
    }
    process.stdout.write(printed(verification));
    return verification.sound ? 0 : 1;
  } finally {
    sqlite.close();
  }
});

function readArguments(args: readonly string[]): { readonly id: string; readonly keyFile?: string } | undefined {
  const [id, option, file, ...rest] = args;
  if (id === undefined || id.startsWith('-') || rest.length > 0) return undefined;
  if (option === undefined) return { id };
  if (option !== '--public-key' || file === undefined) return undefined;
  return { id, keyFile: fileFromHere(file) };
}

function printed({ letter, revisionId, steps, firstBroken, solvedAgain, publicKey }: Verification): string {
  const words = { matches: 'matches', broken: 'BROKEN', notThere: 'none' };
  const width = Math.max(...steps.map(({ name }) => name.length));
  return [
    `Revision ${letter} (${revisionId})`,
    ...steps.map(({ name, outcome, detail }) => `  ${name.padEnd(width)}  ${words[outcome].padEnd(7)}  ${detail}`),
    'Verified with the public key',
    publicKey.trimEnd(),
    solvedAgainWords(solvedAgain),
    firstBroken === undefined
      ? 'Sound: everything is as it was frozen and signed.'
      : `Broken: the first thing that does not match is: ${firstBroken}. Do not rely on this revision; compare it with a backup from before (docs/operations.md, Restore).`,
    '',
  ].join('\n');
}

function solvedAgainWords(again: Verification['solvedAgain']): string {
  if (again === undefined) return 'The frozen inputs could not be solved again.';
  const { engineVersion, sameEngine, largestDifferencePa, trapId, caseId, verdictsChanged } = again;
  const engine = `the present engine ${engineVersion}, ${sameEngine ? 'the same' : 'another'}`;
  const where =
    trapId === undefined ? '' : ` (at ${trapId}, case ${caseId === '' ? 'of the plain network' : (caseId ?? '')})`;
  return `Solved again by ${engine}: largest difference of a back pressure ${largestDifferencePa} Pa${where}, verdicts changed: ${verdictsChanged}.`;
}
