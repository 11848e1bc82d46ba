import { CdkConnectedOverlay, CdkOverlayOrigin, type ConnectedPosition } from '@angular/cdk/overlay';
import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  type ElementRef,
  input,
  output,
  signal,
  viewChild,
} from '@angular/core';
import type { Proposal } from '../columns/column';
import type { CellEditor } from '../cell-editor';
import type { RefusedText } from './cell-drafts';
import { StatusMark } from '../../shared/status-mark/status-mark';

type TextEditor = Extract<CellEditor, { by: 'quantity' | 'text' }>;
/** Where the grid goes when a text was accepted. */
export type AfterEdit = 'down' | 'up' | 'right' | 'left' | 'stay';
export interface AcceptedText {
  readonly proposal: Extract<Proposal, { ok: true }>;
  readonly then: AfterEdit;
}

let editorCount = 0;

/**
 * The text box in a cell, with what the typed text is understood as, or why it cannot be, floating under it.
 * Enter and Tab accept, Escape restores. A text that is refused stays in the box.
 */
@Component({
  selector: 'app-cell-text-editor',
  imports: [CdkConnectedOverlay, CdkOverlayOrigin, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './cell-text-editor.html',
  styleUrl: './cell-text-editor.scss',
})
export class CellTextEditor {
  readonly editor = input.required<TextEditor>();
  readonly label = input.required<string>();
  /** What the cell shows while it is not edited: what Escape keeps. */
  readonly shown = input.required<string>();
  /** What stands in the box at first: the stored text, a draft refused before, or the first key typed. */
  readonly start = input.required<string>();
  /** Whether the first key typed replaces it all. */
  readonly selectAll = input(true);
  readonly refusedBefore = input('');
  readonly accepted = output<AcceptedText>();
  readonly cancelled = output();
  /** The person went elsewhere while the text could not be accepted. */
  readonly leftRefused = output<RefusedText>();

  private readonly box = viewChild.required<ElementRef<HTMLInputElement>>('box');

  private readonly typed = signal<string | null>(null);
  private readonly refusal = signal<Extract<Proposal, { ok: false }> | null>(null);
  private finished = false;

  protected readonly id = `cell-editor-${String(++editorCount)}`;
  protected readonly below: ConnectedPosition[] = [
    { originX: 'start', originY: 'bottom', overlayX: 'start', overlayY: 'top', offsetY: 6 },
    { originX: 'start', originY: 'top', overlayX: 'start', overlayY: 'bottom', offsetY: -6 },
    { originX: 'end', originY: 'bottom', overlayX: 'end', overlayY: 'top', offsetY: 6 },
  ];

  protected readonly text = computed(() => this.typed() ?? this.start());
  protected readonly echo = computed(() => {
    const editor = this.editor();
    return editor.by === 'quantity' ? editor.echo(this.text()) : '';
  });
  protected readonly unitWords = computed(() => {
    const editor = this.editor();
    return editor.by === 'quantity' ? editor.units.join(', ') : '';
  });
  protected readonly suggestions = computed(() => {
    const editor = this.editor();
    return editor.by === 'text' ? editor.suggestions : [];
  });
  protected readonly complaint = computed(() => {
    const refusal = this.refusal();
    if (refusal !== null) return refusal.reason;
    return this.typed() === null ? this.refusedBefore() : '';
  });
  protected readonly suggestion = computed(() => this.refusal()?.suggestion ?? '');
  protected readonly hinted = computed(() => this.editor().by === 'quantity' || this.complaint() !== '');

  constructor() {
    afterNextRender(() => {
      const box = this.box().nativeElement;
      box.focus({ preventScroll: true });
      if (this.selectAll()) box.select();
      else box.setSelectionRange(box.value.length, box.value.length);
    });
  }

  protected type(text: string): void {
    this.typed.set(text);
    this.refusal.set(null);
  }

  protected onKey(event: KeyboardEvent): void {
    if (event.isComposing) return;
    // the grid behind must not move or tick rows while a text is typed
    event.stopPropagation();
    if (event.key === 'Escape') {
      event.preventDefault();
      this.finished = true;
      this.cancelled.emit();
    } else if (event.key === 'Enter') {
      event.preventDefault();
      this.accept(event.shiftKey ? 'up' : 'down');
    } else if (event.key === 'Tab') {
      event.preventDefault();
      this.accept(event.shiftKey ? 'left' : 'right');
    }
  }

  protected leave(): void {
    if (this.finished) return;
    if (this.accept('stay')) return;
    this.finished = true;
    this.leftRefused.emit({ text: this.text(), reason: this.complaint() });
  }

  protected takeSuggestion(): void {
    this.type(this.suggestion());
    this.accept('down');
  }

  private accept(then: AfterEdit): boolean {
    const proposal = this.editor().propose(this.text());
    if (!proposal.ok) {
      this.refusal.set(proposal);
      return false;
    }
    this.finished = true;
    this.accepted.emit({ proposal, then });
    return true;
  }
}
