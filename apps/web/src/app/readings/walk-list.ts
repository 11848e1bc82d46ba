import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { clockWords } from '../account/time-words';
import type { GaugeCard } from './field-sheet';
import type { KnownReading } from './kept-items';
import { readingWords } from './reading-words';
import type { DialUnit } from './typed-reading';

/** All gauges in the order of the walk: what was read, what is to come, and where to go. */
@Component({
  selector: 'app-walk-list',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h1>All gauges</h1>
    <ol>
      @for (row of rows(); track row.id) {
        @if (row.area; as area) {
          <li class="area">{{ area }}</li>
        }
        <li>
          <button type="button" class="go" (click)="chosen.emit(row.id)">
            <strong>{{ row.name }}</strong>
            <span>{{ row.place }}</span>
            <span class="state">{{ row.state }}</span>
          </button>
          <button
            type="button"
            class="move"
            [disabled]="$first"
            [attr.aria-label]="row.name + ' earlier'"
            (click)="moved.emit({ gaugeId: row.id, by: -1 })"
          >
            ↑
          </button>
          <button
            type="button"
            class="move"
            [disabled]="$last"
            [attr.aria-label]="row.name + ' later'"
            (click)="moved.emit({ gaugeId: row.id, by: 1 })"
          >
            ↓
          </button>
        </li>
      }
    </ol>
    @if (closable()) {
      <p>When the round is closed, nothing but corrections is added to it.</p>
      <button type="button" class="close" (click)="closeWanted.emit()">Close the round</button>
    }
  `,
  styleUrl: './walk-list.scss',
})
export class WalkList {
  readonly cards = input.required<readonly GaugeCard[]>();
  readonly standing = input.required<ReadonlyMap<string, KnownReading>>();
  readonly unit = input.required<DialUnit>();
  readonly timeZone = input.required<string>();
  readonly closable = input(false);
  readonly chosen = output<string>();
  readonly closeWanted = output();
  readonly moved = output<{ readonly gaugeId: string; readonly by: -1 | 1 }>();

  protected readonly rows = computed(() =>
    this.cards().map(({ gauge, name, place, area }, i, cards) => ({
      id: gauge.id,
      name,
      place,
      // an area is named where the walk enters it
      area: cards[i - 1]?.area === area ? '' : area,
      state: this.stateOf(gauge.id),
    })),
  );

  private stateOf(gaugeId: string): string {
    const reading = this.standing().get(gaugeId);
    if (reading === undefined) return 'To be read';
    const words = `${readingWords(reading, this.unit())}, ${clockWords(new Date(reading.takenAt), this.timeZone())}`;
    return reading.waiting ? `${words}, waits to be sent` : words;
  }
}
