import { SavedLibraryModel, type LibraryModel } from '@riseback/contracts';
import { and, desc, eq, sql } from 'drizzle-orm';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { libraryModels, people } from '../platform/db/schema';

/** A version as it is written: `createdBy` is the person's id. */
type NewVersion = SavedLibraryModel & Pick<LibraryModel, 'id' | 'version' | 'createdBy' | 'createdAt'>;

/** The rows of the trap libraries, one a version; they are added and read, never changed. */
export class LibraryRepository {
  constructor(private readonly db: Queries) {}

  transaction<T>(change: (models: LibraryRepository) => T): T {
    return this.db.transaction((tx) => change(new LibraryRepository(tx)), {
      behavior: 'immediate',
    });
  }

  /** Each model of a site in its newest version, by name. */
  newest(siteId: string): LibraryModel[] {
    const latest = this.db
      .select({
        id: libraryModels.id,
        version: sql<number>`max(${libraryModels.version})`.as('latest'),
      })
      .from(libraryModels)
      .where(eq(libraryModels.siteId, siteId))
      .groupBy(libraryModels.id)
      .as('latest_of');
    return this.db
      .select({ row: libraryModels, createdBy: people.name })
      .from(libraryModels)
      .innerJoin(latest, and(eq(latest.id, libraryModels.id), eq(latest.version, libraryModels.version)))
      .innerJoin(people, eq(people.id, libraryModels.createdBy))
      .where(eq(libraryModels.siteId, siteId))
      .orderBy(sql`${libraryModels.name} collate nocase`, libraryModels.id)
      .all()
      .map(modelOf);
  }

  newestOf(siteId: string, id: string): LibraryModel | undefined {
    const found = this.versionsOf(siteId, id).limit(1).get();
    return found === undefined ? undefined : modelOf(found);
  }

  /** The newest first; none where the site has no such model. */
  versions(siteId: string, id: string): LibraryModel[] {
    return this.versionsOf(siteId, id).all().map(modelOf);
  }

  insert(siteId: string, { id, version, name, createdBy, createdAt, ...properties }: NewVersion): void {
    this.db.insert(libraryModels).values({ siteId, id, version, name, properties, createdBy, createdAt }).run();
  }

  audit(entry: AuditEntry): void {
    appendAudit(this.db, entry);
  }

  private versionsOf(siteId: string, id: string) {
    return this.db
      .select({ row: libraryModels, createdBy: people.name })
      .from(libraryModels)
      .innerJoin(people, eq(people.id, libraryModels.createdBy))
      .where(and(eq(libraryModels.siteId, siteId), eq(libraryModels.id, id)))
      .orderBy(desc(libraryModels.version))
      .$dynamic();
  }
}

function modelOf({
  row: { id, version, name, properties, createdAt },
  createdBy,
}: {
  readonly row: typeof libraryModels.$inferSelect;
  readonly createdBy: string;
}): LibraryModel {
  // a column of JSON comes out as unknown; spreading it is safe because the schema reads the whole
  const content = SavedLibraryModel.parse({ ...(properties as object), name });
  return { ...content, id, version, createdBy, createdAt };
}
