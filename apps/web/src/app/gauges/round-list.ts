import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { RoundSummary } from '@riseback/contracts';
import { timeWords } from '../account/time-words';

/** The rounds, the newest first. */
@Component({
  selector: 'app-round-list',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <ul>
      @for (round of rounds(); track round.id) {
        <li>
          <button
            type="button"
            [attr.aria-current]="round.id === roundId() ? 'true' : null"
            (click)="chosen.emit(round.id)"
          >
            <strong>{{ round.title || words(round.startedAt) }}</strong>
            <span>{{ caseName()(round.caseId) }}{{ round.closedAt === undefined ? ', open' : '' }}</span>
            <span>
              {{ round.title ? words(round.startedAt) + ', ' : '' }}{{ round.read }} read{{
                round.notRead === 0 ? '' : ', ' + round.notRead + ' not'
              }}
            </span>
          </button>
        </li>
      }
    </ul>
  `,
  styleUrl: './round-list.scss',
})
export class RoundList {
  readonly rounds = input.required<readonly RoundSummary[]>();
  readonly roundId = input.required<string>();
  readonly caseName = input.required<(caseId: string) => string>();
  readonly timeZone = input.required<string>();
  readonly chosen = output<string>();

  protected words(at: string): string {
    return timeWords(at, this.timeZone());
  }
}
