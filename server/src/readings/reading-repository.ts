import { Gauge } from '@riseback/network';
import { and, asc, eq, sql, type SQL } from 'drizzle-orm';
import type { Queries } from '../platform/db/database';
import { people, readingPhotos, readings } from '../platform/db/schema';

type Stored = typeof readings.$inferSelect;
export type ReadingRow = Omit<Stored, 'gauge'> & { readonly gauge: Gauge };
export type NamedReading = ReadingRow & { readonly personName: string; readonly photoIds: string[] };

/** The readings of rounds, and their photographs. */
export class ReadingRepository {
  constructor(private readonly db: Queries) {}

  /** By device and number: as they were taken on each, in whichever order they came in. */
  ofRound(roundId: string): NamedReading[] {
    return this.named(eq(readings.roundId, roundId));
  }

  /** @throws Error for a reading that is not stored */
  withName(id: string): NamedReading {
    const [reading] = this.named(eq(readings.id, id));
    if (reading === undefined) throw new Error(`reading ${id} is not stored`);
    return reading;
  }

  /** Of any network: ids are made on devices. */
  find(id: string): ReadingRow | undefined {
    const row = this.db.select().from(readings).where(eq(readings.id, id)).get();
    return row === undefined ? undefined : rowOf(row);
  }

  /** The id of the reading that a device gave this number. */
  numbered(deviceId: string, deviceSeq: number): string | undefined {
    return this.db
      .select({ id: readings.id })
      .from(readings)
      .where(and(eq(readings.deviceId, deviceId), eq(readings.deviceSeq, deviceSeq)))
      .get()?.id;
  }

  /** The id of the correction that took the place of a reading. */
  replacementOf(id: string): string | undefined {
    return this.db.select({ id: readings.id }).from(readings).where(eq(readings.replaces, id)).get()?.id;
  }

  countOf(roundId: string): number {
    const count = this.db.select({ count: sql<number>`count(*)` }).from(readings);
    return count.where(eq(readings.roundId, roundId)).get()?.count ?? 0;
  }

  insert({ gauge, ...row }: ReadingRow): void {
    this.db
      .insert(readings)
      .values({ ...row, gauge })
      .run();
  }

  private named(where: SQL): NamedReading[] {
    const photos = this.photoIds(where);
    return this.db
      .select({ reading: readings, personName: people.name })
      .from(readings)
      .innerJoin(people, eq(people.id, readings.personId))
      .where(where)
      .orderBy(asc(readings.deviceId), asc(readings.deviceSeq))
      .all()
      .map(({ reading, personName }) => ({ ...rowOf(reading), personName, photoIds: photos.get(reading.id) ?? [] }));
  }

  private photoIds(where: SQL): Map<string, string[]> {
    const rows = this.db
      .select({ id: readingPhotos.id, readingId: readingPhotos.readingId })
      .from(readingPhotos)
      .innerJoin(readings, eq(readings.id, readingPhotos.readingId))
      .where(where)
      .orderBy(asc(sql`${readingPhotos}.rowid`))
      .all();
    const ids = new Map<string, string[]>();
    for (const { id, readingId } of rows) ids.set(readingId, [...(ids.get(readingId) ?? []), id]);
    return ids;
  }
}

function rowOf({ gauge, ...row }: Stored): ReadingRow {
  return { ...row, gauge: Gauge.parse(gauge) };
}
