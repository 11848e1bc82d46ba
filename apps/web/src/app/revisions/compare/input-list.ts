import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import type { CommentSubject } from '@riseback/contracts';
import { CommentButton } from './comment-button';
import type { InputRow } from './input-rows';

const SHOWN_AT_FIRST = 100;

/** What was changed: element, quantity, old and new value. Rows of several elements open to name each. */
@Component({
  selector: 'app-input-list',
  imports: [CommentButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './input-list.html',
  styleUrls: ['./compare-table.scss', './input-list.scss'],
})
export class InputList {
  readonly rows = input.required<readonly InputRow[]>();
  readonly beforeLabel = input.required<string>();
  readonly afterLabel = input.required<string>();
  readonly mayComment = input(false);
  readonly elementChosen = output<string>();
  readonly commentOn = output<CommentSubject>();

  protected readonly all = signal(false);
  protected readonly opened = signal<ReadonlySet<string>>(new Set());
  protected readonly lines = computed(() => (this.all() ? this.rows() : this.rows().slice(0, SHOWN_AT_FIRST)));
  protected readonly hidden = computed(() => this.rows().length - this.lines().length);

  protected toggle(key: string): void {
    const opened = new Set(this.opened());
    if (!opened.delete(key)) opened.add(key);
    this.opened.set(opened);
  }
}
