import { RevisionEvent, Signature } from '@riseback/contracts';
import { and, asc, desc, eq, lt, sql } from 'drizzle-orm';
import type { Queries } from '../platform/db/database';
import { people, revisionEvents, revisionResults, revisions, signatures } from '../platform/db/schema';
import type { FrozenState, PreviousRevision } from './report-content';
import type { ReportMaterial } from './report-material';

type Frozen = Omit<FrozenState, 'editsSince' | 'presentEngineVersion'>;

/** A revision as a report takes it: its texts are not taken apart here. */
export interface FrozenRevision {
  readonly state: Frozen;
  readonly fileHash: string;
  readonly solverHash: string;
  readonly engineVersion: string;
  readonly fileText: string;
  readonly outcomesText: string;
}

type RevisionRow = typeof revisions.$inferSelect;

/** Reads frozen revisions for reports; what makes and moves them is elsewhere. */
export class FrozenStateRepository {
  constructor(private readonly db: Queries) {}

  find(networkId: string, revisionId: string): FrozenRevision | undefined {
    const row = this.db
      .select({ revision: revisions, createdByName: people.name })
      .from(revisions)
      .innerJoin(people, eq(people.id, revisions.createdBy))
      .where(and(eq(revisions.id, revisionId), eq(revisions.networkId, networkId)))
      .get();
    if (row === undefined) return undefined;
    const { revision, createdByName } = row;
    const { id, letter, title, reason, networkVersion: version, createdAt, resultsHash } = revision;
    const events = this.events(id);
    const { fileHash, solverHash, engineVersion, file: fileText } = revision;
    return {
      state: {
        kind: 'revision',
        ...{ id, letter, title, reason, version, createdAt, createdByName, resultsHash, events },
        state: events.at(-1)?.state ?? 'draft',
        signatures: this.signatures(id),
      },
      ...{ fileHash, solverHash, engineVersion, fileText },
      outcomesText: this.outcomesText(id),
    };
  }

  letterOf(networkId: string, revisionId: string): string | undefined {
    return this.db
      .select({ letter: revisions.letter })
      .from(revisions)
      .where(and(eq(revisions.id, revisionId), eq(revisions.networkId, networkId)))
      .get()?.letter;
  }

  /** The one frozen last before that time; by default the newest of all. */
  before(networkId: string, createdAt?: string): ReportMaterial['previous'] {
    const row = this.db
      .select()
      .from(revisions)
      .where(
        and(
          eq(revisions.networkId, networkId),
          createdAt === undefined ? undefined : lt(revisions.createdAt, createdAt),
        ),
      )
      .orderBy(desc(revisions.createdAt), desc(revisions.networkVersion))
      .limit(1)
      .get();
    return row === undefined ? undefined : this.previousOf(row);
  }

  private previousOf({ id, letter, title, createdAt, engineVersion, file }: RevisionRow) {
    return {
      ...{ letter, title, createdAt, engineVersion, fileText: file },
      state: this.events(id).at(-1)?.state ?? ('draft' satisfies PreviousRevision['state']),
      outcomesText: this.outcomesText(id),
    };
  }

  private events(revisionId: string): RevisionEvent[] {
    return this.db
      .select({ event: revisionEvents, personName: people.name })
      .from(revisionEvents)
      .innerJoin(people, eq(people.id, revisionEvents.personId))
      .where(eq(revisionEvents.revisionId, revisionId))
      .orderBy(asc(revisionEvents.seq))
      .all()
      .map(({ event, personName }) => RevisionEvent.parse({ ...event, personName }));
  }

  private signatures(revisionId: string): Signature[] {
    return this.db
      .select({ signature: signatures, personName: people.name })
      .from(signatures)
      .innerJoin(people, eq(people.id, signatures.personId))
      .where(eq(signatures.revisionId, revisionId))
      .orderBy(asc(signatures.seq))
      .all()
      .map(({ signature, personName }) => {
        // role and time are in the statement alone, which is what was signed
        const stated = JSON.parse(signature.statement) as { readonly role: unknown; readonly at: unknown };
        return Signature.parse({ ...signature, personName, role: stated.role, at: stated.at });
      });
  }

  private outcomesText(revisionId: string): string {
    const texts = this.db
      .select({ text: sql<string>`${revisionResults.result}` })
      .from(revisionResults)
      .where(eq(revisionResults.revisionId, revisionId))
      .orderBy(asc(revisionResults.ordinal))
      .all()
      .map(({ text }) => text);
    return `[${texts.join(',')}]`;
  }
}
