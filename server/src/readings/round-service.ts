import type { NewRound, Reading, Round, RoundClosing, RoundSummary } from '@riseback/contracts';
import type { NetworkAccess } from '../platform/auth/access';
import { badRequest, conflict, notFound, unprocessable } from '../platform/problem';
import { deviceTime } from './device-time';
import type { NamedReading } from './reading-repository';
import type { RoundDocuments } from './round-documents';
import { recordClosing, recordRound } from './round-records';
import type { NamedRound, RoundCount, RoundRepository, RoundRow } from './round-repository';

/** Told of every change of a network's rounds, for those who have it open. */
export interface RoundListener {
  roundsChanged(networkId: string, roundId: string): void;
}

export interface RoundParts {
  readonly rounds: RoundRepository;
  readonly documents: RoundDocuments;
  readonly listener: RoundListener;
  readonly now: () => Date;
}

const MOST_ROUNDS = 10_000;
const NONE: RoundCount = { read: 0, notRead: 0 };

/** Rounds of readings: begun and closed on a device, which may have had no signal then. */
export class RoundService {
  constructor(private readonly parts: RoundParts) {}

  list({ networkId }: NetworkAccess): RoundSummary[] {
    const counts = this.parts.rounds.counts(networkId);
    return this.parts.rounds.ofNetwork(networkId).map((round) => summaryOf(round, counts.get(round.id)));
  }

  /** @throws ProblemError 404 */
  get({ networkId }: NetworkAccess, id: string): Round {
    const { rounds } = this.parts;
    const round = rounds.ofId(networkId, id);
    if (round === undefined) throw noSuchRound();
    const readings = rounds.readings.ofRound(id).map(readingOf);
    return { ...summaryOf(round, rounds.counts(networkId).get(id)), networkId, readings };
  }

  /**
   * Begins a round; sent again, it is the same round.
   * @throws ProblemError 400 its time; 404 no such version; 409 the id is taken by another round; 422 no such case
   */
  begin(access: NetworkAccess, input: NewRound): Round {
    const { networkId, person } = access;
    const begun = this.parts.rounds.transaction((rounds) => {
      const known = rounds.find(input.id);
      if (known !== undefined) {
        if (!isSame(known, networkId, input)) throw taken();
        return false;
      }
      const now = this.parts.now();
      const { id, networkVersion, caseId, title } = input;
      const startedAt = deviceTime(input.startedAt, 'startedAt', now);
      this.demandCase(access, networkVersion, caseId);
      if (rounds.countOf(networkId) >= MOST_ROUNDS) {
        throw unprocessable(`A network holds ${MOST_ROUNDS} rounds at most.`);
      }
      const row = { id, networkId, networkVersion, caseId, title, startedAt, personId: person.id, closedAt: null };
      recordRound(rounds, row, entryOf(access, now));
      return true;
    });
    if (begun) this.parts.listener.roundsChanged(networkId, input.id);
    return this.get(access, input.id);
  }

  /**
   * Closes a round: nothing but corrections is taken after it. Closed already, by whom ever, it stays as it is.
   * @throws ProblemError 400 its time; 404
   */
  close(access: NetworkAccess, id: string, input: RoundClosing): Round {
    const { networkId } = access;
    const closed = this.parts.rounds.transaction((rounds) => {
      const round = roundOf(rounds, access, id);
      if (round.closedAt !== null) return false;
      const now = this.parts.now();
      const closedAt = deviceTime(input.closedAt, 'closedAt', now);
      if (closedAt < round.startedAt) {
        throw badRequest(`The round began at ${round.startedAt}; it cannot have ended before. Put the time right.`, [
          { pointer: '/closedAt', detail: `not before ${round.startedAt}` },
        ]);
      }
      recordClosing(rounds, id, closedAt, entryOf(access, now));
      return true;
    });
    if (closed) this.parts.listener.roundsChanged(networkId, id);
    return this.get(access, id);
  }

  /** Results are made of the cases where there are any, of the plain network where there are none. */
  private demandCase(access: NetworkAccess, version: number, caseId: string): void {
    const cases = this.parts.documents.at(access, version)?.cases;
    if (cases === undefined || cases.has(caseId) || (caseId === '' && cases.size === 0)) return;
    const detail = cases.size === 0 ? '"": the network has no cases' : 'the id of one of the cases of the version';
    throw unprocessable(`Version ${version} of the network has no results for the case "${caseId}".`, [
      { pointer: '/caseId', detail },
    ]);
  }
}

/** @throws ProblemError 404 */
export function roundOf(rounds: RoundRepository, { networkId }: NetworkAccess, id: string): RoundRow {
  const round = rounds.find(id);
  if (round?.networkId !== networkId) throw noSuchRound();
  return round;
}

export function readingOf({ roundId: _round, valuePa, whyNot, replaces, ...reading }: NamedReading): Reading {
  return {
    ...reading,
    ...(valuePa === null ? {} : { valuePa }),
    ...(whyNot === null ? {} : { whyNot }),
    ...(replaces === null ? {} : { replaces }),
  };
}

export function entryOf({ person, siteId }: NetworkAccess, at: Date) {
  return { at, personId: person.id, sessionId: person.sessionId, siteId };
}

function summaryOf({ networkId: _network, closedAt, ...round }: NamedRound, count: RoundCount = NONE): RoundSummary {
  const name = round.title === '' ? round.startedAt.slice(0, 10) : round.title;
  return { ...round, name, ...(closedAt === null ? {} : { closedAt }), ...count };
}

/** Whoever sends it again: a device may have changed hands before the answer came. */
function isSame(known: RoundRow, networkId: string, input: NewRound): boolean {
  return (
    known.networkId === networkId &&
    known.networkVersion === input.networkVersion &&
    known.caseId === input.caseId &&
    known.title === input.title &&
    known.startedAt === new Date(input.startedAt).toISOString()
  );
}

function taken(): Error {
  return conflict('This id is taken by another round: give every round a new UUID.');
}

function noSuchRound(): Error {
  return notFound('The network has no such round of readings; if it was begun without a signal, send the round first.');
}
