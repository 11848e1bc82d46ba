import { computed, inject, Injectable, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type {
  CaseOutcome,
  Network,
  NetworkResults,
  NodeResult,
  Permission,
  PipeResult,
  Problem,
  SolveEvent,
  SolveResult,
  TrapResult,
} from '@riseback/contracts';
import { type EditOp, findings, inOrder, type NetworkDocument, type OperatingCase } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import {
  catchError,
  distinctUntilChanged,
  EMPTY,
  expand,
  filter,
  map,
  merge,
  type Observable,
  of,
  scan,
  switchMap,
  timer,
} from 'rxjs';
import { withBandsBefore } from '../results/bands-before';
import { withUnchangedKept } from '../results/kept-results';
import { WORST_OF_ALL, worstOfCases } from '@riseback/figures';
import { SessionStore } from '../session/session-store';
import { toProblem } from '../shared/problem';
import { choiceOfMine } from './conflict-choice';
import type { Conflict } from './conflicts';
import { type Added, EditQueue } from './edit-queue';
import { NetworkApi } from './network-api';
import { UndoStack, type UndoStep } from './undo-stack';

/** New pressures are painted before their bands are asked for, which the server then computes. */
const PAINT_MS = 100;

type Load = { status: 'loading' } | { status: 'ready'; network: Network } | { status: 'failed'; problem: Problem };

export type SolveState =
  | { kind: 'solving' }
  | { kind: 'stale' }
  /** `bandsToCome`: pressures stand, what the bands may do to verdicts does not. */
  | { kind: 'solved'; at: string; ms: number; bandsToCome: boolean }
  | { kind: 'failed'; problem: Problem };

interface Answers {
  readonly networkId: string;
  readonly latest: NetworkResults | null;
  readonly finished: Finished | null;
  /** The last that had its bands. */
  readonly whole: Finished | null;
}
type Finished = Extract<NetworkResults, { state: 'finished' }>;
const NO_ANSWERS: Answers = { networkId: '', latest: null, finished: null, whole: null };

/** The network of the page: what it is, what was drawn, what came out. In the network page's `providers`. */
@Injectable()
export class NetworkStore {
  private readonly api = inject(NetworkApi);
  private readonly session = inject(SessionStore);
  private readonly queue = inject(EditQueue);
  private readonly undoStack = inject(UndoStack);

  /** Set by the page from the route: which network, which case ('' = the first), which element is looked at. */
  readonly networkId = signal('');
  readonly wantedCaseId = signal('');
  private readonly load = signal<Load>({ status: 'loading' });
  private readonly refusal = signal<readonly string[]>([]);

  readonly loading = computed(() => this.load().status === 'loading');
  readonly problem = computed(() => pick(this.load(), 'failed')?.problem ?? null);
  readonly network = computed(() => pick(this.load(), 'ready')?.network ?? null);
  /** What is drawn now, saved or not. Null until loaded. */
  readonly document = computed((): NetworkDocument | null => this.queue.present());
  readonly saveState = this.queue.saveState;
  readonly saveProblem = this.queue.problem;
  /** Edits that could not be kept, each with its reasons. */
  readonly refusedEdits = this.queue.refused;
  /** What two people changed at once, until the person has chosen. */
  readonly conflicts = this.queue.conflicts;
  /** Why the last edit was refused on the spot; empty when it was taken. */
  readonly lastRefusal = this.refusal.asReadonly();
  readonly undoLabel = computed(() => this.undoStack.nextUndo()?.label ?? null);
  readonly redoLabel = computed(() => this.undoStack.nextRedo()?.label ?? null);
  readonly mayDraw = computed(() => this.may('draw'));

  readonly units = computed(
    (): DisplayUnits => ({
      system: this.session.unitSystem(),
      atmosphericPressurePa: this.document()?.site.atmosphericPressurePa ?? 101_325,
    }),
    // most edits leave them as they were, and every number on the screen hangs on them
    { equal: (a, b) => a.system === b.system && a.atmosphericPressurePa === b.atmosphericPressurePa },
  );

  /** Topology findings of the document as drawn. */
  readonly topology = computed(() => {
    const document = this.document();
    return document === null ? [] : findings(document);
  });

  private readonly askedAgain = signal(0);
  private readonly savedInput = computed(() => ({
    networkId: this.network()?.id ?? '',
    solverHash: this.queue.solverHash(),
    again: this.askedAgain(),
  }));
  private readonly answers = toSignal(
    // results are asked for at the word that an edit is saved: the signal alone would be heard only when that word is rendered
    merge(toObservable(this.savedInput), this.queue.saved.pipe(map(() => this.savedInput()))).pipe(
      distinctUntilChanged(),
      filter(({ networkId }) => networkId !== ''),
      switchMap(({ networkId }) => this.resultsWhenReady(networkId).pipe(map((latest) => ({ networkId, latest })))),
      scan((all: Answers, { networkId, latest }): Answers => {
        const before = all.networkId === networkId ? all : NO_ANSWERS;
        if (latest.state !== 'finished') return { ...before, networkId, latest };
        const finished = withUnchangedKept(withBandsBefore(latest, before.whole), before.finished);
        return { networkId, latest, finished, whole: latest.bandsToCome === true ? before.whole : latest };
      }, NO_ANSWERS),
    ),
    { initialValue: NO_ANSWERS },
  );

  /** The newest finished results; they stay on screen while newer ones are computed, and lend those their bands until they have their own. */
  readonly finished = computed(() => this.answers().finished);
  readonly bandsToCome = computed(() => this.finished()?.bandsToCome === true);
  readonly solveState = computed((): SolveState => {
    const { latest, finished } = this.answers();
    if (latest?.state === 'failed') return { kind: 'failed', problem: latest.problem };
    if (finished?.solverHash === this.queue.solverHash() && this.queue.pendingCount() === 0) {
      return { kind: 'solved', at: finished.finishedAt, ms: finished.solveMs, bandsToCome: this.bandsToCome() };
    }
    return this.queue.saveState() === 'notSaved' ? { kind: 'stale' } : { kind: 'solving' };
  });

  /** The operating cases in the file's order. */
  readonly cases = computed((): readonly OperatingCase[] => {
    const document = this.document();
    return document === null ? [] : inOrder(document.cases).map(([, { value }]) => value);
  });
  /** Stands for the worst of all cases where a case's id stands; a case that took the word for itself keeps it. */
  readonly worstCaseId = computed(() => (this.cases().some(({ id }) => id === WORST_OF_ALL) ? '~worst' : WORST_OF_ALL));
  /** One case alone is its own worst. */
  readonly hasWorst = computed(() => this.cases().length > 1);
  readonly caseId = computed(() => {
    const ids = this.cases().map(({ id }) => id);
    const wanted = this.wantedCaseId();
    if (this.hasWorst() && wanted === this.worstCaseId()) return wanted;
    return ids.includes(wanted) ? wanted : (ids[0] ?? '');
  });
  readonly showsWorst = computed(() => this.hasWorst() && this.caseId() === this.worstCaseId());
  /** What the chosen case is called; '' for the plain network. */
  readonly caseName = computed(() => (this.showsWorst() ? 'Worst of all' : this.nameOfCase(this.caseId())));
  readonly outcomes = computed(
    (): ReadonlyMap<string, CaseOutcome> =>
      new Map((this.finished()?.cases ?? []).map((outcome) => [outcome.caseId, outcome])),
  );
  /** Outcomes of the cases that there are, in their order. */
  readonly caseOutcomes = computed(() => this.cases().flatMap(({ id }) => this.outcomes().get(id) ?? []));
  /** The worst of all cases; null while none has a result. */
  readonly worst = computed(() => worstOfCases(this.caseOutcomes()));
  readonly outcome = computed((): CaseOutcome | null => {
    if (!this.showsWorst()) return this.outcomes().get(this.caseId()) ?? null;
    const worst = this.worst();
    // without any result, the first refusal says why
    if (worst === null) return this.caseOutcomes()[0] ?? null;
    return { caseId: this.worstCaseId(), status: 'solved', result: worst.result };
  });
  /**
   * The chosen case's result; null when there is none yet or the case is refused. For the worst of all it joins each element's own
   * worst case, so an account along a way needs `resultAt`.
   */
  readonly result = computed((): SolveResult | null => {
    const outcome = this.outcome();
    return outcome?.status === 'solved' ? outcome.result : null;
  });
  readonly trapResults = computed((): ReadonlyMap<string, TrapResult> => byId(this.result()?.traps));
  readonly pipeResults = computed((): ReadonlyMap<string, PipeResult> => byId(this.result()?.pipes));
  readonly nodeResults = computed((): ReadonlyMap<string, NodeResult> => byId(this.result()?.nodes));

  /** The case whose result is shown for an element: the chosen one, or the element's own worst. */
  caseOf(elementId: string): string {
    return this.showsWorst() ? (this.worst()?.caseOf.get(elementId) ?? '') : this.caseId();
  }

  /** The whole result of the case that is shown for an element. */
  resultAt(elementId: string): SolveResult | null {
    const outcome = this.outcomes().get(this.caseOf(elementId));
    return outcome?.status === 'solved' ? outcome.result : null;
  }

  nameOfCase(caseId: string): string {
    return this.document()?.cases.get(caseId)?.value.name ?? '';
  }

  may(permission: Permission): boolean {
    return this.network()?.permissions.includes(permission) ?? false;
  }

  open(networkId: string): void {
    this.networkId.set(networkId);
    this.load.set({ status: 'loading' });
    this.undoStack.clear();
    this.api.get(networkId).subscribe({
      next: (network) => {
        this.queue.open(network);
        this.load.set({ status: 'ready', network });
      },
      error: (error: unknown) => {
        this.load.set({ status: 'failed', problem: toProblem(error) });
      },
    });
  }

  /** Makes one edit, one step of undo. False when it was refused: `lastRefusal` says why. */
  edit(label: string, ops: readonly EditOp[]): boolean {
    if (ops.length === 0) return true;
    const added = this.queue.add(label, ops);
    this.refusal.set(added.ok ? [] : added.reasons);
    if (added.ok) this.undoStack.edited(inverseStep(label, added));
    return added.ok;
  }

  /** The ids that the undo touched, so that focus can go there; null when there was nothing to undo or it no longer applies. */
  undo(): readonly string[] | null {
    const step = this.undoStack.nextUndo();
    if (step === null) return null;
    const redo = this.stepBack('undo', step);
    if (redo === null) this.undoStack.dropUndo();
    else this.undoStack.undone(redo);
    return redo === null ? null : touchedIds(step.ops);
  }

  redo(): readonly string[] | null {
    const step = this.undoStack.nextRedo();
    if (step === null) return null;
    const undo = this.stepBack('redo', step);
    if (undo === null) this.undoStack.dropRedo();
    else this.undoStack.redone(undo);
    return undo === null ? null : touchedIds(step.ops);
  }

  /** Gives this person's side of some conflicts and leaves the others' in the rest; what no longer fits stays open. */
  settle(mine: readonly Conflict[], theirs: readonly Conflict[]): readonly Conflict[] {
    const document = this.document();
    if (document === null) return mine;
    const { ops, settled, unfit } = choiceOfMine(document, mine);
    const [first] = settled;
    const label = settled.length === 1 && first !== undefined ? `own value at ${first.name}` : 'own values kept';
    if (!this.edit(label.slice(0, 120), ops)) return mine;
    this.queue.dropConflicts([...settled, ...theirs]);
    return unfit;
  }

  /** Too far behind for edits one by one: read anew, unless that would cost unsaved work. */
  readOn(): void {
    if (this.queue.unsaved() === null) this.open(this.networkId());
    else this.queue.readOn().catch(() => undefined);
  }

  /** A question for results stays open until it is answered; one that failed is asked anew when the server speaks of the solve. */
  hearOfSolve({ solverHash, state }: SolveEvent): void {
    const failed = this.answers().latest?.state === 'failed';
    if (failed && state !== 'failed' && solverHash === this.queue.solverHash()) this.askedAgain.update((n) => n + 1);
  }

  /** The question for results once more, after one that failed. */
  askResultsAgain(): void {
    this.askedAgain.update((n) => n + 1);
  }

  retrySave(): void {
    this.queue.retry();
  }

  dismissRefusals(): void {
    this.refusal.set([]);
    this.queue.dismissRefusals();
  }

  /** Takes one step back or forth; null when it is left out, which `lastRefusal` explains. */
  private stepBack(word: 'undo' | 'redo', step: UndoStep): UndoStep | null {
    const changedBy = this.queue.changedBy(step.ops, step.version);
    const removes = step.ops.some(({ op }) => op === 'remove');
    // a removal has nothing to compare: whoever changed the element since is asked for instead
    const added =
      changedBy !== undefined && removes
        ? { ok: false as const, reasons: [] }
        : this.queue.add(`${word} ${step.label}`.slice(0, 120), step.ops);
    if (added.ok) {
      this.refusal.set([]);
      return inverseStep(step.label, added);
    }
    const why = changedBy === undefined ? added.reasons.join(' ') : `${changedBy} changed it meanwhile.`;
    this.refusal.set([`“${step.label}” was left out of ${word}: ${why}`]);
    return null;
  }

  /** Asks for pressures, then for the whole, until each is there; the server holds every question for up to five seconds. */
  private resultsWhenReady(networkId: string): Observable<NetworkResults> {
    const version = this.queue.version();
    let bands: 'later' | undefined = 'later';
    const ask = () => this.api.results(networkId, version, bands);
    return ask().pipe(
      expand((results) => {
        if (results.state === 'waiting') return timer(200).pipe(switchMap(ask));
        if (results.state === 'failed' || results.bandsToCome !== true) return EMPTY;
        bands = undefined;
        return timer(PAINT_MS).pipe(switchMap(ask));
      }),
      catchError((error: unknown) => of<NetworkResults>({ state: 'failed', version, problem: toProblem(error) })),
    );
  }
}

function pick<S extends Load['status']>(load: Load, status: S): Extract<Load, { status: S }> | null {
  return load.status === status ? (load as Extract<Load, { status: S }>) : null;
}

function byId<T extends { id: string }>(items: readonly T[] | undefined): ReadonlyMap<string, T> {
  return new Map((items ?? []).map((item) => [item.id, item]));
}

function inverseStep(label: string, { inverse, batchId, version }: Extract<Added, { ok: true }>): UndoStep {
  return { label, ops: inverse, batchId, version };
}

function touchedIds(ops: readonly EditOp[]): string[] {
  return [
    ...new Set(
      ops.flatMap((op) => {
        if (op.op === 'add') return typeof op.value['id'] === 'string' ? [op.value['id']] : [];
        return 'id' in op ? [op.id] : [];
      }),
    ),
  ];
}
