import type { MethodChoice } from './method-sentences';

/** A small table of figures that belong to a section. */
export interface MethodTable {
  readonly head: readonly string[];
  readonly rows: readonly (readonly string[])[];
}

/** What the Method view says of one thing that is computed. */
export interface MethodSection {
  /** The fragment of its address; never changed, since links last. */
  readonly id: string;
  readonly title: string;
  /** What it is, in plain words. */
  readonly summary: string;
  /** As docs/methods writes them, where `page` has them too; see `formulaTree`. */
  readonly equations?: readonly string[];
  /** What the letters stand for, [symbol, meaning]. */
  readonly symbols?: readonly (readonly [string, string])[];
  readonly table?: MethodTable;
  readonly notes?: readonly string[];
  /** Where it holds. */
  readonly range: string;
  /** What it does not know, and where it errs. */
  readonly limits: readonly string[];
  readonly sources: readonly string[];
  /** Against what it was checked, and what was reached. */
  readonly checked: string;
  /** Its page in docs/methods, which says more. */
  readonly page: string;
  /** The choice of the network that takes it. */
  readonly choice?: { readonly key: MethodChoice; readonly value: string };
  /** Said where using it can mislead. */
  readonly warning?: string;
}

export interface MethodGroup {
  readonly id: string;
  readonly title: string;
  readonly sections: readonly MethodSection[];
}
