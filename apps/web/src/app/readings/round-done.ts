import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { KnownReading } from './kept-items';

/** After the last gauge: what was read, and what is left to do. */
@Component({
  selector: 'app-round-done',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h1>{{ closed() ? 'This round is closed' : 'Every gauge is done' }}</h1>
    <p>{{ words() }}</p>
    @if (closed()) {
      <p>Corrections are still taken: choose the gauge in the list.</p>
    } @else {
      <p>When the round is closed, nothing but corrections is added to it.</p>
      <button type="button" class="first" (click)="closeWanted.emit()">Close the round</button>
    }
    <button type="button" (click)="agreementWanted.emit()">See the agreement</button>
    <button type="button" (click)="listWanted.emit()">All gauges</button>
  `,
  styleUrl: './round-done.scss',
})
export class RoundDone {
  readonly standing = input.required<ReadonlyMap<string, KnownReading>>();
  readonly closed = input(false);
  readonly closeWanted = output();
  readonly agreementWanted = output();
  readonly listWanted = output();

  protected readonly words = computed(() => {
    const readings = [...this.standing().values()];
    const read = readings.filter(({ valuePa }) => valuePa !== undefined).length;
    const not = readings.length - read;
    return not === 0 ? `${String(read)} read.` : `${String(read)} read, ${String(not)} could not be read.`;
  });
}
