import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, output } from '@angular/core';
import { timeWords } from '../account/time-words';
import type { FieldSheet } from './field-sheet';
import type { KnownRound } from './kept-items';
import { READING_CAUTION } from './reading-words';

/** Before the walk: which round is gone on with, or in which case a new one begins. */
@Component({
  selector: 'app-round-start',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h1>Which round?</h1>
    <p class="caution">{{ caution }}</p>
    @if (openRounds().length > 0) {
      <section aria-labelledby="open-rounds">
        <h2 id="open-rounds">Go on with</h2>
        @for (round of openRounds(); track round.id) {
          <button type="button" (click)="chosen.emit(round.id)">
            <strong>{{ round.title || 'Round of ' + words(round.startedAt) }}</strong>
            <span>{{ caseName(round.caseId) }}, begun {{ words(round.startedAt) }}</span>
          </button>
        }
      </section>
    }
    @if (sheet().mayRead) {
      <form aria-labelledby="new-round" (submit)="begin($event, title.value)">
        <h2 id="new-round">Begin a round</h2>
        <label>
          How is the plant run just now?
          <select #choice (change)="caseId.set(choice.value)">
            @for (item of sheet().cases; track item.id) {
              <option [value]="item.id" [selected]="item.id === caseId()">{{ item.name }}</option>
            }
          </select>
        </label>
        <label>
          Title, if it needs one
          <input #title type="text" maxlength="120" autocomplete="off" />
        </label>
        <button class="first" type="submit">Begin with {{ sheet().cards.length }} gauges</button>
      </form>
    } @else {
      <p>Your role at this site reads; it does not take readings. The administrator of the site gives roles.</p>
    }
  `,
  styleUrl: './round-start.scss',
})
export class RoundStart {
  readonly sheet = input.required<FieldSheet>();
  readonly openRounds = input.required<readonly KnownRound[]>();
  readonly chosen = output<string>();
  readonly begun = output<{ readonly caseId: string; readonly title: string }>();

  protected readonly caution = READING_CAUTION;
  protected readonly caseId = linkedSignal(() => this.sheet().cases[0]?.id ?? '');
  private readonly names = computed(() => new Map(this.sheet().cases.map(({ id, name }) => [id, name])));

  protected caseName(caseId: string): string {
    return this.names().get(caseId) ?? (caseId === '' ? 'As drawn' : caseId);
  }

  protected words(at: string): string {
    return timeWords(at, this.sheet().timeZone);
  }

  protected begin(event: Event, title: string): void {
    event.preventDefault();
    this.begun.emit({ caseId: this.caseId(), title: title.trim() });
  }
}
