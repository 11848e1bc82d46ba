import { computed, effect, inject, Injectable, signal, untracked } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { CaseOutcome, Problem, SolveResult } from '@riseback/contracts';
import { catchError, map, type Observable, of, scan, startWith, switchMap, timer } from 'rxjs';
import { EditQueue } from '../networks/edit-queue';
import { NetworkStore } from '../networks/network-store';
import { worstOfCases } from '@riseback/figures';
import { SessionStore } from '../session/session-store';
import { toProblem } from '../shared/problem';
import { effectsOf } from './effects';
import { KeptTrial } from './kept-trial';
import { proposedStep, type Wish } from './proposed-step';
import { type SolvedPart, solvedPart } from './solved-part';
import { EMPTY_TRIAL, labelOf, layOver, withoutStep, withoutStepsAt, withStep } from './trial';
import { TrialApi } from './trial-api';
import { TrialHistory } from './trial-history';

/** Changes made one after the other within this are solved once. */
const SOLVE_DELAY_MS = 200;

interface Solve {
  readonly state: 'nothing' | 'solving' | 'solved' | 'failed';
  readonly problem: Problem | null;
  /** The newest outcomes; they stay while newer ones are computed. */
  readonly outcomes: readonly CaseOutcome[];
}
const NOTHING: Solve = { state: 'nothing', problem: null, outcomes: [] };

/** What is being tried on the open network: local until kept. In the page's `providers`. */
@Injectable()
export class TrialStore {
  private readonly network = inject(NetworkStore);
  private readonly queue = inject(EditQueue);
  private readonly session = inject(SessionStore);
  private readonly kept = inject(KeptTrial);
  private readonly api = inject(TrialApi);

  /** Steps on the copy, back and forth. */
  readonly history = new TrialHistory();
  private readonly trial = this.history.trial;
  private readonly baseVersion = signal(0);
  private readonly storable = signal(true);
  private readonly broughtBack = signal<number | null>(null);

  readonly steps = computed(() => this.trial().steps);
  /** When what is tried was left on this device, ms; null where it began here. */
  readonly keptSince = this.broughtBack.asReadonly();
  /** Whether a reload would lose it. */
  readonly keepable = this.storable.asReadonly();
  readonly laidOver = computed(() => {
    const document = this.network.document();
    return document === null ? null : layOver(document, this.trial());
  });
  /** The network was changed since the first of what is tried, so that it stands on another one now. */
  readonly movedOn = computed(() => this.steps().length > 0 && this.queue.version() !== this.baseVersion());

  private readonly cases = computed((): readonly string[] => {
    if (this.network.showsWorst()) return this.network.cases().map(({ id }) => id);
    return [this.network.caseId()];
  });
  private readonly part = computed((): SolvedPart | null => {
    const over = this.laidOver();
    return over === null || over.ops.length === 0 ? null : solvedPart(over.document);
  });
  private readonly asked = computed(() => ({ part: this.part(), cases: this.cases() }));
  private readonly solve = toSignal(
    toObservable(this.asked).pipe(
      switchMap(({ part, cases }) => (part === null ? of<Solve>(NOTHING) : this.solved(part, cases))),
      scan(
        (before: Solve, next: Solve) => (next.state === 'solving' ? { ...next, outcomes: before.outcomes } : next),
        NOTHING,
      ),
    ),
    { initialValue: NOTHING },
  );
  readonly state = computed(() => this.solve().state);
  readonly problem = computed(() => this.solve().problem);
  /** Cases without an answer: refused, or without a solution. */
  readonly unanswered = computed(() =>
    this.solve().outcomes.flatMap((outcome) => {
      if (outcome.status === 'refused') return [{ caseId: outcome.caseId, problem: outcome.problem }];
      const { converged, problem } = outcome.result;
      return converged || problem === undefined ? [] : [{ caseId: outcome.caseId, problem }];
    }),
  );
  /** The result with what is tried, in the chosen case or as the worst of all. */
  private readonly after = computed((): SolveResult | null => {
    const { outcomes } = this.solve();
    if (this.network.showsWorst()) return worstOfCases(outcomes)?.result ?? null;
    const [only] = outcomes;
    if (only?.caseId !== this.network.caseId()) return null;
    return only.status === 'solved' && only.result.converged ? only.result : null;
  });
  readonly effects = computed(() => {
    const [document, before, after] = [this.network.document(), this.network.result(), this.after()];
    if (document === null || before?.converged !== true || after === null) return null;
    return effectsOf(document, before, after);
  });
  /** Only one of the two has its bands, as in a large network of many cases: a pass may then be a watch for that alone. */
  readonly bandsDiffer = computed(() => {
    const [before, after] = [this.network.result(), this.after()];
    return before !== null && after !== null && hasBands(before) !== hasBands(after);
  });
  readonly leftOut = computed(() => {
    const before = new Set(this.network.result()?.leftOut);
    return (this.part()?.leftOut ?? []).filter((id) => !before.has(id));
  });

  constructor() {
    effect(() => {
      const key = this.placeToKeep();
      if (key !== null) untracked(() => this.bringBack(...key));
    });
    effect(() => {
      const trial = this.trial();
      const key = untracked(() => this.placeToKeep());
      if (key !== null && this.loaded) this.storable.set(this.kept.put(...key, trial, untracked(this.baseVersion)));
    });
  }

  /** Tries one thing more. '' where it was taken, else why not. */
  add(wish: Wish): string {
    const [document, over] = [this.network.document(), this.laidOver()];
    if (document === null || over === null) return 'The network is not loaded yet.';
    const proposed = proposedStep(over.document, wish, this.network.units());
    if (!proposed.ok) return proposed.reason;
    const step = { ...proposed.step, id: crypto.randomUUID() };
    const next = withStep(document, this.trial(), step);
    const refusal = layOver(document, next).refused.find(({ stepId }) => stepId === step.id);
    if (refusal !== undefined) return refusal.reasons.join(' ');
    if (this.steps().length === 0) this.baseVersion.set(this.queue.version());
    this.history.change(`trying ${step.words}`, next);
    return '';
  }

  takeOut(stepId: string): void {
    const words = this.steps().find(({ id }) => id === stepId)?.words ?? '';
    this.history.change(`taking out ${words}`, withoutStep(this.trial(), stepId));
  }

  /** What others changed meanwhile stays theirs. */
  leaveToOthers(): void {
    const places = new Set(this.laidOver()?.overtaken.map(({ place }) => place));
    this.history.change('leaving to others what they changed', withoutStepsAt(this.trial(), places));
    this.baseVersion.set(this.queue.version());
  }

  drop(): void {
    this.history.change('dropping all that was tried', EMPTY_TRIAL);
    this.broughtBack.set(null);
  }

  /** Makes all of it one edit of the network, one step of undo. False where it was refused: the network's `lastRefusal` says why. */
  keep(): boolean {
    const over = this.laidOver();
    if (over === null || !this.network.mayDraw() || !this.network.edit(labelOf(this.trial()), over.ops)) return false;
    this.history.begin(EMPTY_TRIAL);
    this.broughtBack.set(null);
    return true;
  }

  private loaded = false;

  private placeToKeep(): readonly [personId: string, networkId: string] | null {
    const [personId, networkId] = [this.session.person()?.id, this.network.network()?.id];
    return personId === undefined || networkId === undefined ? null : [personId, networkId];
  }

  private bringBack(personId: string, networkId: string): void {
    const kept = this.kept.get(personId, networkId);
    this.loaded = true;
    this.history.begin(kept?.trial ?? EMPTY_TRIAL);
    this.broughtBack.set(kept?.at ?? null);
    this.baseVersion.set(kept?.version ?? this.queue.version());
  }

  private solved(part: SolvedPart, cases: readonly string[]): Observable<Solve> {
    return timer(SOLVE_DELAY_MS).pipe(
      switchMap(() => this.api.solve(part.file, cases)),
      map((outcomes): Solve => ({ state: 'solved', problem: null, outcomes })),
      catchError((error: unknown) => of<Solve>({ state: 'failed', problem: toProblem(error), outcomes: [] })),
      startWith<Solve>({ state: 'solving', problem: null, outcomes: [] }),
    );
  }
}

function hasBands({ traps }: SolveResult): boolean {
  return traps.some(({ credible }) => credible !== undefined);
}
