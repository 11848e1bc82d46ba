import { createHash } from 'node:crypto';
import type { ImageType } from '@riseback/contracts';
import { and, eq } from 'drizzle-orm';
import type { Queries } from '../platform/db/database';
import { files } from '../platform/db/schema';

export type FilePurpose = typeof files.$inferSelect.purpose;

export interface NewFile {
  readonly id: string;
  readonly siteId: string;
  readonly purpose: FilePurpose;
  /** As it is shown; nothing is ever looked up or stored under it. */
  readonly name: string;
  readonly mediaType: ImageType;
  readonly content: Buffer;
  readonly createdBy: string;
  readonly createdAt: string;
}

/** What came in as files: their bytes are in the database, so that a backup holds them and no path is ever made of a name. */
export class FileRepository {
  constructor(private readonly db: Queries) {}

  /** @returns the content's SHA-256, in hex */
  insert(file: NewFile): string {
    const sha256 = createHash('sha256').update(file.content).digest('hex');
    this.db
      .insert(files)
      .values({ ...file, sizeBytes: file.content.length, sha256 })
      .run();
    return sha256;
  }

  /** The bytes of a file of the site; undefined where the site has no such file. */
  content(siteId: string, id: string): { readonly mediaType: ImageType; readonly content: Buffer } | undefined {
    return this.db
      .select({ mediaType: files.mediaType, content: files.content })
      .from(files)
      .where(and(eq(files.id, id), eq(files.siteId, siteId)))
      .get();
  }

  /** For what nothing points at any more. */
  delete(id: string): void {
    this.db.delete(files).where(eq(files.id, id)).run();
  }
}
