import { applyBatch, type EditOp, jsonEqual } from '@riseback/network';
import {
  type DisplayUnits,
  formatForEditing,
  formatQuantity,
  parseQuantity,
  type QuantityKind,
  unitsAccepted,
} from '@riseback/units';
import type { Choice, ColumnEditor, DialogName, ListContext, ListedElement, Proposal } from './columns/column';

/** An editor bound to one cell. `propose` judges a text without changing anything. */
export type CellEditor =
  | {
      readonly by: 'quantity';
      readonly initial: string;
      readonly optional: boolean;
      readonly units: readonly string[];
      readonly propose: (text: string) => Proposal;
      /** How the text is understood; '' while it is not. */
      readonly echo: (text: string) => string;
    }
  | {
      readonly by: 'text';
      readonly initial: string;
      readonly optional: boolean;
      readonly maxLength: number;
      readonly suggestions: readonly string[];
      readonly propose: (text: string) => Proposal;
    }
  | {
      readonly by: 'choice';
      readonly choices: readonly Choice[];
      readonly chosen: string;
      readonly propose: (value: string) => Proposal;
    }
  | { readonly by: 'dialog'; readonly dialog: DialogName };

/** The column of a cell, as refusals name it. */
export interface CellColumn {
  readonly title: string;
  readonly key: string;
  readonly quantity?: QuantityKind | undefined;
}

export function cellEditor<E extends ListedElement>(
  editor: ColumnEditor<E>,
  column: CellColumn,
  element: E,
  context: ListContext,
): CellEditor {
  const judge = (proposal: Proposal): Proposal => tried(proposal, column, context);
  const empty = (): Proposal => ({ ok: false, reason: `${column.title} cannot be empty.` });
  switch (editor.by) {
    case 'dialog':
      return editor;
    case 'choice':
      return {
        by: 'choice',
        choices: editor.choices(element, context),
        chosen: editor.chosen(element, context),
        propose: (value) => judge(editor.propose(value, element, context)),
      };
    case 'text':
      return {
        by: 'text',
        initial: editor.initial?.(element, context) ?? textAt(element, column.key),
        optional: editor.optional,
        maxLength: editor.maxLength,
        suggestions: editor.suggestions?.(context) ?? [],
        propose: (text) => {
          const typed = text.trim();
          if (typed === '' && !editor.optional) return empty();
          return judge(editor.propose(typed === '' ? undefined : typed, element, context));
        },
      };
    case 'quantity': {
      const { quantity, optional } = editor;
      const si = editor.si(element, context);
      const initial = si === undefined ? '' : formatForEditing(si, quantity, context.units);
      return {
        by: 'quantity',
        initial,
        optional,
        units: unitsAccepted(quantity).slice(0, 4),
        propose: (text) => {
          const typed = text.trim();
          // what was not touched is not rounded
          if (typed === initial) return { ok: true, ops: [] };
          if (typed === '') return optional ? judge(editor.propose(undefined, element, context)) : empty();
          const parsed = parseQuantity(typed, quantity, context.units);
          return parsed.ok ? judge(editor.propose(parsed.si, element, context)) : parsed;
        },
        echo: (text) => {
          const parsed = text.trim() === '' ? undefined : parseQuantity(text, quantity, context.units);
          return parsed?.ok === true ? parsed.echo : '';
        },
      };
    }
  }
}

/** The reducer's own judgement before the edit is made, so that a refusal stands at the cell; ops that change nothing fall away. */
function tried(proposal: Proposal, column: CellColumn, { document, units }: ListContext): Proposal {
  if (!proposal.ok) return proposal;
  const ops = proposal.ops.filter(changesSomething);
  const applied = applyBatch(document, ops);
  if (applied.ok) return { ok: true, ops };
  return { ok: false, reason: applied.errors.map(({ detail }) => inWords(detail, column, units)).join(' ') };
}

function changesSomething(op: EditOp): boolean {
  return op.op !== 'set' || !jsonEqual(op.from, op.to);
}

/** "subcoolingK must be at most 300" as the column's title with the bound in the person's unit. */
export function inWords(detail: string, { title, key, quantity }: CellColumn, units: DisplayUnits): string {
  const named = detail.replace(new RegExp(`^${key}\\b`), title);
  if (quantity === undefined || named === detail) return `${named}.`;
  return `${named.replace(/(?<= )-?\d[\d.e+]*$/, (si) => formatQuantity(Number(si), quantity, units, { withUnit: true }))}.`;
}

function textAt(element: ListedElement, key: string): string {
  const value = new Map<string, unknown>(Object.entries(element)).get(key);
  return typeof value === 'string' ? value : '';
}
