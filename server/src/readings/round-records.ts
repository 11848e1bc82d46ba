import type { AuditEntry } from '../platform/db/audit';
import type { ReadingRow } from './reading-repository';
import type { RoundRepository, RoundRow } from './round-repository';

/** Who does it, where and when, as the log keeps it. */
export type DoneBy = Pick<AuditEntry, 'at' | 'personId' | 'sessionId' | 'siteId'>;

/** What is written of a round, each with its entry in the log; in the transaction that the caller holds. */
export function recordRound(rounds: RoundRepository, row: RoundRow, by: DoneBy): void {
  rounds.insert(row);
  const { networkVersion, caseId, startedAt } = row;
  rounds.audit({ ...by, action: 'round.begin', subject: row.id, details: { networkVersion, caseId, startedAt } });
}

export function recordReading(rounds: RoundRepository, row: ReadingRow, by: DoneBy): void {
  rounds.readings.insert(row);
  const { id, roundId, gaugeId, valuePa, whyNot, replaces, takenAt } = row;
  const said = valuePa === null ? { whyNot } : { valuePa };
  const details = { roundId, gaugeId, ...said, ...(replaces === null ? {} : { replaces }), takenAt };
  const action = replaces === null ? 'reading.take' : 'reading.correct';
  rounds.audit({ ...by, action, subject: id, details });
}

export function recordClosing(rounds: RoundRepository, id: string, closedAt: string, by: DoneBy): void {
  rounds.close(id, closedAt);
  rounds.audit({ ...by, action: 'round.close', subject: id, details: { closedAt } });
}
