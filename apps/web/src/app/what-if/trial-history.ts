import { computed, signal } from '@angular/core';
import type { StepHistory } from '../networks/undo-buttons';
import { EMPTY_TRIAL, type Trial } from './trial';

interface PastTrial {
  readonly trial: Trial;
  readonly label: string;
}

/** What is tried, and what was tried before: steps on the copy go back and forth without touching the network. */
export class TrialHistory implements StepHistory {
  private readonly current = signal<Trial>(EMPTY_TRIAL);
  private readonly past = signal<readonly PastTrial[]>([]);
  private readonly future = signal<readonly PastTrial[]>([]);

  readonly trial = this.current.asReadonly();
  readonly undoLabel = computed(() => this.past().at(-1)?.label ?? null);
  readonly redoLabel = computed(() => this.future().at(-1)?.label ?? null);

  change(label: string, trial: Trial): void {
    this.past.update((past) => [...past, { trial: this.current(), label }]);
    this.future.set([]);
    this.current.set(trial);
  }

  /** Begins anew from a trial, with nothing to go back to. */
  begin(trial: Trial): void {
    this.past.set([]);
    this.future.set([]);
    this.current.set(trial);
  }

  undo(): void {
    const last = this.past().at(-1);
    if (last === undefined) return;
    this.past.update((past) => past.slice(0, -1));
    this.future.update((future) => [...future, { trial: this.current(), label: last.label }]);
    this.current.set(last.trial);
  }

  redo(): void {
    const next = this.future().at(-1);
    if (next === undefined) return;
    this.future.update((future) => future.slice(0, -1));
    this.past.update((past) => [...past, { trial: this.current(), label: next.label }]);
    this.current.set(next.trial);
  }
}
