import { parseQuantity } from '@riseback/units';
import type { Choice, Column, ListContext, ListedElement, Proposal } from '../columns/column';

/** What a spreadsheet's text means in one cell. Whether the whole element then holds together is judged by its schema afterwards. */
export function readCell<E extends ListedElement>(
  { editor, sheet, title }: Column<E>,
  text: string,
  element: E,
  context: ListContext,
): Proposal {
  if (sheet !== undefined) return sheet.read(text, element, context);
  switch (editor?.by) {
    case 'quantity': {
      const parsed = parseQuantity(text, editor.quantity, context.units);
      return parsed.ok ? editor.propose(parsed.si, element, context) : parsed;
    }
    case 'text':
      return editor.propose(text.trim(), element, context);
    case 'choice': {
      const choices = editor.choices(element, context);
      const choice = findChoice(text, choices);
      return choice === undefined
        ? { ok: false, reason: `“${text}” is not one of ${wordsOf(choices)}.` }
        : editor.propose(choice.value, element, context);
    }
    case 'dialog':
    case undefined:
      return { ok: false, reason: `${title} cannot be set from a spreadsheet.` };
  }
}

/** What an empty cell does where empty cells clear; undefined for a column that always holds something. */
export function readEmptyCell<E extends ListedElement>(
  { editor }: Column<E>,
  element: E,
  context: ListContext,
): Proposal | undefined {
  switch (editor?.by) {
    case 'quantity':
      return editor.optional ? editor.propose(undefined, element, context) : undefined;
    case 'text':
      return editor.optional ? editor.propose(undefined, element, context) : undefined;
    case 'choice': {
      const none = editor.choices(element, context).some(({ value }) => value === '');
      return none ? editor.propose('', element, context) : undefined;
    }
    case 'dialog':
    case undefined:
      return undefined;
  }
}

/** The text of a cell as the list writes it out; undefined for numbers, which are compared as such. */
export function writtenText<E extends ListedElement>(
  { quantity, sheet, show, value }: Column<E>,
  element: E,
  context: ListContext,
): string | undefined {
  if (sheet !== undefined) return sheet.write(element, context)?.trim();
  if (quantity !== undefined) return undefined;
  const text = show?.(element, context) ?? value(element, context);
  return typeof text === 'string' ? text.trim() : undefined;
}

/** By its word, by what stands before the bracket in it, or by its value in the network file. */
function findChoice(text: string, choices: readonly Choice[]): Choice | undefined {
  const wanted = folded(text);
  return (
    choices.find(({ word }) => folded(word) === wanted) ??
    choices.find(({ word }) => folded(word.replace(/\s*\(.*$/, '')) === wanted) ??
    choices.find(({ value }) => value !== '' && folded(value) === wanted)
  );
}

/** Spreadsheets write booleans in capitals, people leave hyphens out. */
function folded(text: string): string {
  const plain = text
    .trim()
    .toLowerCase()
    .replace(/[\s-]+/g, '');
  return plain === 'true' ? 'yes' : plain === 'false' ? 'no' : plain;
}

const CHOICES_NAMED = 6;

function wordsOf(choices: readonly Choice[]): string {
  const words = choices.map(({ word }) => word);
  if (words.length <= CHOICES_NAMED) return words.join(', ');
  return `${words.slice(0, CHOICES_NAMED).join(', ')} and ${String(words.length - CHOICES_NAMED)} more`;
}
