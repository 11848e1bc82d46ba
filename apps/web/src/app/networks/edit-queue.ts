import { HttpErrorResponse } from '@angular/common/http';
import { computed, inject, Injectable, signal } from '@angular/core';
import { type Network, type Problem, StaleVersion } from '@riseback/contracts';
import { applyBatch, type EditBatch, type EditOp, type NetworkDocument } from '@riseback/network';
import { firstValueFrom } from 'rxjs';
import { toProblem } from '../shared/problem';
import { NetworkApi } from './network-api';
import { toDocument } from './stored-document';

export type SaveState = 'saved' | 'saving' | 'notSaved';

/** An edit that did not take: shown with what it was, so that nothing typed is lost in silence. */
export interface RefusedEdit {
  readonly batch: EditBatch;
  readonly reasons: readonly string[];
}

interface QueueState {
  readonly networkId: string;
  /** The document at `version`, as the server has it. */
  readonly base: NetworkDocument;
  readonly version: number;
  readonly solverHash: string;
  /** Not acknowledged yet; the first may be on its way. */
  readonly pending: readonly EditBatch[];
  /** base with pending applied. */
  readonly present: NetworkDocument;
}

/** base + pending = present, always by `applyBatch`; one batch is in flight at a time (docs/data.md, "The client"). */
@Injectable()
export class EditQueue {
  private readonly api = inject(NetworkApi);

  private readonly state = signal<QueueState | null>(null);
  private readonly failure = signal<Problem | null>(null);
  private readonly refusals = signal<readonly RefusedEdit[]>([]);
  private sending = false;

  readonly present = computed(() => this.state()?.present ?? null);
  readonly version = computed(() => this.state()?.version ?? 0);
  readonly solverHash = computed(() => this.state()?.solverHash ?? '');
  readonly pendingCount = computed(() => this.state()?.pending.length ?? 0);
  readonly problem = this.failure.asReadonly();
  readonly refused = this.refusals.asReadonly();
  readonly saveState = computed((): SaveState => {
    if (this.failure() !== null) return 'notSaved';
    return this.pendingCount() > 0 ? 'saving' : 'saved';
  });

  open(network: Network): void {
    const base = toDocument(network.document);
    this.failure.set(null);
    this.refusals.set([]);
    this.state.set({
      networkId: network.id,
      base,
      version: network.version,
      solverHash: network.solverHash,
      pending: [],
      present: base,
    });
  }

  /** Applies the edit here at once and sends it. The inverse, or the reasons why it cannot be made. */
  add(label: string, ops: readonly EditOp[]): { ok: true; inverse: EditOp[] } | { ok: false; reasons: string[] } {
    const state = this.state();
    if (state === null) return { ok: false, reasons: ['The network is not loaded yet.'] };
    const applied = applyBatch(state.present, ops);
    if (!applied.ok) return { ok: false, reasons: applied.errors.map((error) => error.detail) };
    const batch: EditBatch = { batchId: crypto.randomUUID(), label, ops: [...ops] };
    this.state.set({ ...state, pending: [...state.pending, batch], present: applied.document });
    void this.send();
    return { ok: true, inverse: applied.inverse };
  }

  /** After a failure: the same batches again. A batch that did arrive is known to the server by its id. */
  retry(): void {
    this.failure.set(null);
    void this.send();
  }

  dismissRefusals(): void {
    this.refusals.set([]);
  }

  private async send(): Promise<void> {
    if (this.sending) return;
    this.sending = true;
    try {
      for (let state = this.state(); state !== null && this.failure() === null; state = this.state()) {
        const [batch] = state.pending;
        if (batch === undefined) return;
        await this.sendOne(state, batch);
      }
    } finally {
      this.sending = false;
    }
  }

  private async sendOne(state: QueueState, batch: EditBatch): Promise<void> {
    try {
      const accepted = await firstValueFrom(this.api.edit(state.networkId, state.version, batch));
      this.acknowledge(batch, accepted.version, accepted.solverHash);
    } catch (error) {
      const stale =
        error instanceof HttpErrorResponse && error.status === 412 ? StaleVersion.safeParse(error.error) : null;
      const problem = toProblem(error);
      if (stale?.success === true) this.moveBase(stale.data);
      else if (problem.status >= 400 && problem.status < 500 && problem.status !== 401 && problem.status !== 429)
        this.refuse(batch, problem);
      else this.failure.set(problem);
    }
  }

  private acknowledge(batch: EditBatch, version: number, solverHash: string): void {
    const state = this.state();
    if (state === null) return;
    const base = mustApply(state.base, batch.ops);
    const pending = state.pending.filter(({ batchId }) => batchId !== batch.batchId);
    this.state.set({
      ...state,
      base,
      version,
      solverHash,
      pending,
      present: pending.length === 0 ? base : state.present,
    });
  }

  /** Others saved first: their batches go under ours, and ours are replayed on top. */
  private moveBase({ batches, currentVersion }: StaleVersion): void {
    const state = this.state();
    if (state === null) return;
    const base = batches.reduce((document, { ops }) => mustApply(document, ops), state.base);
    const own = new Set(batches.map(({ batchId }) => batchId));
    this.replay(
      { ...state, base, version: currentVersion },
      state.pending.filter(({ batchId }) => !own.has(batchId)),
      batches.at(-1)?.personName,
    );
  }

  private refuse(batch: EditBatch, problem: Problem): void {
    const state = this.state();
    if (state === null) return;
    const reasons = problem.errors?.map(({ detail }) => detail) ?? [problem.detail ?? problem.title];
    this.refusals.update((refused) => [...refused, { batch, reasons }]);
    this.replay(
      state,
      state.pending.filter(({ batchId }) => batchId !== batch.batchId),
      undefined,
    );
  }

  private replay(state: QueueState, batches: readonly EditBatch[], other: string | undefined): void {
    let present = state.base;
    const pending: EditBatch[] = [];
    for (const batch of batches) {
      const applied = applyBatch(present, batch.ops);
      if (applied.ok) {
        present = applied.document;
        pending.push(batch);
      } else {
        const reasons = applied.errors.map(({ detail }) =>
          other === undefined ? detail : `${other} changed it meanwhile: ${detail}`,
        );
        this.refusals.update((refused) => [...refused, { batch, reasons }]);
      }
    }
    this.state.set({ ...state, pending, present });
  }
}

/** For batches that the server has accepted: a refusal here means that the two sides no longer hold the same document. */
function mustApply(document: NetworkDocument, ops: readonly EditOp[]): NetworkDocument {
  const applied = applyBatch(document, ops);
  if (!applied.ok)
    throw new Error(`A saved edit does not apply: ${applied.errors.map(({ detail }) => detail).join('; ')}`);
  return applied.document;
}
