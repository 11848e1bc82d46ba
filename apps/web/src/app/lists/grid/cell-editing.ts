import { type Signal, signal } from '@angular/core';
import type { EditOp } from '@riseback/network';
import type { DialogName } from '../columns/column';
import type { ListTable, TableColumn } from '../list-table';
import { CellDrafts, type CellKey, type RefusedText } from './cell-drafts';
import type { AcceptedText, AfterEdit } from './cell-text-editor';
import type { GridCell } from './grid-layout';

export interface CellEdit {
  readonly label: string;
  readonly ops: readonly EditOp[];
}

interface OpenCell extends CellKey {
  readonly start: string;
  readonly selectAll: boolean;
}

/** What editing needs of the grid that it happens in. */
interface EditedGrid {
  readonly table: Signal<ListTable>;
  readonly mayEdit: Signal<boolean>;
  readonly activeId: Signal<string | null>;
  readonly activeCell: Signal<GridCell | undefined>;
  readonly edited: (edit: CellEdit) => void;
  readonly dialogWanted: (asked: { id: string; dialog: DialogName }) => void;
  readonly told: (words: string) => void;
  /** The box is closed by a key, which says where to go on. */
  readonly left: (then: AfterEdit) => void;
  readonly opened: () => void;
}

/** The one cell that is being edited, and the refused texts that were left standing. */
export class CellEditing {
  private readonly drafts = new CellDrafts();
  private readonly cell = signal<OpenCell | null>(null);

  readonly open = this.cell.asReadonly();

  constructor(private readonly grid: EditedGrid) {}

  draft(id: string, { key }: TableColumn): RefusedText | undefined {
    return this.drafts.of({ id, key });
  }

  label(id: string, { title }: TableColumn): string {
    return `${title} of ${this.grid.table().nameOf(id)}`;
  }

  editorOf(id: string, { key }: TableColumn) {
    const open = this.cell();
    if (open?.id !== id || open.key !== key) return null;
    const editor = this.grid.table().editor(id, key);
    return editor === null || editor.by === 'dialog' ? null : { ...open, editor };
  }

  /** @param firstKey what the person typed on the closed cell, which begins a new text; null keeps the old one */
  start(firstKey: string | null): boolean {
    const cell = this.grid.activeCell();
    const id = this.grid.activeId();
    if (id === null || cell?.kind !== 'column') return false;
    const { key } = cell.column;
    const editor = this.grid.mayEdit() ? this.grid.table().editor(id, key) : null;
    if (editor === null) {
      if (firstKey === null) this.grid.told(`${this.label(id, cell.column)} cannot be changed here`);
      return firstKey === null;
    }
    if (editor.by === 'dialog') {
      if (firstKey === null) this.grid.dialogWanted({ id, dialog: editor.dialog });
      return firstKey === null;
    }
    const initial = editor.by === 'choice' ? '' : editor.initial;
    const start = firstKey ?? this.draft(id, cell.column)?.text ?? initial;
    this.cell.set({ id, key, start, selectAll: firstKey === null });
    this.grid.opened();
    return true;
  }

  accept({ proposal, then }: AcceptedText): void {
    const cell = this.cell();
    if (cell === null) return;
    this.cell.set(null);
    this.drafts.drop(cell);
    this.emit(cell, proposal.ops);
    if (then !== 'stay') this.grid.left(then);
  }

  cancel(): void {
    const cell = this.cell();
    this.cell.set(null);
    if (cell !== null) this.drafts.drop(cell);
    this.grid.left('stay');
  }

  keepDraft(refused: RefusedText): void {
    const cell = this.cell();
    if (cell === null) return;
    this.cell.set(null);
    this.drafts.keep(cell, refused);
  }

  pick(value: string): void {
    const cell = this.cell();
    const editor = cell === null ? null : this.grid.table().editor(cell.id, cell.key);
    if (cell === null || editor?.by !== 'choice') return;
    const proposal = editor.propose(value);
    if (proposal.ok) {
      this.drafts.drop(cell);
      this.emit(cell, proposal.ops);
    } else {
      const text = editor.choices.find((choice) => choice.value === value)?.word ?? value;
      this.keepDraft({ text, reason: proposal.reason });
      this.grid.told(proposal.reason);
    }
  }

  endPicking(): void {
    this.cell.set(null);
    this.grid.left('stay');
  }

  /** Empties the active cell; false where there is nothing that could be emptied. */
  empty(): boolean {
    const cell = this.grid.activeCell();
    const id = this.grid.activeId();
    if (id === null || cell?.kind !== 'column') return false;
    const { key } = cell.column;
    const editor = this.grid.table().editor(id, key);
    if (editor === null || editor.by === 'dialog' || editor.by === 'choice') return false;
    const proposal = editor.propose('');
    if (proposal.ok) this.emit({ id, key }, proposal.ops);
    else this.grid.told(proposal.reason);
    return true;
  }

  /** Forgets the refused text of the active cell; false where there is none. */
  dropDraft(id: string): boolean {
    const cell = this.grid.activeCell();
    if (cell?.kind !== 'column' || this.draft(id, cell.column) === undefined) return false;
    this.drafts.drop({ id, key: cell.column.key });
    return true;
  }

  private emit({ id, key }: CellKey, ops: readonly EditOp[]): void {
    const column = this.grid.table().columns.find((each) => each.key === key);
    if (column === undefined || ops.length === 0) return;
    this.grid.edited({ label: `set ${column.title.toLowerCase()} of ${this.grid.table().nameOf(id)}`, ops });
  }
}
