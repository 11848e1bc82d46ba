import { createHash } from 'node:crypto';
import { and, eq, sql } from 'drizzle-orm';
import type { Queries } from '../platform/db/database';
import { readingPhotos, readings, rounds } from '../platform/db/schema';

type PhotoRow = typeof readingPhotos.$inferSelect;

/** Photographs beside readings, with their bytes, so that a backup holds them. */
export class PhotoRepository {
  constructor(private readonly db: Queries) {}

  /** Of any network: ids are made on devices. */
  find(id: string): Pick<PhotoRow, 'readingId' | 'sha256'> | undefined {
    return this.db
      .select({ readingId: readingPhotos.readingId, sha256: readingPhotos.sha256 })
      .from(readingPhotos)
      .where(eq(readingPhotos.id, id))
      .get();
  }

  countOf(readingId: string): number {
    const count = this.db.select({ count: sql<number>`count(*)` }).from(readingPhotos);
    return count.where(eq(readingPhotos.readingId, readingId)).get()?.count ?? 0;
  }

  insert(photo: PhotoRow): void {
    this.db.insert(readingPhotos).values(photo).run();
  }

  /** The photograph, where the reading is of that network and it is one of its. */
  content(networkId: string, readingId: string, id: string): Pick<PhotoRow, 'mediaType' | 'content'> | undefined {
    return this.db
      .select({ mediaType: readingPhotos.mediaType, content: readingPhotos.content })
      .from(readingPhotos)
      .innerJoin(readings, eq(readings.id, readingPhotos.readingId))
      .innerJoin(rounds, eq(rounds.id, readings.roundId))
      .where(and(eq(readingPhotos.id, id), eq(readingPhotos.readingId, readingId), eq(rounds.networkId, networkId)))
      .get();
  }
}

export function photoHash(content: Buffer): string {
  return createHash('sha256').update(content).digest('hex');
}
