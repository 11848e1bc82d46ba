import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { NetworkStore } from '../../networks/network-store';
import { ProblemBanner } from '../../shared/problem-banner/problem-banner';

/** Where results stand beside inputs: why there are none, and another try. Nothing while there are, or while they are on their way. */
@Component({
  selector: 'app-no-results',
  imports: [ProblemBanner],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (problem(); as why) {
      <app-problem-banner [problem]="why" [canRetry]="true" (retried)="store.askResultsAgain()">
        <p>The results shown, if any, are of an earlier state of the network.</p>
      </app-problem-banner>
    }
  `,
})
export class NoResults {
  protected readonly store = inject(NetworkStore);
  protected readonly problem = computed(() => {
    const state = this.store.solveState();
    return state.kind === 'failed' ? state.problem : null;
  });
}
