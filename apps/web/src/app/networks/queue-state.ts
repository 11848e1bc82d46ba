import type { Network } from '@riseback/contracts';
import { applyBatch, type EditBatch, type EditOp, type NetworkDocument } from '@riseback/network';
import type { Conflict } from './conflicts';
import { toDocument } from './stored-document';

/** What of a person's work is not in the server's keeping yet, and the document it was made on. */
export interface Unsaved {
  readonly networkId: string;
  /** The document at `version`, as the server has it. */
  readonly base: NetworkDocument;
  readonly version: number;
  /** Not acknowledged yet; the first may be on its way. */
  readonly pending: readonly EditBatch[];
  /** What was set aside of `pending` until the person has chosen. */
  readonly conflicts: readonly Conflict[];
}

/** base + pending = present, always by `applyBatch`. */
export interface QueueState extends Unsaved {
  readonly solverHash: string;
  /** base with pending applied. */
  readonly present: NetworkDocument;
}

/** An edit that did not take: shown with what it was, so that nothing typed is lost in silence. */
export interface RefusedEdit {
  readonly batch: EditBatch;
  readonly reasons: readonly string[];
}

/** A network as it has just been loaded. */
export function openedState(network: Network): QueueState {
  const base = toDocument(network.document);
  const { id: networkId, version, solverHash } = network;
  return { networkId, base, version, solverHash, pending: [], present: base, conflicts: [] };
}

/**
 * The server has taken the next batch. With nothing more pending what is saved is what was on the screen already: the very object, so that
 * nothing is drawn anew.
 */
export function acknowledged(
  state: QueueState,
  batch: EditBatch,
  accepted: { readonly version: number; readonly solverHash: string },
): QueueState {
  const pending = state.pending.filter(({ batchId }) => batchId !== batch.batchId);
  const base = pending.length === 0 ? state.present : mustApply(state.base, batch.ops);
  return { ...state, ...accepted, base, pending };
}

/** The server has refused a batch: it goes, and with it those after it that stood on it. */
export function withoutRefused(
  state: QueueState,
  refused: RefusedEdit,
): { readonly state: QueueState; readonly refusals: readonly RefusedEdit[] } {
  const refusals = [refused];
  let present = state.base;
  const pending: EditBatch[] = [];
  for (const batch of state.pending.filter(({ batchId }) => batchId !== refused.batch.batchId)) {
    const applied = applyBatch(present, batch.ops);
    if (applied.ok) {
      present = applied.document;
      pending.push(batch);
    } else {
      refusals.push({ batch, reasons: applied.errors.map(({ detail }) => detail) });
    }
  }
  return { state: { ...state, pending, present }, refusals };
}

/** For batches that the server has accepted: a refusal here means that the two sides no longer hold the same document. */
export function mustApply(document: NetworkDocument, ops: readonly EditOp[]): NetworkDocument {
  const applied = applyBatch(document, ops);
  if (!applied.ok)
    throw new Error(`A saved edit does not apply: ${applied.errors.map(({ detail }) => detail).join('; ')}`);
  return applied.document;
}
