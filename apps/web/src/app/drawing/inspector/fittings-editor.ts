import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { FITTINGS } from '@riseback/hydraulics';
import { type Fitting, FITTING_KINDS, type FittingKind } from '@riseback/network';

/** The fittings of a pipe by kind and number. Each change hands on the whole list: one edit, one step of undo. */
@Component({
  selector: 'app-fittings-editor',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './fittings-editor.html',
  styleUrl: './row-editor.scss',
})
export class FittingsEditor {
  readonly fittings = input.required<readonly Fitting[]>();
  readonly disabled = input(false);
  readonly refusal = input('');
  readonly accepted = output<Fitting[]>();

  protected readonly kinds = FITTING_KINDS.map((kind) => ({ kind, words: FITTINGS[kind].name }));

  protected add(): void {
    const used = new Set(this.fittings().map(({ kind }) => kind));
    const kind = FITTING_KINDS.find((candidate) => !used.has(candidate)) ?? 'elbow90';
    this.accepted.emit([...this.fittings(), { kind, count: 1 }]);
  }

  protected remove(index: number): void {
    this.accepted.emit(this.fittings().filter((_, i) => i !== index));
  }

  protected setKind(index: number, kind: string): void {
    this.replace(index, { kind: kind as FittingKind });
  }

  protected setCount(index: number, box: HTMLInputElement): void {
    const count = Number(box.value);
    if (Number.isInteger(count) && count >= 1) this.replace(index, { count });
    else box.value = String(this.fittings()[index]?.count ?? 1);
  }

  private replace(index: number, change: Partial<Fitting>): void {
    this.accepted.emit(this.fittings().map((fitting, i) => (i === index ? { ...fitting, ...change } : fitting)));
  }
}
