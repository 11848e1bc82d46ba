import {
  CdkFixedSizeVirtualScroll,
  CdkVirtualForOf,
  CdkVirtualScrollableElement,
  CdkVirtualScrollViewport,
} from '@angular/cdk/scrolling';
import {
  ChangeDetectionStrategy,
  Component,
  computed,
  type ElementRef,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogContent,
  MatDialogRef,
  MatDialogTitle,
} from '@angular/material/dialog';
import type { EditOp } from '@riseback/network';
import { StatusMark } from '../../shared/status-mark/status-mark';
import { BlockDraft, type BlockSource } from './block-draft';
import { type BadCell, countOf, planWords, type PlannedRow, type RowFate } from './block-plan';
import { type Block, readCopiedCells } from './block-text';

export interface BlockDialogData extends BlockSource {
  readonly title: string;
  readonly one: string;
  readonly many: string;
  /** Null to be pasted into the dialog. */
  readonly block: Block | null;
}

export interface AcceptedBlock {
  /** "add 12 traps and change 3". */
  readonly words: string;
  readonly ops: readonly EditOp[];
}

const FATE_WORDS: Readonly<Record<RowFate, string>> = {
  new: 'New',
  changed: 'Changes',
  same: 'As it is',
  bad: 'Not taken',
};
/** Bad cells that stand open at once; the others follow as these are mended. */
const CELLS_SHOWN = 20;

/** What a block of a spreadsheet would do, before it does it; closes with the ops, all of them, or with nothing. */
@Component({
  selector: 'app-block-dialog',
  imports: [
    CdkFixedSizeVirtualScroll,
    CdkVirtualForOf,
    CdkVirtualScrollableElement,
    CdkVirtualScrollViewport,
    MatButton,
    MatDialogActions,
    MatDialogContent,
    MatDialogTitle,
    StatusMark,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './block-dialog.html',
  styleUrl: './block-dialog.scss',
})
export class BlockDialog {
  protected readonly data = inject<BlockDialogData>(MAT_DIALOG_DATA);
  protected readonly reference = inject<MatDialogRef<BlockDialog, AcceptedBlock>>(MatDialogRef);

  private readonly badList = viewChild<ElementRef<HTMLElement>>('badList');

  protected readonly FATE_WORDS = FATE_WORDS;
  protected readonly ROW_HEIGHT_PX = 26;
  protected readonly draft = new BlockDraft(this.data);
  protected readonly refusedText = signal('');
  protected readonly fields = this.data.target.fields.filter(({ readable }) => readable);
  protected readonly isEmpty = computed(() => this.draft.block().rows.length === 0);
  protected readonly bad = computed(() => this.draft.plan().bad.slice(0, CELLS_SHOWN));
  protected readonly moreBad = computed(() => Math.max(0, this.draft.plan().bad.length - CELLS_SHOWN));
  protected readonly badKeys = computed(
    () => new Set(this.draft.plan().bad.map(({ row, key }) => `${String(row)}/${key}`)),
  );
  protected readonly width = computed(() => this.draft.mapping().columns.length);
  protected readonly template = computed(() => `56px 88px 84px repeat(${String(this.width())}, 128px)`);
  protected readonly changesNothing = computed(() => {
    const { ops, bad, refusal } = this.draft.plan();
    return ops.length === 0 && bad.length === 0 && refusal === '';
  });
  protected readonly acceptWords = computed(() =>
    capitalized(planWords(this.draft.plan(), this.data.one, this.data.many)),
  );
  protected readonly counts = computed(() => {
    const plan = this.draft.plan();
    const left = this.draft.leftOutCount();
    const words = [
      [countOf(plan, 'new'), 'new'],
      [countOf(plan, 'changed'), 'changed'],
      [countOf(plan, 'same'), 'as they are'],
      [countOf(plan, 'bad'), 'not taken'],
      [left, 'left out'],
    ] as const;
    const told = words.filter(([count]) => count > 0).map(([count, word]) => `${String(count)} ${word}`);
    const rows = plan.rows.length + left;
    return `${String(rows)} ${rows === 1 ? 'row' : 'rows'}: ${told.join(', ')}.`;
  });

  constructor() {
    if (this.data.block !== null) this.draft.block.set(this.data.block);
  }

  protected take(text: string): void {
    const read = readCopiedCells(text);
    this.refusedText.set(read.ok ? '' : `${read.title}. ${read.detail}`);
    if (read.ok) this.draft.block.set(read.block);
  }

  protected trackRow(_: number, { number }: PlannedRow): number {
    return number;
  }

  protected cellText({ number }: PlannedRow, place: number): string {
    const key = this.draft.mapping().columns[place]?.key;
    const text = key === undefined ? undefined : this.draft.texts().get(number)?.get(key);
    return text ?? this.draft.block().rows.find((row) => row.number === number)?.cells[place] ?? '';
  }

  protected isBad({ number }: PlannedRow, place: number): boolean {
    return this.badKeys().has(`${String(number)}/${this.draft.mapping().columns[place]?.key ?? ''}`);
  }

  protected mend(cell: BadCell, text: string): void {
    this.draft.mend(cell, text);
    // the mended one is gone from the list, and the focus with it
    this.focusFirstBad();
  }

  protected leaveRowOut(row: number): void {
    this.draft.leaveRowOut(row);
    this.focusFirstBad();
  }

  protected accept(event: Event): void {
    event.preventDefault();
    const plan = this.draft.plan();
    if (plan.bad.length > 0) this.focusFirstBad();
    else if (this.changesNothing()) this.reference.close();
    else if (plan.ops.length > 0)
      this.reference.close({ words: planWords(plan, this.data.one, this.data.many), ops: plan.ops });
  }

  private focusFirstBad(): void {
    requestAnimationFrame(() => {
      const list = this.badList()?.nativeElement;
      const next = list?.querySelector('input') ?? list?.closest('form')?.querySelector<HTMLElement>('[type=submit]');
      next?.focus();
      // what is wrong is typed over
      if (next instanceof HTMLInputElement) next.select();
    });
  }
}

function capitalized(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}
