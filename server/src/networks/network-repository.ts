import { EditOp, Limits, Method, SiteConditions, type CollectionName, type NetworkDocument } from '@riseback/network';
import { and, asc, eq, gt, isNull, lte, sql } from 'drizzle-orm';
import * as z from 'zod';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { onFirstUse } from '../platform/db/on-first-use';
import { cases, edits, networks, people, sites } from '../platform/db/schema';
import { ElementRepository, type Touched } from './element-repository';

const Ops = z.array(EditOp);

export interface NetworkHead {
  readonly id: string;
  readonly siteId: string;
  readonly siteName: string;
  readonly name: string;
  readonly version: number;
  readonly solverHash: string;
}

/** A network as a list shows it. `firstCaseId` is '' where it has no cases. */
export interface ListedNetwork extends Omit<NetworkHead, 'siteName'> {
  readonly changedAt: string;
  readonly changedBy: string;
  readonly firstCaseId: string;
}

/** One accepted batch. */
export interface StoredEdit {
  readonly networkId: string;
  readonly version: number;
  readonly batchId: string;
  readonly personId: string;
  readonly at: string;
  readonly label: string;
  readonly forward: readonly EditOp[];
  readonly inverse: readonly EditOp[];
  readonly solverHash: string;
}

export interface NewNetwork {
  readonly id: string;
  readonly siteId: string;
  readonly document: NetworkDocument;
  readonly solverHash: string;
  readonly createdBy: string;
  readonly createdAt: string;
}

/** So much of a network's history as one answer carries. */
export interface EditPage {
  readonly edits: (StoredEdit & { readonly personName: string })[];
  /** Whether there are later ones. */
  readonly more: boolean;
}

/** The networks' rows, their elements and their edits, through the connection or one transaction on it. */
export class NetworkRepository {
  private readonly elements: ElementRepository;
  private readonly headQuery;
  private readonly listQuery;
  private readonly sizesQuery;
  private readonly editByBatchQuery;
  private readonly insertEditQuery;

  constructor(private readonly db: Queries) {
    this.elements = new ElementRepository(db);
    this.headQuery = onFirstUse(() => prepareHead(db));
    this.listQuery = onFirstUse(() => prepareList(db));
    this.sizesQuery = onFirstUse(() => prepareSizes(db));
    this.editByBatchQuery = onFirstUse(() => prepareEditByBatch(db));
    this.insertEditQuery = onFirstUse(() => prepareInsertEdit(db));
  }

  /**
   * Runs a change as one transaction. References are checked at its end, so that the
   * order of a batch's steps does not matter.
   */
  transaction<T>(change: (networks: NetworkRepository) => T): T {
    // one connection: what goes through it while the transaction is open is part of it, prepared statements too
    return this.db.transaction(
      () => {
        this.db.run(sql`pragma defer_foreign_keys = on`);
        return change(this);
      },
      { behavior: 'immediate' },
    );
  }

  head(networkId: string): NetworkHead | undefined {
    return this.headQuery().get({ networkId });
  }

  /** The networks of a site that are not archived, by name. */
  list(siteId: string): ListedNetwork[] {
    return this.listQuery().all({ siteId });
  }

  document(networkId: string): NetworkDocument | undefined {
    const row = this.db.select().from(networks).where(eq(networks.id, networkId)).get();
    if (row === undefined) return undefined;
    return {
      name: row.name,
      site: SiteConditions.parse(row.conditions),
      method: Method.parse(row.method),
      limits: Limits.parse(row.limits),
      ...this.elements.read(networkId),
    };
  }

  insert(network: NewNetwork): void {
    const { id, siteId, document, solverHash, createdBy, createdAt } = network;
    this.db
      .insert(networks)
      .values({ id, siteId, version: 1, solverHash, createdBy, createdAt, ...settingsRow(document) })
      .run();
    this.elements.insertAll(id, 1, document);
  }

  /** Stores what a batch made of the network: its own row and the rows of the elements that the batch touched. */
  update(
    networkId: string,
    version: number,
    document: NetworkDocument,
    solverHash: string,
    touched: readonly Touched[],
  ): void {
    this.db
      .update(networks)
      .set({ version, solverHash, ...settingsRow(document) })
      .where(eq(networks.id, networkId))
      .run();
    this.elements.writeTouched(networkId, version, document, touched);
  }

  insertEdit(edit: StoredEdit): void {
    this.insertEditQuery().run({ ...edit });
  }

  audit(entry: AuditEntry): void {
    appendAudit(this.db, entry);
  }

  editByBatch(batchId: string): StoredEdit | undefined {
    const row = this.editByBatchQuery().get({ batchId });
    return row === undefined ? undefined : editOf(row);
  }

  edit(networkId: string, version: number): StoredEdit | undefined {
    const row = this.db
      .select()
      .from(edits)
      .where(and(eq(edits.networkId, networkId), eq(edits.version, version)))
      .get();
    return row === undefined ? undefined : editOf(row);
  }

  /** The accepted batches after a version (up to another), oldest first, with their authors' names. */
  editsSince(
    networkId: string,
    version: number,
    upTo = Number.MAX_SAFE_INTEGER,
  ): (StoredEdit & { readonly personName: string })[] {
    return this.db
      .select({ edit: edits, personName: people.name })
      .from(edits)
      .innerJoin(people, eq(people.id, edits.personId))
      .where(and(eq(edits.networkId, networkId), gt(edits.version, version), lte(edits.version, upTo)))
      .orderBy(asc(edits.version))
      .all()
      .map(({ edit, personName }) => ({ ...editOf(edit), personName }));
  }

  /** As `editsSince`, at most so many and so large together, but one at least. */
  editPage(networkId: string, version: number, { most, bytes }: { most: number; bytes: number }): EditPage {
    const sizes = this.sizesQuery().all({ networkId, version, last: version + most + 1 });
    let [end, room] = [0, bytes];
    while (end < Math.min(most, sizes.length) && (end === 0 || (sizes[end]?.bytes ?? 0) <= room)) {
      room -= sizes[end]?.bytes ?? 0;
      end += 1;
    }
    const last = sizes[end - 1];
    return {
      edits: last === undefined ? [] : this.editsSince(networkId, version, last.version),
      more: end < sizes.length,
    };
  }
}

function prepareEditByBatch(db: Queries) {
  return db
    .select()
    .from(edits)
    .where(eq(edits.batchId, sql.placeholder('batchId')))
    .prepare();
}

function prepareInsertEdit(db: Queries) {
  return db
    .insert(edits)
    .values({
      networkId: sql.placeholder('networkId'),
      version: sql.placeholder('version'),
      batchId: sql.placeholder('batchId'),
      personId: sql.placeholder('personId'),
      at: sql.placeholder('at'),
      label: sql.placeholder('label'),
      forward: sql.placeholder('forward'),
      inverse: sql.placeholder('inverse'),
      solverHash: sql.placeholder('solverHash'),
    })
    .prepare();
}

function prepareList(db: Queries) {
  const firstCaseId = sql<string>`coalesce((select ${cases.id} from ${cases} where ${cases.networkId} = ${networks.id} order by ${cases.ordinal}, ${cases.id} limit 1), '')`;
  return db
    .select({
      id: networks.id,
      siteId: networks.siteId,
      name: networks.name,
      version: networks.version,
      solverHash: networks.solverHash,
      changedAt: edits.at,
      changedBy: people.name,
      firstCaseId,
    })
    .from(networks)
    .innerJoin(edits, and(eq(edits.networkId, networks.id), eq(edits.version, networks.version)))
    .innerJoin(people, eq(people.id, edits.personId))
    .where(and(eq(networks.siteId, sql.placeholder('siteId')), isNull(networks.archivedAt)))
    .orderBy(sql`${networks.name} collate nocase`, asc(networks.id))
    .prepare();
}

function prepareSizes(db: Queries) {
  // octet_length reads no content, so that a long history costs nothing here
  return db
    .select({ version: edits.version, bytes: sql<number>`octet_length(${edits.forward})` })
    .from(edits)
    .where(
      and(
        eq(edits.networkId, sql.placeholder('networkId')),
        gt(edits.version, sql.placeholder('version')),
        // not `limit ?`, for whose every value SQLite prepares the statement anew
        lte(edits.version, sql.placeholder('last')),
      ),
    )
    .orderBy(asc(edits.version))
    .prepare();
}

function prepareHead(db: Queries) {
  return db
    .select({
      id: networks.id,
      siteId: networks.siteId,
      siteName: sites.name,
      name: networks.name,
      version: networks.version,
      solverHash: networks.solverHash,
    })
    .from(networks)
    .innerJoin(sites, eq(sites.id, networks.siteId))
    .where(eq(networks.id, sql.placeholder('networkId')))
    .prepare();
}

function settingsRow(document: NetworkDocument) {
  return { name: document.name, conditions: document.site, method: document.method, limits: document.limits };
}

function editOf(row: typeof edits.$inferSelect): StoredEdit {
  return { ...row, forward: Ops.parse(row.forward), inverse: Ops.parse(row.inverse) };
}

/** The elements that a batch names, each once. */
export function touchedBy(ops: readonly EditOp[]): Touched[] {
  const touched = new Map<string, Touched>();
  for (const op of ops) {
    if (op.in === 'network') continue;
    const id = op.op === 'add' ? addedId(op.id, op.value) : op.id;
    touched.set(`${op.in} ${id}`, { collection: op.in satisfies CollectionName, id });
  }
  return [...touched.values()];
}

/** Only an override says its id beside its value; every other element carries it. */
function addedId(id: string | undefined, value: Readonly<Record<string, unknown>>): string {
  return id ?? String(value['id']);
}
