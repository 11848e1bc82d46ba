import { ChangeDetectionStrategy, Component, computed, effect, inject, input, viewChild } from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import type { ReportJob, ReportRequest } from '@riseback/contracts';
import { inOrder } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { RevisionHistory } from '../revisions/revision-history';
import { STATE_WORDS } from '../revisions/revision-words';
import { SessionStore } from '../session/session-store';
import { nameOf } from '../shared/element-words';
import { onlineSignal } from '../shared/online';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { ReportForm } from './report-form';
import { ReportList } from './report-list';
import { revisionStanding, type Standing, workingStanding } from './report-standing';
import { ReportStore } from './report-store';

/** Report: choose what, have it made, take it along. Which revision stands in the address. */
@Component({
  selector: 'app-report-page',
  imports: [ProblemBanner, ReportForm, ReportList, RouterLink],
  providers: [ReportStore],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './report-page.html',
  styleUrl: './report-page.scss',
})
export class ReportPage {
  protected readonly network = inject(NetworkStore);
  protected readonly history = inject(RevisionHistory);
  protected readonly store = inject(ReportStore);
  protected readonly timeZone = inject(SessionStore).timeZone;
  private readonly router = inject(Router);

  /** From the address. */
  readonly revision = input<string>();

  private readonly form = viewChild(ReportForm);
  protected readonly online = onlineSignal();

  protected readonly shown = computed(() => this.history.revisions().find(({ id }) => id === this.revision()) ?? null);
  protected readonly revisionId = computed(() => this.shown()?.id);
  protected readonly revisions = computed(() =>
    this.history.revisions().map(({ id, letter, title, state }) => ({
      value: id,
      words: `Revision ${letter}, ${title}: ${STATE_WORDS[state].toLowerCase()}`,
    })),
  );
  protected readonly traps = computed(() => {
    const document = this.network.document();
    if (document === null) return [];
    return inOrder(document.nodes).flatMap(([value, { value: node }]) =>
      node.kind === 'trap' ? [{ value, words: nameOf(node) }] : [],
    );
  });
  protected readonly standings = computed((): Standing[] => {
    const revision = this.shown();
    if (revision !== null) return revisionStanding(revision);
    const outcomes = this.network.finished()?.cases ?? [];
    return workingStanding(this.network.solveState(), this.network.saveState(), outcomes, this.network.mayDraw());
  });
  protected readonly problem = computed(() => {
    const load = this.store.load();
    return load.status === 'failed' ? load.problem : null;
  });
  protected readonly contentUrl = (jobId: string): string => this.store.contentUrl(jobId);
  protected readonly letterOf = (revisionId: string): string => this.history.labelOf(revisionId);

  constructor() {
    effect(() => this.store.networkId.set(this.network.network()?.id ?? ''));
  }

  protected async show(revisionId: string | undefined): Promise<void> {
    await this.router.navigate([], { queryParams: { revision: revisionId ?? null }, queryParamsHandling: 'merge' });
  }

  protected order(request: ReportRequest): void {
    void this.store.order(request);
  }

  protected orderAgain(job: ReportJob): void {
    void this.store.orderAgain(job, this.form()?.paper() ?? 'a4');
  }
}
