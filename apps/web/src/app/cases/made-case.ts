import type { Navigation } from '@angular/router';

/** What the way to the editor of a case that was just made carries along. */
export interface MadeCase {
  /** The edit's label, to be said. */
  readonly madeCase: string;
  /** The node whose load one most likely types next; null for the case's name. */
  readonly loadOf: string | null;
}

export function madeCaseOf(navigation: Navigation | null): MadeCase | null {
  const state = navigation?.extras.state;
  const madeCase: unknown = state?.['madeCase'];
  const loadOf: unknown = state?.['loadOf'];
  return typeof madeCase === 'string' ? { madeCase, loadOf: typeof loadOf === 'string' ? loadOf : null } : null;
}
