import type { VerificationStep } from '@riseback/contracts';
import { eventText, firstImpossibleState, type EventRecord, STATE_WORDS } from '@riseback/revisions';
import { sha256 } from './hashes';
import type { RevisionRow, SignatureRow } from './revision-repository';
import { readStatement } from './statement-reading';
import type { LogEntry } from './verification-repository';
import { broken, matches } from './verify-content';

interface EventParts {
  readonly row: RevisionRow;
  readonly events: readonly EventRecord[];
  readonly signatures: readonly SignatureRow[];
  readonly entries: readonly LogEntry[];
}

const NAME = 'events';

/** What became of the revision, against the log and against the signatures. */
export function verifyEvents(parts: EventParts): VerificationStep {
  const wrong = wrongWithLog(parts) ?? wrongWithStates(parts) ?? wrongWithSignatures(parts);
  if (wrong !== undefined) return broken(NAME, wrong);
  const last = parts.events.at(-1);
  return matches(
    NAME,
    `${parts.events.length} steps, each as the log holds it. After the last, of ${last?.at ?? ''}, it is ${last === undefined ? '' : STATE_WORDS[last.state]}.`,
  );
}

function wrongWithLog({ events, entries }: EventParts): string | undefined {
  const logged = entries.filter(({ eventSeq }) => eventSeq !== undefined);
  for (const [i, event] of events.entries()) {
    const entry = logged[i];
    if (event.seq !== i + 1) return `Step ${i + 1} of what became of it is missing.`;
    if (entry === undefined) return `Step ${event.seq} (${event.state}) is not in the log: it was slipped in.`;
    if (entry.eventSeq !== event.seq || entry.eventHash !== sha256(eventText(event))) {
      return `Step ${event.seq} is not what entry ${entry.seq} of the log holds: it was changed afterwards.`;
    }
  }
  const missing = logged[events.length];
  return missing === undefined
    ? undefined
    : `The log holds a step ${missing.eventSeq ?? ''} (entry ${missing.seq}) that is not there any more.`;
}

function wrongWithStates({ events }: EventParts): string | undefined {
  const impossible = firstImpossibleState(events.map(({ state }) => state));
  if (impossible === undefined) return events.length === 0 ? 'Nothing says what became of it.' : undefined;
  return `Step ${impossible + 1} (${events[impossible]?.state ?? ''}) cannot follow from the one before it.`;
}

/** Approved is who signed an approval, and then; and nothing else makes it approved. */
function wrongWithSignatures({ events, signatures }: EventParts): string | undefined {
  const approvals = signatures.filter(({ meaning }) => meaning === 'approved').map(approvalOf);
  const approved = events.filter(({ state }) => state === 'approved').map(({ personId, at }) => `${personId} ${at}`);
  const unsigned = approved.find((approval) => !approvals.includes(approval));
  if (unsigned !== undefined) return 'It is said to be approved, and no signature approves it.';
  if (approvals.length > approved.length) return 'A signature approves it, and nothing says that it was approved.';
  return undefined;
}

function approvalOf({ personId, statement }: SignatureRow): string {
  return `${personId} ${readStatement(statement)?.at ?? ''}`;
}
