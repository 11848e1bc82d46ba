import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { Problem } from '@riseback/contracts';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';

const TOO_MANY = 429;
const FIRST_OF_THE_SERVER = 500;

/** Why a link does not lead on. What to do about one that no longer counts is projected. */
@Component({
  selector: 'app-link-problem',
  imports: [ProblemBanner, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (passing()) {
      <app-problem-banner [problem]="problem()" [canRetry]="true" (retried)="retried.emit()" />
    } @else {
      <div role="alert"><app-status-mark status="fail" [word]="problem().detail ?? problem().title" /></div>
      <ng-content />
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 12px;
    }
    app-status-mark {
      white-space: normal;
    }
  `,
})
export class LinkProblem {
  readonly problem = input.required<Problem>();
  readonly retried = output();

  /** Not the link's fault: the server is away, busy, or has been asked too often. */
  protected readonly passing = computed(() => {
    const { status } = this.problem();
    return status === 0 || status === TOO_MANY || status >= FIRST_OF_THE_SERVER;
  });
}
