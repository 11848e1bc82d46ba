import type { NetworkPlan, PlanPlacement } from '@riseback/contracts';
import { eq } from 'drizzle-orm';
import { FileRepository } from '../files/file-repository';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { files, people, plans } from '../platform/db/schema';

interface StoredPlacement extends PlanPlacement {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Absent = the plan was taken away; its row stays, so that versions go on. */
  readonly fileId?: string;
}

/** What lies under each drawing, with the image in `files`. */
export class PlanRepository {
  readonly files: FileRepository;

  constructor(private readonly db: Queries) {
    this.files = new FileRepository(db);
  }

  transaction<T>(change: (plans: PlanRepository) => T): T {
    return this.db.transaction((tx) => change(new PlanRepository(tx)), { behavior: 'immediate' });
  }

  of(networkId: string): NetworkPlan {
    const row = this.db
      .select({
        plan: plans,
        file: { name: files.name, mediaType: files.mediaType, sizeBytes: files.sizeBytes, uploadedAt: files.createdAt },
        uploadedBy: people.name,
      })
      .from(plans)
      .leftJoin(files, eq(files.id, plans.fileId))
      .leftJoin(people, eq(people.id, files.createdBy))
      .where(eq(plans.networkId, networkId))
      .get();
    if (row === undefined) return { version: 0 };
    const { networkId: _network, version, fileId, metresPerUnit, ...placement } = row.plan;
    if (fileId === null || row.file === null || row.uploadedBy === null) return { version };
    return {
      version,
      plan: {
        ...placement,
        ...(metresPerUnit === null ? {} : { metresPerUnit }),
        fileId,
        ...row.file,
        uploadedBy: row.uploadedBy,
      },
    };
  }

  /** Takes the place of whatever was stored. */
  save(networkId: string, version: number, { fileId, metresPerUnit, ...placement }: StoredPlacement): void {
    const row = { ...placement, version, fileId: fileId ?? null, metresPerUnit: metresPerUnit ?? null };
    this.db
      .insert(plans)
      .values({ networkId, ...row })
      .onConflictDoUpdate({ target: plans.networkId, set: row })
      .run();
  }

  audit(entry: AuditEntry): void {
    appendAudit(this.db, entry);
  }
}
