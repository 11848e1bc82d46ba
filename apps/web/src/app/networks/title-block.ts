import { formatDate } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, inject, input, LOCALE_ID } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { CaseOutcome } from '@riseback/contracts';
import { countVerdicts, type VerdictCounts } from '../results/verdict';
import { RevisionHistory } from '../revisions/revision-history';
import { workingWords } from '../revisions/revision-words';
import { SessionStore } from '../session/session-store';
import { StatusMark } from '../shared/status-mark/status-mark';
import { FRICTION_WORDS, STATIC_LIFT_WORDS } from './method-words';
import { EditQueue } from './edit-queue';
import { NetworkStore } from './network-store';

/** More cases than these do not fit beside each other even on a wide screen, and fold into one menu. */
const MOST_SIDE_BY_SIDE = 4;

interface CaseOption {
  readonly id: string;
  readonly name: string;
  readonly worst: boolean;
  readonly current: boolean;
  /** Null while there is no result. */
  readonly counts: VerdictCounts | null;
  readonly refused: boolean;
  /** What the counts leave out; '' when nothing. */
  readonly note: string;
}

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
  private readonly queue = inject(EditQueue);
  private readonly history = inject(RevisionHistory);
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  private readonly locale = inject(LOCALE_ID);

  /** What a frozen revision is called; '' for the network as it is drawn. */
  readonly frozenWords = input('');

  /** Whether what is drawn is a revision still, or has gone on. */
  protected readonly revisionWords = computed(() => {
    const saved = this.store.saveState() === 'saved';
    return this.history.load().status === 'ready'
      ? workingWords(this.history.newest(), this.queue.version(), saved)
      : 'Working';
  });
  /** The cases, and behind them the worst of all. */
  protected readonly cases = computed((): CaseOption[] => {
    const outcomes = this.store.outcomes();
    const options = this.store.cases().map(({ id, name }) => ({ id, name, ...countsOf(outcomes.get(id)) }));
    const worst = this.store.hasWorst() ? [this.worstOption()] : [];
    return [...options.map((option) => ({ ...option, worst: false, note: '' })), ...worst].map((option) => ({
      ...option,
      current: option.id === this.store.caseId(),
    }));
  });
  protected readonly manyCases = computed(() => this.store.cases().length > MOST_SIDE_BY_SIDE);
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
        return `Stale: ${this.store.saveProblem()?.title ?? 'not saved yet'}`;
      case 'failed':
        return `No solution: ${state.problem.detail ?? state.problem.title}`;
      case 'solved': {
        const at = formatDate(state.at, 'HH:mm', this.locale, zoneOffset(this.session.timeZone(), state.at));
        return state.bandsToCome
          ? `Solved ${at}, spread to come`
          : `Solved ${at} in ${Math.max(1, Math.round(state.ms)).toString()} ms`;
      }
    }
  });

  private worstOption(): Omit<CaseOption, 'current'> {
    const worst = this.store.worst();
    const missing = worst?.unanswered.length ?? 0;
    return {
      id: this.store.worstCaseId(),
      name: 'Worst of all',
      worst: true,
      counts: worst === null ? null : countVerdicts(worst.result),
      refused: worst === null && this.store.caseOutcomes().length > 0,
      note: missing === 0 ? '' : `${String(missing)} without result`,
    };
  }

  protected chooseCase(id: string): void {
    void this.router.navigate([], { queryParams: { case: id }, queryParamsHandling: 'merge' });
  }
}

function countsOf(outcome: CaseOutcome | undefined): Pick<CaseOption, 'counts' | 'refused'> {
  const solved = outcome?.status === 'solved' && outcome.result.converged ? outcome.result : null;
  return { counts: solved === null ? null : countVerdicts(solved), refused: outcome !== undefined && solved === null };
}

/** The zone's offset at a time, as formatDate takes it: it knows offsets, not IANA names. */
function zoneOffset(timeZone: string, at: string): string {
  const part = new Intl.DateTimeFormat('en', { timeZone, timeZoneName: 'longOffset' })
    .formatToParts(new Date(at))
    .find(({ type }) => type === 'timeZoneName');
  const offset = part?.value.replace('GMT', '').replace(':', '') ?? '';
  return offset === '' ? '+0000' : offset;
}
