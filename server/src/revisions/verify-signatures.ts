import type { VerificationStep } from '@riseback/contracts';
import { eventText, recordText, type EventRecord } from '@riseback/revisions';
import { sha256 } from './hashes';
import type { Named, RevisionRow, SignatureRow } from './revision-repository';
import { auditHeadText } from './signature-making';
import { readStatement, type ReadStatement } from './statement-reading';
import type { LogEntry } from './verification-repository';
import type { VerifyingKeys } from './verifying-keys';
import { broken, matches } from './verify-content';

interface SignatureParts {
  readonly row: RevisionRow;
  readonly events: readonly EventRecord[];
  readonly signatures: readonly Named<SignatureRow>[];
  readonly entries: readonly LogEntry[];
  readonly keys: VerifyingKeys;
  /** Of the log's entry with this number, if it has one. */
  readonly entryHash: (seq: number) => string | undefined;
}

/** Each signature with the public key alone, what it says against what is stored, and its place in the log. */
export function verifySignatures(parts: SignatureParts): VerificationStep[] {
  const logged = parts.entries.filter(({ action }) => action === 'revision.sign');
  const count = Math.max(parts.signatures.length, logged.length);
  if (count === 0) {
    return [{ name: 'signatures', outcome: 'notThere', detail: 'Nobody has signed this revision.' }];
  }
  return Array.from({ length: count }, (_, i) => {
    const name = `signature ${i + 1}`;
    const [signature, entry] = [parts.signatures[i], logged[i]];
    if (signature === undefined) {
      return broken(name, `Entry ${entry?.seq ?? ''} of the log holds this signature; it is not there any more.`);
    }
    const statement = readStatement(signature.statement);
    const wrong = wrongWith(parts, signature, statement, i + 1) ?? wrongWithLog(parts, statement, signature, entry);
    if (wrong !== undefined) return broken(name, wrong);
    const { personName, meaning } = signature;
    return matches(
      name,
      `${statement?.person.name ?? personName} (${statement?.person.role ?? ''}) signed on ${statement?.at ?? ''} that it was ${meaning}, with the key ${signature.keyId}.`,
    );
  });
}

function wrongWith(
  { row, events, keys }: SignatureParts,
  signature: SignatureRow,
  statement: ReadStatement | undefined,
  seq: number,
): string | undefined {
  const { keyId } = signature;
  if (signature.seq !== seq) return `It is numbered ${signature.seq}: one before it is missing.`;
  if (!keys.has(keyId)) return `It names the key ${keyId}, which is none of those it is verified with.`;
  if (!keys.verifies(signature.statement, signature.signature, keyId)) {
    return 'The signature does not stand over its statement: one of the two was changed, or it was made with another key.';
  }
  if (sha256(signature.statement) !== signature.statementHash)
    return 'The hash of the statement is not that of its text.';
  if (statement === undefined) return 'What was signed is no statement of this program.';
  return wrongContent(row, events, signature, statement);
}

/** What was signed against what is stored. */
function wrongContent(
  row: RevisionRow,
  events: readonly EventRecord[],
  signature: SignatureRow,
  statement: ReadStatement,
): string | undefined {
  if (recordText(statement.revision) !== recordText(row)) return differing(row, statement);
  if (statement.person.id !== signature.personId) return 'It is stored under another person than the one who signed.';
  if (statement.meaning !== signature.meaning) {
    return `It is stored as ${signature.meaning}; what was signed is ${statement.meaning}.`;
  }
  if (auditHeadText(statement.audit) !== signature.auditHead) {
    return 'It is stored with another place in the log than the one that was signed.';
  }
  const changed = statement.events.findIndex((event, i) => {
    const stored = events[i];
    return stored === undefined || eventText(stored) !== eventText(event);
  });
  return changed < 0 ? undefined : `Step ${changed + 1} of what became of the revision is not what was signed.`;
}

function differing(row: RevisionRow, { revision }: ReadStatement): string {
  const key = (Object.keys(revision) as (keyof typeof revision)[]).find((each) => revision[each] !== row[each]);
  return `What was signed is not this revision: its ${key ?? 'record'} is another.`;
}

/** A signature is the log's next entry after the one it names. */
function wrongWithLog(
  { entryHash }: SignatureParts,
  statement: ReadStatement | undefined,
  { statementHash }: SignatureRow,
  entry: LogEntry | undefined,
): string | undefined {
  if (statement === undefined) return undefined;
  const { seq, hash } = statement.audit;
  const present = entryHash(seq);
  if (present === undefined) return `Entry ${seq} of the log, on which it stands, is not there.`;
  if (present !== hash) return `Entry ${seq} of the log, on which it stands, is not the one that was signed.`;
  if (entry?.seq !== seq + 1 || entry.statementHash !== statementHash) {
    return `Entry ${seq + 1} of the log does not hold this signature.`;
  }
  return undefined;
}
