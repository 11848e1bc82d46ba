import type { EditOp } from '@riseback/network';
import type { Proposal } from '../columns/column';
import type { ListTable } from '../list-table';

/** One property of many rows, as one batch: all of them, or none with the first reason. */
export function bulkProposal(table: ListTable, ids: readonly string[], key: string, text: string): Proposal {
  const ops: EditOp[] = [];
  for (const id of ids) {
    const editor = table.editor(id, key);
    if (editor === null || editor.by === 'dialog') continue;
    const proposal = editor.propose(text);
    if (!proposal.ok) return { ...proposal, reason: `${table.nameOf(id)}: ${proposal.reason}` };
    ops.push(...proposal.ops);
  }
  return { ok: true, ops };
}

/** What the first row has in one column, in all the others. */
export function fillDownProposal(table: ListTable, [first, ...others]: readonly string[], key: string): Proposal {
  const editor = first === undefined ? null : table.editor(first, key);
  // two rows with one name could not be told apart
  if (editor === null || editor.by === 'dialog' || key === 'tag' || key === 'name')
    return { ok: false, reason: 'This column cannot be filled down; stand in one that can be typed in.' };
  if (others.length === 0) return { ok: false, reason: 'Select the row to copy from and, under it, the rows to fill.' };
  return bulkProposal(table, others, key, editor.by === 'choice' ? editor.chosen : editor.initial);
}

/** "TR-105 to TR-108", or the one name. */
export function namesOf(table: ListTable, ids: readonly string[]): string {
  const [first, last] = [ids[0], ids.at(-1)];
  if (first === undefined || last === undefined) return '';
  return first === last ? table.nameOf(first) : `${table.nameOf(first)} to ${table.nameOf(last)}`;
}
