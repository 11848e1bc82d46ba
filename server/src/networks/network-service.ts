import type {
  EditAccepted,
  Network,
  NetworkSummary,
  SavedBatch,
  SolveSummary,
  StaleVersion,
} from '@riseback/contracts';
import {
  applyBatch,
  fromFile,
  jsonEqual,
  layoutMissingPositions,
  readNetworkFile,
  toFile,
  type BatchError,
  type EditBatch,
  type NetworkDocument,
  type NetworkFile,
} from '@riseback/network';
import type { NetworkAccess, SiteAccess } from '../platform/auth/access';
import { SharedCommit } from '../platform/db/shared-commit';
import { badRequest, conflict, notFound, staleVersion, unprocessable } from '../platform/problem';
import { creationOps } from './creation-ops';
import { DocumentCache } from './document-cache';
import { solverHashOf } from './network-hashes';
import { touchedBy, type NetworkHead, type NetworkRepository, type StoredEdit } from './network-repository';
import { toStoredDocument } from './stored-document';

/** What the networks need of the solves: to be told of a new version, and the verdicts of a stored one. */
export interface NetworkSolves {
  changed(network: {
    readonly networkId: string;
    readonly solverHash: string;
    readonly document: NetworkDocument;
  }): void;
  summary(networkId: string, solverHash: string, firstCaseId: string): SolveSummary;
}

/** What is told of what was saved, to those who have the network open. */
export interface NetworkAnnouncer {
  edited(networkId: string, batch: SavedBatch): void;
}

/** What one answer tells of a network's history: whoever is further behind asks again from there. */
export const EDIT_PAGE = { most: 500, bytes: 4 * 1024 * 1024 } as const;

/** Ten times the largest plant: each edit of one of 25,000 pipes takes some 200 ms, in which others wait. */
const MOST_ELEMENTS = 25_000;

export class NetworkService {
  private readonly documents = new DocumentCache();
  private readonly commits: SharedCommit;

  constructor(
    private readonly networks: NetworkRepository,
    private readonly solves: NetworkSolves,
    private readonly announcer: NetworkAnnouncer,
    private readonly newId: () => string,
    private readonly now: () => Date,
  ) {
    this.commits = new SharedCommit(
      (work) => networks.transaction(work),
      () => this.documents.clear(),
    );
  }

  list(access: SiteAccess): NetworkSummary[] {
    return this.networks.list(access.siteId).map(({ firstCaseId, solverHash, ...network }) => ({
      ...network,
      solve: this.solves.summary(network.id, solverHash, firstCaseId),
    }));
  }

  /**
   * Makes a network of a network file; its version is 1.
   * @throws ProblemError 400 naming each mistake of the file
   */
  create(access: SiteAccess, json: unknown): Network {
    const networkId = this.createFor(access.siteId, access.person, documentOf(json));
    return this.networkOf(access, networkId);
  }

  /** As `create`, for a document that is known to be good and without a request behind it (the demo). */
  createFor(
    siteId: string,
    by: { readonly id: string; readonly sessionId?: string },
    document: NetworkDocument,
  ): string {
    const id = this.newId();
    const solverHash = solverHashOf(document);
    const at = this.now();
    this.networks.transaction((networks) => {
      networks.insert({ id, siteId, document, solverHash, createdBy: by.id, createdAt: at.toISOString() });
      networks.insertEdit({
        networkId: id,
        version: 1,
        batchId: this.newId(),
        personId: by.id,
        at: at.toISOString(),
        label: 'create the network',
        forward: creationOps(document),
        inverse: [],
        solverHash,
      });
      networks.audit({
        at,
        personId: by.id,
        ...sessionOf(by),
        siteId,
        action: 'network.create',
        subject: id,
        details: { name: document.name },
      });
    });
    this.documents.remember(id, 1, document);
    this.solves.changed({ networkId: id, solverHash, document });
    return id;
  }

  /** The JSON text of a `Network`. */
  text(access: NetworkAccess): { readonly version: number; readonly json: Buffer } {
    const head = this.head(access.networkId);
    const around = { ...head, role: access.role, permissions: [...access.permissions] };
    const start = JSON.stringify(around satisfies Omit<Network, 'document'>);
    const json = [Buffer.from(`${start.slice(0, -1)},"document":`), this.documentText(head), Buffer.from('}')];
    return { version: head.version, json: Buffer.concat(json) };
  }

  file(access: NetworkAccess): NetworkFile {
    return toFile(this.documentOf(this.networks, this.head(access.networkId)));
  }

  /** The newest version and the hash of what its solve takes. */
  headOf(access: NetworkAccess): { readonly version: number; readonly solverHash: string } {
    const { version, solverHash } = this.head(access.networkId);
    return { version, solverHash };
  }

  /** What was saved after a version, oldest first; `more`: there are later ones, to be asked for from the last of these. */
  editsSince(access: NetworkAccess, version: number): { readonly batches: SavedBatch[]; readonly more: boolean } {
    return savedBatches(this.networks, access.networkId, version);
  }

  /**
   * The network as it stood after a version (by default the newest), with the hash of what its solve takes. `document` is worked out when
   * it is asked for, which most never do: the results of a hash are stored.
   * @throws ProblemError 404 where it never had this version; from `document` 422 where it is too long ago
   */
  atVersion(
    access: NetworkAccess,
    version: number | undefined,
  ): {
    readonly networkId: string;
    readonly version: number;
    readonly solverHash: string;
    readonly document: NetworkDocument;
  } {
    const { networkId } = access;
    const head = this.head(networkId);
    const present = () => this.documentOf(this.networks, head);
    if (version === undefined || version === head.version) {
      return lazily({ networkId, version: head.version, solverHash: head.solverHash }, present);
    }
    const edit = this.networks.edit(networkId, version);
    if (edit === undefined) throw notFound(`The network has no version ${version}; its newest is ${head.version}.`);
    return lazily({ networkId, version, solverHash: edit.solverHash }, () => {
      const { edits, more } = this.networks.editPage(networkId, version, EDIT_PAGE);
      if (more) {
        throw unprocessable(
          `Version ${version} is too long ago (the newest is ${head.version}) to be worked out once more; ask for a newer one.`,
        );
      }
      return undone(present(), edits);
    });
  }

  /**
   * Applies one batch to the version it was made on: the only way to change a network.
   * @throws ProblemError 409 the batchId is known with another content; 412 not the current version; 403 a touched
   *   collection needs another role; 422 the batch does not fit the network
   */
  async edit(access: NetworkAccess, onVersion: number, batch: EditBatch): Promise<EditAccepted> {
    const { networkId } = access;
    const { answer, changed } = await this.commits.run(() => this.editWithin(this.networks, access, onVersion, batch));
    if (changed !== undefined) {
      const { document, saved } = changed;
      this.documents.remember(networkId, answer.version, document);
      this.announcer.edited(networkId, saved);
      this.solves.changed({ networkId, solverHash: answer.solverHash, document });
    }
    return answer;
  }

  /** As `edit`, for a batch that is known to fit and without a request behind it (the demo). */
  editFor(networkId: string, by: { readonly id: string; readonly name: string }, batch: EditBatch): EditAccepted {
    const { answer, changed } = this.networks.transaction((networks) =>
      this.write(networks, this.head(networkId), by, batch),
    );
    this.documents.remember(networkId, answer.version, changed.document);
    this.announcer.edited(networkId, changed.saved);
    this.solves.changed({ networkId, solverHash: answer.solverHash, document: changed.document });
    return answer;
  }

  private editWithin(
    networks: NetworkRepository,
    access: NetworkAccess,
    onVersion: number,
    batch: EditBatch,
  ): {
    readonly answer: EditAccepted;
    readonly changed?: { readonly document: NetworkDocument; readonly saved: SavedBatch };
  } {
    const { networkId, person } = access;
    const known = networks.editByBatch(batch.batchId);
    if (known !== undefined) return { answer: firstAnswer(known, access, batch) };
    const head = this.head(networkId);
    if (head.version !== onVersion) throw stale(networks, head, onVersion);
    requirePermissions(access, batch);

    return this.write(networks, head, { id: person.id, name: person.name, sessionId: person.sessionId }, batch);
  }

  private write(
    networks: NetworkRepository,
    head: NetworkHead,
    by: { readonly id: string; readonly name: string; readonly sessionId?: string },
    batch: EditBatch,
  ): {
    readonly answer: EditAccepted;
    readonly changed: { readonly document: NetworkDocument; readonly saved: SavedBatch };
  } {
    const { id: networkId, siteId } = head;
    const applied = applyBatch(this.documentOf(networks, head), batch.ops);
    if (!applied.ok) throw doesNotFit(applied.errors);
    const { document } = applied;
    if (Math.max(document.nodes.size, document.pipes.size) > MOST_ELEMENTS) throw tooLarge(document);
    const version = head.version + 1;
    const solverHash = solverHashOf(document);
    const at = this.now();
    networks.update(networkId, version, document, solverHash, touchedBy(batch.ops));
    const edit: StoredEdit = {
      networkId,
      version,
      batchId: batch.batchId,
      personId: by.id,
      at: at.toISOString(),
      label: batch.label,
      forward: batch.ops,
      inverse: applied.inverse,
      solverHash,
    };
    networks.insertEdit(edit);
    networks.audit({
      at,
      personId: by.id,
      ...sessionOf(by),
      siteId,
      action: 'network.edit',
      subject: networkId,
      details: { version, batchId: batch.batchId, label: batch.label },
    });
    return {
      answer: { version, solverHash },
      changed: { document, saved: savedBatch({ ...edit, personName: by.name }) },
    };
  }

  private networkOf(access: SiteAccess, networkId: string): Network {
    const head = this.head(networkId);
    return {
      ...head,
      role: access.role,
      permissions: [...access.permissions],
      document: toStoredDocument(this.documentOf(this.networks, head)),
    };
  }

  private head(networkId: string): NetworkHead {
    const head = this.networks.head(networkId);
    if (head === undefined) throw notFound('There is no such network, or you have no role at its site.');
    return head;
  }

  private documentOf(networks: NetworkRepository, { id, version }: NetworkHead): NetworkDocument {
    const cached = this.documents.find(id, version);
    if (cached !== undefined) return cached;
    const document = networks.document(id);
    if (document === undefined) throw new Error(`network ${id} has a version but no document`);
    this.documents.remember(id, version, document);
    return document;
  }

  private documentText(head: NetworkHead): Buffer {
    const document = this.documentOf(this.networks, head);
    return this.documents.text(head.id, head.version) ?? Buffer.from(JSON.stringify(toStoredDocument(document)));
  }
}

function documentOf(json: unknown): NetworkDocument {
  const read = readNetworkFile(json);
  if (!read.ok) throw badRequest('The network file has mistakes; nothing was stored.', read.errors);
  return layoutMissingPositions(fromFile(read.file));
}

/** Every accepted batch has its exact inverse, so that every version can be had again. */
function undone(document: NetworkDocument, edits: readonly StoredEdit[]): NetworkDocument {
  return edits.toReversed().reduce((present, edit) => {
    const applied = applyBatch(present, edit.inverse);
    if (!applied.ok)
      throw new Error(`the inverse of version ${edit.version} of network ${edit.networkId} does not apply`);
    return applied.document;
  }, document);
}

/** A batch sent again, after an answer that got lost: it was accepted once and is not applied a second time. */
function firstAnswer(known: StoredEdit, access: NetworkAccess, batch: EditBatch): EditAccepted {
  const same =
    known.networkId === access.networkId &&
    known.personId === access.person.id &&
    known.label === batch.label &&
    jsonEqual(known.forward, batch.ops);
  if (!same) throw conflict('This batchId is taken by another batch: give every batch a new UUID.');
  return { version: known.version, solverHash: known.solverHash };
}

function stale(networks: NetworkRepository, head: NetworkHead, onVersion: number): Error {
  return staleVersion(
    `The network is at version ${head.version}, the change was made on version ${onVersion}: apply the batches since, then send it again.`,
    // of many the first: they bring the sender on, and the next try is told of the rest
    {
      currentVersion: head.version,
      batches: savedBatches(networks, head.id, onVersion).batches,
    } satisfies StaleVersion,
  );
}

function tooLarge({ nodes, pipes }: NetworkDocument): Error {
  return unprocessable(
    `The network would have ${nodes.size} nodes and ${pipes.size} pipes; ${MOST_ELEMENTS} of each are the most. Make two networks of it, with a receiver where they meet.`,
  );
}

function doesNotFit(errors: readonly BatchError[]): Error {
  return unprocessable(
    'The batch does not fit the network; nothing was changed.',
    errors.map(({ opIndex, element, key, detail }) => ({
      pointer: `/ops/${opIndex}`,
      detail: [...[element, key].filter((part) => part !== undefined), detail].join(': '),
    })),
  );
}

/** Gauges belong to those who take readings, everything else to those who draw; a batch that touches both needs both. */
function requirePermissions(access: NetworkAccess, batch: EditBatch): void {
  if (batch.ops.some((op) => op.in === 'gauges')) access.require('readings');
  if (batch.ops.some((op) => op.in !== 'gauges')) access.require('draw');
}

function savedBatches(networks: NetworkRepository, networkId: string, since: number) {
  const { edits, more } = networks.editPage(networkId, since, EDIT_PAGE);
  return { batches: edits.map(savedBatch), more };
}

function lazily<T extends object>(
  known: T,
  document: () => NetworkDocument,
): T & { readonly document: NetworkDocument } {
  return Object.defineProperty(known, 'document', { get: document }) as T & { readonly document: NetworkDocument };
}

function savedBatch(edit: StoredEdit & { readonly personName: string }): SavedBatch {
  const { version, batchId, personId, personName, at, label, forward, solverHash } = edit;
  return { version, batchId, personId, personName, at, label, ops: [...forward], solverHash };
}

function sessionOf(by: { readonly sessionId?: string }): { sessionId?: string } {
  return by.sessionId === undefined ? {} : { sessionId: by.sessionId };
}
