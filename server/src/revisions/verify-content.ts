import type { VerificationStep } from '@riseback/contracts';
import { recordText } from '@riseback/revisions';
import { resultsHashOf } from './frozen-revision';
import { sha256 } from './hashes';
import { parsedJson } from './parsed-json';
import type { RevisionRow, StoredOutcome } from './revision-repository';
import type { LogEntry } from './verification-repository';

export function matches(name: string, detail: string): VerificationStep {
  return { name, outcome: 'matches', detail };
}

export function broken(name: string, detail: string): VerificationStep {
  return { name, outcome: 'broken', detail };
}

export function verifyInputs({ fileHash }: RevisionRow, file: string): VerificationStep {
  const hash = sha256(file);
  if (hash === fileHash) return matches('inputs', `The frozen inputs have the SHA-256 ${hash}.`);
  return broken('inputs', `The inputs are not those that were frozen: their SHA-256 is ${hash}, and was ${fileHash}.`);
}

export function verifyResults({ resultsHash }: RevisionRow, outcomes: readonly StoredOutcome[]): VerificationStep {
  const misplaced = outcomes.find(({ ordinal, caseId, result }, i) => ordinal !== i || caseIdOf(result) !== caseId);
  if (misplaced !== undefined) {
    return broken('results', `The results of case “${misplaced.caseId}” are not where they were frozen.`);
  }
  const hash = resultsHashOf(outcomes);
  if (hash === resultsHash) return matches('results', `The frozen results have the SHA-256 ${hash}.`);
  return broken(
    'results',
    `The results are not those that were frozen: their SHA-256 is ${hash}, and was ${resultsHash}.`,
  );
}

/** Letter, title, reason, version, hashes, engine, who and when: the log holds their hash from the moment of the freeze. */
export function verifyRecord(row: RevisionRow, entries: readonly LogEntry[]): VerificationStep {
  const freezes = entries.filter(({ action }) => action === 'revision.freeze');
  const [freeze] = freezes;
  if (freeze === undefined) return broken('record', 'The log does not hold that this revision was frozen.');
  if (freezes.length > 1) return broken('record', 'The log holds more than once that this revision was frozen.');
  if (freeze.recordHash !== sha256(recordText(row))) {
    return broken(
      'record',
      `What the revision says of itself (letter, title, reason, version, hashes, engine, who and when) is not what entry ${freeze.seq} of the log holds.`,
    );
  }
  return matches('record', `What the revision says of itself is what entry ${freeze.seq} of the log holds.`);
}

function caseIdOf(result: string): unknown {
  const outcome = parsedJson(result);
  return typeof outcome === 'object' && outcome !== null && 'caseId' in outcome ? outcome.caseId : undefined;
}
