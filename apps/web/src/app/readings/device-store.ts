import { Injectable } from '@angular/core';
import type { NewReading, NewRound, Problem, Round } from '@riseback/contracts';
import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { FieldSheet } from './field-sheet';
import type { KnownReading, KnownRound, OutboxItem, QueuedItem } from './kept-items';
import type { Outbox } from './send-in-order';

interface DeviceRecord {
  readonly id: string;
  /** The number of the last reading taken on this device. */
  readonly lastSeq: number;
}

interface ReadingDb extends DBSchema {
  device: { key: string; value: DeviceRecord };
  sheets: { key: [string, string]; value: FieldSheet };
  /** Gauge ids as the person walks them, by network. */
  walks: { key: string; value: readonly string[] };
  rounds: { key: string; value: KnownRound; indexes: { network: string } };
  readings: { key: string; value: KnownReading; indexes: { round: string } };
  outbox: { key: number; value: OutboxItem; indexes: { person: string } };
}

export interface PhotoToKeep {
  readonly photoId: string;
  readonly mediaType: string;
  readonly content: ArrayBuffer;
}

export type ReadingToKeep = Omit<NewReading, 'deviceId' | 'deviceSeq'>;

const NAME = 'riseback-readings';

/** Rounds and readings in the browser's own database: what is needed with no signal, and what the server has yet to be told. */
@Injectable({ providedIn: 'root' })
export class DeviceStore implements Outbox {
  private opened: Promise<IDBPDatabase<ReadingDb>> | undefined;

  async sheet(personId: string, networkId: string): Promise<FieldSheet | undefined> {
    return (await this.database()).get('sheets', [personId, networkId]);
  }

  /** The person whose sheet of a network was kept last; for a page that is opened while nobody can be asked. */
  async lastSheetOf(networkId: string): Promise<FieldSheet | undefined> {
    const sheets = await (await this.database()).getAll('sheets');
    return sheets.filter((sheet) => sheet.networkId === networkId).sort((a, b) => b.at.localeCompare(a.at))[0];
  }

  async keepSheet(sheet: FieldSheet): Promise<void> {
    await (await this.database()).put('sheets', sheet, [sheet.personId, sheet.networkId]);
  }

  async walk(networkId: string): Promise<readonly string[]> {
    return (await (await this.database()).get('walks', networkId)) ?? [];
  }

  async keepWalk(networkId: string, gaugeIds: readonly string[]): Promise<void> {
    await (await this.database()).put('walks', gaugeIds, networkId);
  }

  async rounds(personId: string, networkId: string): Promise<readonly KnownRound[]> {
    const rounds = await (await this.database()).getAllFromIndex('rounds', 'network', networkId);
    return rounds.filter((round) => round.personId === personId);
  }

  async readings(roundId: string): Promise<readonly KnownReading[]> {
    return (await this.database()).getAllFromIndex('readings', 'round', roundId);
  }

  /** What the server told of a round; what this device has yet to tell it stays. */
  async learn(personId: string, round: Round): Promise<void> {
    const transaction = (await this.database()).transaction(['rounds', 'readings'], 'readwrite');
    const [rounds, readings] = [transaction.objectStore('rounds'), transaction.objectStore('readings')];
    const { id, networkId, networkVersion, caseId, title, startedAt } = round;
    const closedAt = round.closedAt ?? (await rounds.get(id))?.closedAt;
    const known = { id, personId, networkId, networkVersion, caseId, title, startedAt };
    await rounds.put(closedAt === undefined ? known : { ...known, closedAt });
    for (const reading of round.readings) await readings.put(knownReading(round, reading));
    await transaction.done;
  }

  /** Begins a round, here and in the queue at once. */
  async beginRound(personId: string, networkId: string, body: NewRound): Promise<void> {
    const transaction = (await this.database()).transaction(['rounds', 'outbox'], 'readwrite');
    await Promise.all([
      transaction.objectStore('rounds').put({ ...body, personId, networkId }),
      transaction.objectStore('outbox').add({ kind: 'round', personId, networkId, roundId: body.id, body }),
      transaction.done,
    ]);
  }

  async closeRound(round: KnownRound, closedAt: string): Promise<void> {
    const { personId, networkId, id: roundId } = round;
    const transaction = (await this.database()).transaction(['rounds', 'outbox'], 'readwrite');
    await Promise.all([
      transaction.objectStore('rounds').put({ ...round, closedAt }),
      transaction.objectStore('outbox').add({ kind: 'closing', personId, networkId, roundId, body: { closedAt } }),
      transaction.done,
    ]);
  }

  /** Keeps a reading with its number and its photographs: all of it or nothing, whenever the device gives out. */
  async keepReading(round: KnownRound, reading: ReadingToKeep, photos: readonly PhotoToKeep[]): Promise<void> {
    const { personId, networkId, id: roundId } = round;
    const database = await this.database();
    const transaction = database.transaction(['device', 'readings', 'outbox'], 'readwrite');
    const [device, outbox] = [transaction.objectStore('device'), transaction.objectStore('outbox')];
    const { id, lastSeq } = (await device.get('device')) ?? { id: crypto.randomUUID(), lastSeq: 0 };
    const body: NewReading = { ...reading, deviceId: id, deviceSeq: lastSeq + 1 };
    await device.put({ id, lastSeq: lastSeq + 1 }, 'device');
    await transaction.objectStore('readings').put({ ...reading, networkId, roundId, waiting: true });
    await outbox.add({ kind: 'reading', personId, networkId, roundId, body });
    for (const photo of photos) {
      await outbox.add({ kind: 'photo', personId, networkId, roundId, readingId: reading.id, ...photo });
    }
    await transaction.done;
  }

  async waiting(personId: string): Promise<readonly QueuedItem[]> {
    const outbox = (await this.database()).transaction('outbox').store.index('person');
    const queued: QueuedItem[] = [];
    for await (const { primaryKey, value } of outbox.iterate(personId)) queued.push({ place: primaryKey, item: value });
    return queued;
  }

  async sent({ place, item }: QueuedItem): Promise<void> {
    const transaction = (await this.database()).transaction(['outbox', 'readings'], 'readwrite');
    await transaction.objectStore('outbox').delete(place);
    if (item.kind === 'reading') {
      const readings = transaction.objectStore('readings');
      const reading = await readings.get(item.body.id);
      if (reading !== undefined) await readings.put({ ...reading, waiting: false });
    }
    await transaction.done;
  }

  async refused({ place, item }: QueuedItem, problem: Problem): Promise<void> {
    await (await this.database()).put('outbox', { ...item, refused: problem }, place);
  }

  /** All that was refused goes once more, in its old place. */
  async tryRefusedAgain(personId: string): Promise<void> {
    const transaction = (await this.database()).transaction('outbox', 'readwrite');
    for await (const cursor of transaction.store.index('person').iterate(personId)) {
      if (cursor.value.refused === undefined) continue;
      const { refused: _, ...item } = cursor.value;
      await cursor.update(item as OutboxItem);
    }
    await transaction.done;
  }

  private database(): Promise<IDBPDatabase<ReadingDb>> {
    this.opened ??= openDB<ReadingDb>(NAME, 1, {
      upgrade: (database) => {
        database.createObjectStore('device');
        database.createObjectStore('sheets');
        database.createObjectStore('walks');
        database.createObjectStore('rounds', { keyPath: 'id' }).createIndex('network', 'networkId');
        database.createObjectStore('readings', { keyPath: 'id' }).createIndex('round', 'roundId');
        database.createObjectStore('outbox', { autoIncrement: true }).createIndex('person', 'personId');
      },
    });
    return this.opened;
  }
}

function knownReading(round: Round, reading: Round['readings'][number]): KnownReading {
  const { id, gaugeId, valuePa, whyNot, note, takenAt, replaces, personName } = reading;
  return {
    id,
    gaugeId,
    note,
    takenAt,
    personName,
    networkId: round.networkId,
    roundId: round.id,
    waiting: false,
    ...(valuePa === undefined ? {} : { valuePa }),
    ...(whyNot === undefined ? {} : { whyNot }),
    ...(replaces === undefined ? {} : { replaces }),
  };
}
