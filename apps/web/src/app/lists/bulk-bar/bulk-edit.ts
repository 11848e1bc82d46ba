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

/** "TR-105 to TR-108", or the one name. */
export function namesOf(table: ListTable, ids: readonly string[]): string {
  const [first, last] = [ids[0], ids.at(-1)];
  if (first === undefined || last === undefined) return '';
  return first === last ? table.nameOf(first) : `${table.nameOf(first)} to ${table.nameOf(last)}`;
}
