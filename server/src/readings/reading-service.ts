import type { NewReading, Reading } from '@riseback/contracts';
import type { Gauge } from '@riseback/network';
import type { NetworkAccess } from '../platform/auth/access';
import { conflict, unprocessable } from '../platform/problem';
import { deviceTime } from './device-time';
import type { ReadingRepository, ReadingRow } from './reading-repository';
import type { RoundRow } from './round-repository';
import { recordReading } from './round-records';
import { entryOf, readingOf, roundOf, type RoundParts } from './round-service';

/** A hundred gauges, read and corrected many times over. */
const MOST_READINGS = 5_000;

/** Readings as devices send them: perhaps late, twice or out of order; each is stored once, with its own time and place. */
export class ReadingService {
  constructor(private readonly parts: RoundParts) {}

  /**
   * Stores a reading; sent again, it answers as the first time.
   * @throws ProblemError 400 its time; 404 no such round or gauge; 409 the id or the device's number is taken by another, the gauge is
   *   retired, the round is closed, or what it replaces was replaced or is not here
   */
  take(access: NetworkAccess, roundId: string, input: NewReading): Reading {
    const taken = this.parts.rounds.transaction((rounds) => {
      const round = roundOf(rounds, access, roundId);
      const { readings } = rounds;
      const known = readings.find(input.id);
      if (known !== undefined) {
        if (!isSame(known, roundId, input)) throw takenId();
        return false;
      }
      demandOpen(round, input);
      demandNumber(readings, input);
      const now = this.parts.now();
      const takenAt = deviceTime(input.takenAt, 'takenAt', now);
      const gauge = this.gaugeOf(access, readings, round, input);
      if (readings.countOf(roundId) >= MOST_READINGS) {
        throw unprocessable(`A round holds ${MOST_READINGS} readings at most. Begin another round.`);
      }
      const received = { roundId, gauge, takenAt, receivedAt: now.toISOString() };
      recordReading(rounds, rowOf(input, received, access), entryOf(access, now));
      return true;
    });
    if (taken) this.parts.listener.roundsChanged(access.networkId, roundId);
    return readingOf(this.parts.rounds.readings.withName(input.id));
  }

  /** As it was when it was read: a correction is of the same gauge as what it replaces, also if that was changed since. */
  private gaugeOf(
    access: NetworkAccess,
    readings: ReadingRepository,
    round: RoundRow,
    { gaugeId, replaces }: NewReading,
  ): Gauge {
    if (replaces === undefined) return this.parts.documents.gauge(access, round.networkVersion, gaugeId);
    const former = readings.find(replaces);
    if (former?.roundId !== round.id) {
      throw conflict(
        'The reading that this one corrects is not in this round. If it is still on its way, send it first, then the correction again.',
        { awaited: replaces },
      );
    }
    if (former.gaugeId !== gaugeId) {
      throw conflict(
        `A correction is of the same gauge as what it replaces, ${former.gauge.tag ?? former.gaugeId}. Take a reading of the other gauge.`,
      );
    }
    const newer = readings.replacementOf(replaces);
    if (newer !== undefined) {
      throw conflict(`This reading was corrected already, by ${newer}: correct that one.`, { replacedBy: newer });
    }
    return former.gauge;
  }
}

/** What the server adds to a reading. */
type Received = Pick<ReadingRow, 'roundId' | 'gauge' | 'takenAt' | 'receivedAt'>;

function rowOf(input: NewReading, received: Received, { person }: NetworkAccess): ReadingRow {
  const { id, gaugeId, valuePa, whyNot, note, deviceId, deviceSeq, replaces } = input;
  return {
    ...{ id, gaugeId, note, deviceId, deviceSeq, ...received, personId: person.id },
    valuePa: valuePa ?? null,
    whyNot: whyNot ?? null,
    replaces: replaces ?? null,
  };
}

/** Whoever sends it again: a device may have changed hands before the answer came. */
function isSame(known: ReadingRow, roundId: string, input: NewReading): boolean {
  return (
    known.roundId === roundId &&
    known.gaugeId === input.gaugeId &&
    known.valuePa === (input.valuePa ?? null) &&
    known.whyNot === (input.whyNot ?? null) &&
    known.note === input.note &&
    known.takenAt === new Date(input.takenAt).toISOString() &&
    known.deviceId === input.deviceId &&
    known.deviceSeq === input.deviceSeq &&
    known.replaces === (input.replaces ?? null)
  );
}

function demandOpen({ closedAt }: RoundRow, { replaces }: NewReading): void {
  if (closedAt === null || replaces !== undefined) return;
  throw conflict(
    `The round was closed at ${closedAt}; only corrections are taken since. Nothing was stored. Begin another round and send the reading there.`,
  );
}

function demandNumber(readings: ReadingRepository, { deviceId, deviceSeq }: NewReading): void {
  if (readings.numbered(deviceId, deviceSeq) === undefined) return;
  throw conflict(`The device gave number ${deviceSeq} to another reading: give every reading the next number.`);
}

function takenId(): Error {
  return conflict('This id is taken by another reading: give every reading a new UUID, and a correction too.');
}
