import { computed, Injectable, signal } from '@angular/core';
import type { EditOp } from '@riseback/network';

export interface UndoStep {
  /** What the person did, in the words of the batch. */
  readonly label: string;
  /** The ops that take it back (or, on the redo side, do it again). */
  readonly ops: readonly EditOp[];
}

const MAXIMUM_STEPS = 200;

/** Inverses of one's own batches. An undo is a new batch, so it survives saving; a new edit empties the redo side. */
@Injectable()
export class UndoStack {
  private readonly undoSteps = signal<readonly UndoStep[]>([]);
  private readonly redoSteps = signal<readonly UndoStep[]>([]);

  readonly nextUndo = computed(() => this.undoSteps().at(-1) ?? null);
  readonly nextRedo = computed(() => this.redoSteps().at(-1) ?? null);

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
}
