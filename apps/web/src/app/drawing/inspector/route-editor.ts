import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { RoutePiece } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { QuantityField } from '../../shared/quantity-field/quantity-field';

/** Sums of typed lengths agree when they print alike; this is a twentieth of a millimetre. */
const AGREE_M = 5e-5;

/** The pieces of a pipe that rises more than once on its way, with their running sum against its length and rise. */
@Component({
  selector: 'app-route-editor',
  imports: [MatButton, QuantityField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './route-editor.html',
  styleUrl: './row-editor.scss',
})
export class RouteEditor {
  readonly route = input<readonly RoutePiece[]>();
  readonly lengthM = input.required<number>();
  /** From the elevations of the pipe's ends. */
  readonly riseM = input.required<number>();
  readonly units = input.required<DisplayUnits>();
  readonly disabled = input(false);
  readonly refusal = input('');
  /** Undefined takes the route away: the pipe then rises evenly along its length. */
  readonly accepted = output<RoutePiece[] | undefined>();

  protected readonly pieces = computed(() => this.route() ?? []);
  protected readonly sums = computed(() => {
    const lengthM = this.pieces().reduce((sum, piece) => sum + piece.lengthM, 0);
    const riseM = this.pieces().reduce((sum, piece) => sum + piece.riseM, 0);
    const words = (si: number) => formatQuantity(si, 'length', this.units(), { withUnit: true });
    return {
      words: `Together ${words(lengthM)} of ${words(this.lengthM())}, rising ${words(riseM)} of ${words(this.riseM())}`,
      agree: Math.abs(lengthM - this.lengthM()) < AGREE_M && Math.abs(riseM - this.riseM()) < AGREE_M,
    };
  });

  /** A new piece takes what is left, so that the last one closes the sum. */
  protected add(): void {
    const pieces = this.pieces();
    const leftM = this.lengthM() - pieces.reduce((sum, piece) => sum + piece.lengthM, 0);
    const riseLeftM = this.riseM() - pieces.reduce((sum, piece) => sum + piece.riseM, 0);
    this.accepted.emit([...pieces, { lengthM: Math.max(0, leftM), riseM: riseLeftM }]);
  }

  protected remove(index: number): void {
    const left = this.pieces().filter((_, i) => i !== index);
    this.accepted.emit(left.length === 0 ? undefined : left);
  }

  protected set(index: number, change: Partial<RoutePiece>): void {
    this.accepted.emit(this.pieces().map((piece, i) => (i === index ? { ...piece, ...change } : piece)));
  }

  protected setLength(index: number, lengthM: number | undefined): void {
    if (lengthM !== undefined) this.set(index, { lengthM });
  }

  protected setRise(index: number, riseM: number | undefined): void {
    if (riseM !== undefined) this.set(index, { riseM });
  }
}
