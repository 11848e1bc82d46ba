import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { GRID, snapPoint } from '@riseback/figures';
import type { Position } from '@riseback/network';

/** Where a pipe bends on the drawing, in figures: what is dragged there can be typed here. It computes nothing. */
@Component({
  selector: 'app-bends-editor',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './bends-editor.html',
  styleUrl: './row-editor.scss',
})
export class BendsEditor {
  readonly bends = input<readonly Position[]>();
  /** Where the pipe starts and ends on the drawing. */
  readonly start = input.required<Position>();
  readonly end = input.required<Position>();
  readonly startName = input.required<string>();
  readonly disabled = input(false);
  readonly refusal = input('');
  /** Undefined takes all bends away. */
  readonly accepted = output<Position[] | undefined>();

  protected readonly complaint = signal('');
  protected readonly rows = computed(() => {
    const start = this.start();
    return (this.bends() ?? []).map(({ x, y }) => ({ x: inSteps(x - start.x), y: inSteps(y - start.y) }));
  });

  /** Half-way between the last bend, or the start, and the end. */
  protected add(): void {
    const bends = this.bends() ?? [];
    const [last, end] = [bends.at(-1) ?? this.start(), this.end()];
    this.hand([...bends, snapPoint({ x: (last.x + end.x) / 2, y: (last.y + end.y) / 2 })]);
  }

  protected remove(index: number): void {
    this.hand((this.bends() ?? []).filter((_, i) => i !== index));
  }

  protected set(index: number, axis: 'x' | 'y', box: HTMLInputElement): void {
    const text = box.value.trim().replace('\u2212', '-').replace(',', '.');
    const steps = Number(text);
    if (text === '' || !Number.isFinite(steps)) {
      this.complaint.set(`“${box.value}” is no number of grid steps. Give one such as 3 or -2.`);
      return;
    }
    const to = this.start()[axis] + steps * GRID;
    this.hand((this.bends() ?? []).map((bend, i) => (i === index ? { ...bend, [axis]: to } : bend)));
  }

  private hand(bends: readonly Position[]): void {
    this.complaint.set('');
    this.accepted.emit(bends.length === 0 ? undefined : [...bends]);
  }
}

function inSteps(length: number): string {
  return String(Number((length / GRID).toFixed(2)));
}
