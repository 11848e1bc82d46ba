import { formatDate } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, inject, LOCALE_ID } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { countVerdicts } from '../results/verdict';
import { SessionStore } from '../session/session-store';
import { StatusMark } from '../shared/status-mark/status-mark';
import { FRICTION_WORDS, STATIC_LIFT_WORDS } from './method-words';
import { NetworkStore } from './network-store';

/** The ruled title block under the bar: site, network, cases, method, and whether all is saved and solved. */
@Component({
  selector: 'app-title-block',
  imports: [MatButton, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './title-block.html',
  styleUrl: './title-block.scss',
})
export class TitleBlock {
  protected readonly store = inject(NetworkStore);
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  private readonly locale = inject(LOCALE_ID);

  protected readonly cases = computed(() => {
    const outcomes = this.store.outcomes();
    return this.store.cases().map(({ id, name }) => {
      const outcome = outcomes.get(id);
      return {
        id,
        name,
        current: id === this.store.caseId(),
        counts: outcome?.status === 'solved' && outcome.result.converged ? countVerdicts(outcome.result) : null,
        refused: outcome !== undefined && (outcome.status === 'refused' || !outcome.result.converged),
      };
    });
  });
  protected readonly trapCount = computed(
    () => [...(this.store.document()?.nodes.values() ?? [])].filter(({ value }) => value.kind === 'trap').length,
  );
  protected readonly methodWords = computed(() => {
    const method = this.store.document()?.method;
    return method === undefined ? '' : `${FRICTION_WORDS[method.friction]}, ${STATIC_LIFT_WORDS[method.staticLift]}`;
  });
  protected readonly solveWords = computed(() => {
    const state = this.store.solveState();
    switch (state.kind) {
      case 'solving':
        return 'Solving';
      case 'stale':
        return 'Stale: not saved yet';
      case 'failed':
        return `No solution: ${state.problem.detail ?? state.problem.title}`;
      case 'solved':
        return `Solved ${formatDate(state.at, 'HH:mm', this.locale, zoneOffset(this.session.timeZone(), state.at))} in ${Math.max(1, Math.round(state.ms)).toString()} ms`;
    }
  });

  protected chooseCase(id: string): void {
    void this.router.navigate([], { queryParams: { case: id }, queryParamsHandling: 'merge' });
  }
}

/** The zone's offset at a time, as formatDate takes it: it knows offsets, not IANA names. */
function zoneOffset(timeZone: string, at: string): string {
  const part = new Intl.DateTimeFormat('en', { timeZone, timeZoneName: 'longOffset' })
    .formatToParts(new Date(at))
    .find(({ type }) => type === 'timeZoneName');
  const offset = part?.value.replace('GMT', '').replace(':', '') ?? '';
  return offset === '' ? '+0000' : offset;
}
