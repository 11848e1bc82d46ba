import { HttpErrorResponse } from '@angular/common/http';
import { computed, inject, Injectable, signal } from '@angular/core';
import { type EditAccepted, type Network, type Problem, type SavedBatch, StaleVersion } from '@riseback/contracts';
import { applyBatch, type EditBatch, type EditOp, jsonEqual, type NetworkDocument } from '@riseback/network';
import { firstValueFrom, Subject } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { toProblem } from '../shared/problem';
import { type Conflict, conflictKey, replayOver } from './conflicts';
import { NetworkApi } from './network-api';
import { placeKey, sideOf } from './place';
import {
  acknowledged,
  mustApply,
  openedState,
  type QueueState,
  type RefusedEdit,
  type Unsaved,
  withoutRefused,
} from './queue-state';
import { type Touch, touchedSince, touchesOf } from './touches';
import { UndoStack, type UndoStep } from './undo-stack';

export type SaveState = 'saved' | 'saving' | 'notSaved';

export type Added =
  | { readonly ok: true; readonly inverse: EditOp[]; readonly batchId: string; readonly version: number }
  | { readonly ok: false; readonly reasons: string[] };

/** Who stands in the way of a draft that is older than what its own author did next. */
const YOU_SINCE = 'You, since';

/** base + pending = present, always by `applyBatch`; one batch is in flight at a time (docs/data.md, "The client"). */
@Injectable()
export class EditQueue {
  private readonly api = inject(NetworkApi);
  private readonly session = inject(SessionStore);
  private readonly undoStack = inject(UndoStack);

  private readonly state = signal<QueueState | null>(null);
  private readonly failure = signal<Problem | null>(null);
  private readonly refusals = signal<readonly RefusedEdit[]>([]);
  private readonly lastHeard = signal<readonly SavedBatch[]>([]);
  private readonly acknowledgements = new Subject<void>();
  private touches = new Map<string, Touch>();
  private sending = false;

  readonly present = computed(() => this.state()?.present ?? null);
  readonly version = computed(() => this.state()?.version ?? 0);
  readonly solverHash = computed(() => this.state()?.solverHash ?? '');
  readonly pendingCount = computed(() => this.state()?.pending.length ?? 0);
  readonly problem = this.failure.asReadonly();
  readonly refused = this.refusals.asReadonly();
  /** At each word of the server that an edit is saved, without waiting for what hangs on the signals to be rendered. */
  readonly saved = this.acknowledgements.asObservable();
  /** What others saved, as it last arrived. */
  readonly heard = this.lastHeard.asReadonly();
  /** Conflicts that still differ from what stands in the document. */
  readonly conflicts = computed(() => {
    const state = this.state();
    return state?.conflicts.filter(({ place, mine }) => !jsonEqual(mine, sideOf(state.present, place))) ?? [];
  });
  readonly unsaved = computed((): Unsaved | null => {
    const state = this.state();
    if (state === null) return null;
    const { networkId, base, version, pending } = state;
    const conflicts = this.conflicts();
    return pending.length === 0 && conflicts.length === 0 ? null : { networkId, base, version, pending, conflicts };
  });
  readonly saveState = computed((): SaveState => {
    if (this.failure() !== null) return 'notSaved';
    return this.pendingCount() > 0 ? 'saving' : 'saved';
  });

  open(network: Network): void {
    this.failure.set(null);
    this.refusals.set([]);
    this.lastHeard.set([]);
    this.touches = new Map();
    this.state.set(openedState(network));
  }

  /** Applies the edit here at once and sends it. The inverse, or the reasons why it cannot be made. */
  add(label: string, ops: readonly EditOp[]): Added {
    const state = this.state();
    if (state === null) return { ok: false, reasons: ['The network is not loaded yet.'] };
    const applied = applyBatch(state.present, ops);
    if (!applied.ok) return { ok: false, reasons: applied.errors.map((error) => error.detail) };
    const batch: EditBatch = { batchId: crypto.randomUUID(), label, ops: [...ops] };
    this.state.set({ ...state, pending: [...state.pending, batch], present: applied.document });
    void this.send();
    return { ok: true, inverse: applied.inverse, batchId: batch.batchId, version: state.version };
  }

  /** Who, after a version, changed what these operations act on; undefined when nobody else did. */
  changedBy(ops: readonly EditOp[], sinceVersion: number): string | undefined {
    return touchedSince(this.touches, ops, sinceVersion);
  }

  /** After a failure: the same batches again. A batch that did arrive is known to the server by its id. */
  retry(): void {
    this.failure.set(null);
    void this.send();
  }

  dismissRefusals(): void {
    this.refusals.set([]);
  }

  /** The person has chosen. */
  dropConflicts(settled: readonly Conflict[]): void {
    const keys = new Set(settled.map(conflictKey));
    this.state.update((state) =>
      state === null
        ? null
        : { ...state, conflicts: state.conflicts.filter((conflict) => !keys.has(conflictKey(conflict))) },
    );
  }

  /** Far behind: everything since at once. */
  async readOn(): Promise<void> {
    const state = this.state();
    if (state !== null) this.moveBase(await firstValueFrom(this.api.editsSince(state.networkId, state.version)));
  }

  /** Batches that were saved, one's own among them, as events bring them. What is missing between is asked for. */
  async receive(batches: readonly SavedBatch[]): Promise<void> {
    const state = this.state();
    const first = batches.find(({ version }) => version > (state?.version ?? 0));
    if (state === null || first === undefined) return;
    if (first.version === state.version + 1) this.moveBase(batches);
    else await this.readOn();
  }

  /** Puts work that was left behind on top of what is here, by the same rule as any other pending work. */
  async bringIn(draft: Unsaved, undo: readonly UndoStep[]): Promise<void> {
    const { networkId } = draft;
    const since = await firstValueFrom(this.api.editsSince(networkId, draft.version));
    await this.receive(since);
    const state = this.state();
    if (state?.networkId !== networkId) return;
    this.undoStack.restore(undo);
    const arrived = new Set(since.map(({ batchId }) => batchId));
    const own = new Set(draft.pending.map(({ batchId }) => batchId));
    const before = since
      .filter(({ batchId }) => own.has(batchId))
      .reduce((document, { ops }) => mustApply(document, ops), draft.base);
    const others = since.filter(({ batchId }) => !own.has(batchId));
    this.layOver(
      { ...state, conflicts: [...state.conflicts, ...draft.conflicts] },
      { before, after: state.present, others, pending: draft.pending.filter(({ batchId }) => !arrived.has(batchId)) },
      state.pending,
    );
    void this.send();
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
      await this.take(state, batch, accepted);
    } catch (error) {
      const stale =
        error instanceof HttpErrorResponse && error.status === 412 ? StaleVersion.safeParse(error.error) : null;
      const problem = toProblem(error);
      if (stale?.success === true && this.catchUp(state, stale.data)) return;
      if (problem.status >= 400 && problem.status < 500 && ![401, 412, 429].includes(problem.status))
        this.refuse(batch, problem);
      else this.failure.set(problem);
    }
  }

  private async take(sent: QueueState, batch: EditBatch, accepted: EditAccepted): Promise<void> {
    const state = this.state();
    if (state === null || !this.isPending(sent, batch)) return;
    // saved from another window a while ago, as a draft that both brought in: others' edits lie between
    if (accepted.version !== state.version + 1) await this.readOn();
    else {
      this.state.set(acknowledged(state, batch, accepted));
      this.acknowledgements.next();
    }
  }

  /** @returns whether the next try has another version to be made on; a database that was put back has none */
  private catchUp(sent: QueueState, { batches }: StaleVersion): boolean {
    this.moveBase(batches);
    return this.state()?.version !== sent.version;
  }

  /** An event may have said it first, or the page may show another network by now. */
  private isPending(sent: QueueState, batch: EditBatch): boolean {
    const state = this.state();
    return state?.networkId === sent.networkId && state.pending.some(({ batchId }) => batchId === batch.batchId);
  }

  /** Others saved first: their batches go under ours, and ours are replayed on top. */
  private moveBase(received: readonly SavedBatch[]): void {
    const state = this.state();
    const batches = received.filter(({ version }) => version > (state?.version ?? 0));
    const last = batches.at(-1);
    if (state === null || last === undefined) return;
    const pendingIds = new Set(state.pending.map(({ batchId }) => batchId));
    const own = batches.filter(({ batchId }) => pendingIds.has(batchId));
    const others = batches.filter(({ batchId }) => !pendingIds.has(batchId));
    const base = batches.reduce((document, { ops }) => mustApply(document, ops), state.base);
    // an own batch among them was accepted on the version that it was made on, before any of the others
    const before = own.reduce((document, { ops }) => mustApply(document, ops), state.base);
    const saved = new Set(own.map(({ batchId }) => batchId));
    this.layOver(
      { ...state, base, version: last.version, solverHash: last.solverHash },
      { before, after: base, others, pending: state.pending.filter(({ batchId }) => !saved.has(batchId)) },
      [],
    );
    if (others.length > 0) this.lastHeard.set(others);
  }

  private layOver(
    state: QueueState,
    work: {
      readonly before: NetworkDocument;
      readonly after: NetworkDocument;
      readonly others: readonly SavedBatch[];
      readonly pending: readonly EditBatch[];
    },
    ahead: readonly EditBatch[],
  ): void {
    const touches = touchesOf(work.others, (batch) => this.authorOf(batch));
    for (const [key, touch] of touches) this.touches.set(key, touch);
    const others = [...new Set(work.others.map((batch) => this.authorOf(batch)))].join(', ');
    // what this tab has not saved yet is no less in the way than what was saved
    const own = touchesOf(
      ahead.map((batch) => ({ ...batch, version: state.version })),
      () => YOU_SINCE,
    );
    const replayed = replayOver({
      ...work,
      touches: new Map([...touches, ...own]),
      others: others === '' ? YOU_SINCE : others,
    });
    this.undoStack.follow(replayed.fates, replayed.renamed);
    // one that is open already stays, whatever else was wanted at its place since
    const conflicts = new Map(state.conflicts.map((conflict) => [conflictKey(conflict), conflict]));
    const before = new Map(state.conflicts.map((conflict) => [placeKey(conflict.place), conflict.before]));
    for (const conflict of replayed.conflicts) {
      const first = before.get(placeKey(conflict.place)) ?? conflict.before;
      conflicts.set(conflictKey(conflict), { ...conflict, before: first });
    }
    const { present, pending } = replayed;
    this.state.set({ ...state, present, pending: [...ahead, ...pending], conflicts: [...conflicts.values()] });
  }

  private authorOf({ personId, personName }: SavedBatch): string {
    return personId === this.session.person()?.id ? 'You, in another window' : personName;
  }

  private refuse(refused: EditBatch, problem: Problem): void {
    const state = this.state();
    if (state === null) return;
    const reasons = problem.errors?.map(({ detail }) => detail) ?? [problem.detail ?? problem.title];
    const { state: rest, refusals } = withoutRefused(state, { batch: refused, reasons });
    this.refusals.update((before) => [...before, ...refusals]);
    this.undoStack.follow(new Map(refusals.map(({ batch }) => [batch.batchId, null])), new Map());
    this.state.set(rest);
  }
}
