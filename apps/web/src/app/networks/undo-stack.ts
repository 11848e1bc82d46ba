import { computed, Injectable, signal } from '@angular/core';
import type { EditOp } from '@riseback/network';
import type { BatchFate } from './conflicts';
import { renameInOps } from './conflicting-ids';

export interface UndoStep {
  /** What the person did, in the words of the batch. */
  readonly label: string;
  /** The ops that take it back (or, on the redo side, do it again). */
  readonly ops: readonly EditOp[];
  /** The batch that these ops are the inverse of, and the version that it was made on. */
  readonly batchId: string;
  readonly version: number;
}

const MAXIMUM_STEPS = 200;

/** Inverses of one's own batches. An undo is a new batch, so it survives saving; a new edit empties the redo side. */
@Injectable()
export class UndoStack {
  private readonly undoSteps = signal<readonly UndoStep[]>([]);
  private readonly redoSteps = signal<readonly UndoStep[]>([]);

  readonly nextUndo = computed(() => this.undoSteps().at(-1) ?? null);
  readonly nextRedo = computed(() => this.redoSteps().at(-1) ?? null);
  /** All that can be taken back, the oldest first. */
  readonly steps = this.undoSteps.asReadonly();

  clear(): void {
    this.undoSteps.set([]);
    this.redoSteps.set([]);
  }

  edited(step: UndoStep): void {
    this.undoSteps.update((steps) => [...steps, step].slice(-MAXIMUM_STEPS));
    this.redoSteps.set([]);
  }

  /** The last step was taken back; `redo` does it again. */
  undone(redo: UndoStep): void {
    this.undoSteps.update((steps) => steps.slice(0, -1));
    this.redoSteps.update((steps) => [...steps, redo]);
  }

  redone(undo: UndoStep): void {
    this.redoSteps.update((steps) => steps.slice(0, -1));
    this.undoSteps.update((steps) => [...steps, undo]);
  }

  /** The step no longer applies (someone else changed the same thing): it is left out. */
  dropUndo(): void {
    this.undoSteps.update((steps) => steps.slice(0, -1));
  }

  dropRedo(): void {
    this.redoSteps.update((steps) => steps.slice(0, -1));
  }

  /** Steps of a draft that is brought in are older than what was done since. */
  restore(steps: readonly UndoStep[]): void {
    this.undoSteps.update((present) => [...steps, ...present].slice(-MAXIMUM_STEPS));
  }

  /** Batches were put on top of what others saved: their inverses are other ones now, or there is nothing left to take back. */
  follow(fates: ReadonlyMap<string, BatchFate | null>, renamed: ReadonlyMap<string, string>): void {
    const followed = (steps: readonly UndoStep[]) =>
      steps.flatMap((step): UndoStep[] => {
        const fate = fates.get(step.batchId);
        if (fate === null) return [];
        if (fate !== undefined) return [{ ...step, batchId: fate.batchId, ops: fate.inverse }];
        return [{ ...step, ops: renameInOps(step.ops, renamed) }];
      });
    this.undoSteps.update(followed);
    this.redoSteps.update(followed);
  }
}
