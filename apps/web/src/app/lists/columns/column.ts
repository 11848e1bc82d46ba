import type { NodeResult, PipeResult, TrapResult } from '@riseback/contracts';
import type { EditOp, Gauge, NetworkDocument, NetworkNode, PipeRun, TrapModel } from '@riseback/network';
import type { DisplayUnits, QuantityKind } from '@riseback/units';
import type { RowFinding } from '../row-findings';

export type ListedElement = NetworkNode | PipeRun | TrapModel | Gauge;

/** In a few words for the table, and in a sentence for who asks. */
export interface Waiting {
  readonly words: string;
  readonly sentence: string;
}

/** All that a cell's text may depend on besides its element. */
export interface ListContext {
  readonly document: NetworkDocument;
  readonly units: DisplayUnits;
  readonly traps: ReadonlyMap<string, TrapResult>;
  readonly pipes: ReadonlyMap<string, PipeResult>;
  readonly nodes: ReadonlyMap<string, NodeResult>;
  readonly findings: ReadonlyMap<string, readonly RowFinding[]>;
  /** Why the element has no result in the chosen case; null when it has one. */
  readonly waiting: (id: string) => Waiting | null;
  /** The case that an element's result is of, where each element shows its own worst; absent where one case holds for all. */
  readonly caseNameOf?: ((id: string) => string) | undefined;
  /** Right end of every staff in the list, Pa absolute. */
  readonly staffTopPa: number;
}

/** What a typed or chosen text comes to: the ops that make it so, or why it cannot be. */
export type Proposal =
  | { readonly ok: true; readonly ops: readonly EditOp[] }
  | { readonly ok: false; readonly reason: string; readonly suggestion?: string };

export interface Choice {
  readonly value: string;
  readonly word: string;
}

export type DialogName = 'service' | 'fittings' | 'route' | 'capacity';

/** How a cell is edited. Every editor works on text, so that typing, the bulk bar and specs take the same way. */
export type ColumnEditor<E> =
  | {
      readonly by: 'quantity';
      readonly quantity: QuantityKind;
      /** Whether it may be left empty: the key is then absent, or takes its default. */
      readonly optional: boolean;
      readonly si: (element: E, context: ListContext) => number | undefined;
      readonly propose: (si: number | undefined, element: E, context: ListContext) => Proposal;
    }
  | {
      readonly by: 'text';
      readonly optional: boolean;
      readonly maxLength: number;
      /** What the cell holds while it is edited, where that is not the element's own key. */
      readonly initial?: (element: E, context: ListContext) => string;
      /** Texts to offer while typing. */
      readonly suggestions?: (context: ListContext) => readonly string[];
      readonly propose: (text: string | undefined, element: E, context: ListContext) => Proposal;
    }
  | {
      readonly by: 'choice';
      readonly choices: (element: E, context: ListContext) => readonly Choice[];
      readonly chosen: (element: E, context: ListContext) => string;
      readonly propose: (value: string, element: E, context: ListContext) => Proposal;
    }
  | { readonly by: 'dialog'; readonly dialog: DialogName };

/** How a cell stands in a spreadsheet where its print would not read back. */
export interface SheetForm<E> {
  readonly write: (element: E, context: ListContext) => string | undefined;
  readonly read: (text: string, element: E, context: ListContext) => Proposal;
}

export const COLUMN_GROUPS = ['element', 'inputs', 'result'] as const;
export type ColumnGroup = (typeof COLUMN_GROUPS)[number];

/** One typed entry drives a column's head, print, sorting, editing and bulk editing. */
export interface Column<E> {
  readonly key: string;
  readonly title: string;
  readonly group: ColumnGroup;
  readonly widthPx: number;
  /** The unit stands in the head, the numbers to the right. */
  readonly quantity?: QuantityKind;
  /** The unit in the head where the cells are names that carry one, such as nominal sizes. */
  readonly unit?: string;
  /** Shown only when all inputs are wanted. */
  readonly minor?: true;
  /** Left out of the table where this does not hold. */
  readonly wanted?: (context: ListContext) => boolean;
  /** How the cell is drawn when not as text. */
  readonly face?: 'verdict' | 'staff' | 'drawingLink';
  /** What is sorted by, SI; printed by the column's quantity unless `show` says otherwise. */
  readonly value: (element: E, context: ListContext) => number | string | undefined;
  readonly show?: (element: E, context: ListContext) => string;
  /** Set off from typed inputs: worked out from something else. */
  readonly derived?: (element: E) => boolean;
  readonly editor?: ColumnEditor<E>;
  readonly sheet?: SheetForm<E>;
}
