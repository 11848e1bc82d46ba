import { CaseOutcome, type Verification, type VerificationStep } from '@riseback/contracts';
import { NetworkFileShape, type NetworkFile } from '@riseback/network';
import { checkAudit } from '../platform/db/audit-check';
import type { AuditHead } from '../platform/db/audit-head-log';
import type { Queries } from '../platform/db/database';
import type { SolvePort } from '../solve/solve-port';
import { parsedJson } from './parsed-json';
import { solvedAgain } from './solved-again';
import { verifyEvents } from './verify-events';
import { verifyInputs, verifyRecord, verifyResults } from './verify-content';
import { verifySignatures } from './verify-signatures';
import type { RevisionRow } from './revision-repository';
import { VerificationRepository } from './verification-repository';
import type { VerifyingKeys } from './verifying-keys';

export interface VerificationParts {
  readonly db: Queries;
  /** No secret is needed. */
  readonly keys: VerifyingKeys;
  /** Where the log's heads are noted beside the database; read before the database is. */
  readonly heads: () => readonly AuditHead[];
  readonly solver: SolvePort;
  readonly engineVersion: string;
}

interface Checked {
  readonly row: RevisionRow;
  readonly steps: readonly VerificationStep[];
  readonly file: NetworkFile | undefined;
  readonly outcomes: readonly CaseOutcome[] | undefined;
  readonly keyId: string | undefined;
}

/**
 * Whether a revision is what was frozen and signed: its inputs, its results, what it is called, what became of it, every signature with
 * the public key alone, and the log. Then the frozen inputs are solved again.
 * @returns undefined when there is no such revision
 */
export async function verifyRevision(id: string, parts: VerificationParts): Promise<Verification | undefined> {
  const checked = check(id, parts);
  if (checked === undefined) return undefined;
  const { row, steps, file, outcomes, keyId } = checked;
  const again =
    file === undefined || outcomes === undefined
      ? undefined
      : await solvedAgain({ id, file, outcomes, engineVersion: row.engineVersion }, parts);
  const firstBroken = steps.find(({ outcome }) => outcome === 'broken')?.name;
  return {
    revisionId: id,
    letter: row.letter,
    sound: firstBroken === undefined,
    ...(firstBroken === undefined ? {} : { firstBroken }),
    steps: [...steps],
    publicKey: parts.keys.pem(keyId),
    ...(again === undefined ? {} : { solvedAgain: again }),
  };
}

/** All of it in one turn and one transaction, so that nothing changes between two steps. */
function check(id: string, { db, keys, heads }: VerificationParts): Checked | undefined {
  const noted = heads();
  return db.transaction((tx) => {
    const stored = new VerificationRepository(tx);
    const row = stored.revisions.find(id);
    if (row === undefined) return undefined;
    const inputs = verifyInputs(row, stored.revisions.fileText(id) ?? '');
    const outcomeRows = stored.revisions.outcomes(id);
    const entries = stored.entriesOf(id);
    const signatures = stored.revisions.signatures(id);
    const events = stored.revisions.events(id);
    const file = readFile(stored.revisions.fileText(id) ?? '');
    const steps = [
      inputs,
      verifyResults(row, outcomeRows),
      verifyRecord(row, entries),
      verifyEvents({ row, events, signatures, entries }),
      ...verifySignatures({ row, events, signatures, entries, keys, entryHash: (seq) => stored.entryHash(seq) }),
      verifyLog(tx, noted),
    ];
    const last = signatures.at(-1)?.keyId;
    const keyId = last !== undefined && keys.has(last) ? last : undefined;
    return { row, steps, file, outcomes: readAll(outcomeRows), keyId };
  });
}

function verifyLog(db: Queries, heads: readonly AuditHead[]): VerificationStep {
  const { entries, mismatch, notes } = checkAudit(db, heads);
  if (mismatch !== undefined) return { name: 'log', outcome: 'broken', detail: mismatch.what };
  const compared =
    heads.length === 0
      ? 'No head was noted beside the database, so that a tail cut off would not show.'
      : 'They match the heads noted beside the database.';
  const detail = [`${entries} entries follow one from another.`, compared, ...notes].join(' ');
  return { name: 'log', outcome: 'matches', detail };
}

function readFile(text: string): NetworkFile | undefined {
  return NetworkFileShape.safeParse(parsedJson(text)).data;
}

function readAll(rows: readonly { readonly result: string }[]): CaseOutcome[] | undefined {
  const read = rows.map(({ result }) => CaseOutcome.safeParse(parsedJson(result)).data);
  return read.every((outcome) => outcome !== undefined) ? read : undefined;
}
