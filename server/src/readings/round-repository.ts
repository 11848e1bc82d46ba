import { and, asc, desc, eq, isNull, sql } from 'drizzle-orm';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { people, readings, rounds } from '../platform/db/schema';
import { PhotoRepository } from './photo-repository';
import { ReadingRepository } from './reading-repository';

export type RoundRow = typeof rounds.$inferSelect;
export type NamedRound = RoundRow & { readonly personName: string };

/** How many gauges of a round were read, and how many could not be. */
export interface RoundCount {
  readonly read: number;
  readonly notRead: number;
}

/** Rounds of readings, through the connection or one transaction on it. */
export class RoundRepository {
  readonly readings: ReadingRepository;
  readonly photos: PhotoRepository;

  constructor(private readonly db: Queries) {
    this.readings = new ReadingRepository(db);
    this.photos = new PhotoRepository(db);
  }

  transaction<T>(change: (rounds: RoundRepository) => T): T {
    return this.db.transaction((tx) => change(new RoundRepository(tx)), { behavior: 'immediate' });
  }

  /** Of any network: ids are made on devices. */
  find(id: string): RoundRow | undefined {
    return this.db.select().from(rounds).where(eq(rounds.id, id)).get();
  }

  /** The rounds of a network, the newest first. */
  ofNetwork(networkId: string): NamedRound[] {
    return this.named(eq(rounds.networkId, networkId));
  }

  ofId(networkId: string, id: string): NamedRound | undefined {
    return this.named(and(eq(rounds.networkId, networkId), eq(rounds.id, id)))[0];
  }

  countOf(networkId: string): number {
    const count = this.db.select({ count: sql<number>`count(*)` }).from(rounds);
    return count.where(eq(rounds.networkId, networkId)).get()?.count ?? 0;
  }

  insert(row: RoundRow): void {
    this.db.insert(rounds).values(row).run();
  }

  close(id: string, closedAt: string): void {
    this.db
      .update(rounds)
      .set({ closedAt })
      .where(and(eq(rounds.id, id), isNull(rounds.closedAt)))
      .run();
  }

  /** Of each round of a network that has readings; what was replaced does not count. */
  counts(networkId: string): Map<string, RoundCount> {
    const isReplaced = sql`exists (select 1 from ${readings} newer where newer.replaces = ${readings.id})`;
    const read = sql<number>`count(distinct case when ${readings.valuePa} is not null then ${readings.gaugeId} end)`;
    const rows = this.db
      .select({ roundId: readings.roundId, read, gauges: sql<number>`count(distinct ${readings.gaugeId})` })
      .from(readings)
      .innerJoin(rounds, eq(rounds.id, readings.roundId))
      .where(and(eq(rounds.networkId, networkId), sql`not ${isReplaced}`))
      .groupBy(readings.roundId)
      .all();
    return new Map(rows.map(({ roundId, read, gauges }) => [roundId, { read, notRead: gauges - read }]));
  }

  audit(entry: AuditEntry): void {
    appendAudit(this.db, entry);
  }

  private named(where: ReturnType<typeof and>): NamedRound[] {
    return this.db
      .select({ round: rounds, personName: people.name })
      .from(rounds)
      .innerJoin(people, eq(people.id, rounds.personId))
      .where(where)
      .orderBy(desc(rounds.startedAt), asc(rounds.id))
      .all()
      .map(({ round, personName }) => ({ ...round, personName }));
  }
}
