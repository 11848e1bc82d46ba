import type { Role, SignatureMeaning } from '@riseback/contracts';
import { statementText, type Signer } from '@riseback/revisions';
import { sha256 } from './hashes';
import { stateOf, type RevisionWithHistory } from './revision-history';
import { entryOf, recordMove, type DoneBy } from './revision-moves';
import type { RevisionRepository } from './revision-repository';
import type { SigningKey } from './signing-key';

export interface NewSignatureParts {
  readonly revision: RevisionWithHistory;
  readonly signer: Signer & { readonly role: Role };
  readonly meaning: SignatureMeaning;
  /** As they were shown. */
  readonly sentences: readonly string[];
}

/**
 * Signs a revision in the transaction of `revisions`; an approval ends its review and supersedes the one approved before it. Whether the
 * person may, and is who they say, is the caller's to ask first.
 */
export function recordSignature(
  revisions: RevisionRepository,
  key: SigningKey,
  { revision, signer, meaning, sentences }: NewSignatureParts,
  by: DoneBy,
): void {
  const { row, events } = revision;
  const audit = revisions.auditHead();
  if (audit === undefined) throw new Error('a revision was frozen without an entry in the log');
  const at = by.at.toISOString();
  const statement = statementText({ revision: row, events, person: signer, at, meaning, sentences, audit });
  const statementHash = sha256(statement);
  const seq = (revisions.signatures(row.id).at(-1)?.seq ?? 0) + 1;
  revisions.insertSignature({
    revisionId: row.id,
    seq,
    personId: signer.id,
    meaning,
    statement,
    statementHash,
    auditHead: auditHeadText(audit),
    signature: key.sign(statement),
    keyId: key.keyId,
  });
  const details = { letter: row.letter, signatureSeq: seq, meaning, statementHash };
  revisions.audit(entryOf(by, 'revision.sign', row.id, details));
  if (meaning === 'approved') approve(revisions, revision, by);
}

/** `seq hash`, as the column holds it. */
export function auditHeadText({ seq, hash }: { readonly seq: number; readonly hash: string }): string {
  return `${seq} ${hash}`;
}

function approve(revisions: RevisionRepository, { row, events }: RevisionWithHistory, by: DoneBy): void {
  recordMove(revisions, { row, events }, 'approve', '', by);
  const byRevision = revisions.eventsOfNetwork(row.networkId);
  for (const other of revisions.list(row.networkId)) {
    const history = byRevision.get(other.id) ?? [];
    if (other.id === row.id || stateOf(history) !== 'approved') continue;
    recordMove(revisions, { row: other, events: history }, 'supersede', `Superseded by revision ${row.letter}.`, by);
  }
}
