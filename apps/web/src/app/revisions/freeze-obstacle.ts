import type { SolveState } from '../networks/network-store';
import type { SaveState } from '../networks/edit-queue';

/** Why the network cannot be frozen now, and what to do about it. */
export interface Obstacle {
  readonly words: string;
  /** What a button does about it; `wait` where time does. */
  readonly remedy: 'save' | 'wait' | 'mend';
}

/** Only what is saved, settled between its authors and solved in all its cases can be frozen. */
export function freezeObstacle(saveState: SaveState, solveState: SolveState, conflicts: number): Obstacle | null {
  if (conflicts > 0) {
    return { words: 'Someone else changed what you changed: choose first which of both stays.', remedy: 'mend' };
  }
  if (saveState === 'notSaved') {
    return { words: 'Your last edits are not saved, so they would not be in it.', remedy: 'save' };
  }
  if (saveState === 'saving') return { words: 'Your last edit is being saved.', remedy: 'wait' };
  switch (solveState.kind) {
    case 'failed':
      return {
        words: `The network has no solution: ${solveState.problem.detail ?? solveState.problem.title}`,
        remedy: 'mend',
      };
    case 'solving':
    case 'stale':
      return { words: 'The network is being solved.', remedy: 'wait' };
    case 'solved':
      return solveState.bandsToCome
        ? { words: 'The spread over the methods is being computed.', remedy: 'wait' }
        : null;
  }
}
