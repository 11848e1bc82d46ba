import { ChangeDetectionStrategy, Component, computed, effect, inject, input, untracked } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import { displayUnit } from '@riseback/units';
import { clockWords, timeWords } from '../account/time-words';
import { NetworkStore } from '../networks/network-store';
import { gaugeCards } from '../readings/make-sheet';
import { RoundApi } from '../readings/round-api';
import { Sender } from '../readings/sender';
import { SignalLine } from '../readings/signal-line';
import { SessionStore } from '../session/session-store';
import { onlineSignal } from '../shared/online';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AgreementChart } from './agreement-chart';
import { agreementFigure } from './agreement-figure';
import { agreementCounts, agreementLines } from './agreement-lines';
import { AgreementTable } from './agreement-table';
import { GaugeTrend } from './gauge-trend';
import { ReadingLog } from './reading-log';
import { RoundList } from './round-list';
import { RoundStore } from './round-store';
import { trendFigure } from './trend-figure';

/** Gauges: the rounds of readings, and whether what was read is what was designed. Round and gauge stand in the address. */
@Component({
  selector: 'app-gauges-page',
  imports: [
    AgreementChart,
    AgreementTable,
    GaugeTrend,
    MatButton,
    ProblemBanner,
    ReadingLog,
    RoundList,
    RouterLink,
    SignalLine,
    StatusMark,
  ],
  providers: [RoundStore],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './gauges-page.html',
  styleUrl: './gauges-page.scss',
})
export class GaugesPage {
  protected readonly network = inject(NetworkStore);
  protected readonly store = inject(RoundStore);
  protected readonly sender = inject(Sender);
  private readonly api = inject(RoundApi);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);
  protected readonly timeZone = inject(SessionStore).timeZone;

  /** From the address. */
  readonly round = input<string>();
  readonly gauge = input<string>();

  protected readonly online = onlineSignal();

  protected readonly unit = computed(() => displayUnit('pressure', this.network.units().system));
  protected readonly problem = computed(() => {
    const load = this.store.load();
    return load.status === 'failed' ? load.problem : this.store.wholeProblem();
  });
  private readonly rows = computed(() => [...(this.store.agreement()?.values() ?? [])]);
  private readonly whyNot = computed(
    () =>
      new Map(
        (this.store.round()?.readings ?? []).flatMap(({ gaugeId, whyNot }) =>
          whyNot === undefined ? [] : [[gaugeId, whyNot] as const],
        ),
      ),
  );
  protected readonly lines = computed(() => agreementLines(this.rows(), this.whyNot(), this.network.units()));
  protected readonly counts = computed(() => agreementCounts(this.rows()));
  protected readonly figure = computed(() => agreementFigure(this.rows(), this.network.units()));
  protected readonly places = computed((): ReadonlyMap<string, string> => {
    const document = this.network.document();
    const cards = document === null ? [] : gaugeCards(document, [], this.network.units());
    return new Map(cards.map(({ gauge, place }) => [gauge.id, place]));
  });
  /** The gauge whose trend is shown: the chosen one, or the first that does not agree, or the first. */
  protected readonly gaugeId = computed(() => {
    const lines = this.lines();
    const chosen = lines.find(({ gaugeId }) => gaugeId === this.gauge());
    const telling = lines.find(({ status }) => status === 'fail') ?? lines[0];
    return (chosen ?? telling)?.gaugeId ?? '';
  });
  protected readonly gaugeName = computed(
    () => this.lines().find(({ gaugeId }) => gaugeId === this.gaugeId())?.name ?? '',
  );
  protected readonly trend = computed(() =>
    trendFigure(this.store.history(), this.gaugeId(), this.gaugeName(), this.network.units(), this.timeZone()),
  );
  protected readonly head = computed(() => {
    const round = this.store.round();
    if (round === null) return null;
    const closed = round.closedAt === undefined ? 'still open' : `closed ${this.clock(round.closedAt)}`;
    return {
      title: round.title || `Round of ${timeWords(round.startedAt, this.timeZone())}`,
      words: `${this.caseName(round.caseId)}, begun ${timeWords(round.startedAt, this.timeZone())} by ${round.personName}, ${closed}`,
    };
  });
  /** Read against one version, compared with another. */
  protected readonly movedOn = computed(() => {
    const [round, version] = [this.store.round(), this.network.network()?.version];
    return round !== null && version !== undefined && round.networkVersion < version;
  });
  /** Why there is nothing to compare with; '' when there is. */
  protected readonly unsolved = computed(() => {
    const round = this.store.round();
    if (round === null || this.store.agreement() !== null) return '';
    const outcome = this.network.outcomes().get(round.caseId);
    if (outcome?.status === 'refused') return outcome.problem.detail ?? outcome.problem.title;
    if (this.network.solveState().kind === 'solving') return 'The network is being solved.';
    return 'The case of this round has no result. Mend what the findings name, or look whether the case was removed.';
  });
  protected readonly photoUrl = (readingId: string, photoId: string): string =>
    this.api.photoUrl(this.network.network()?.id ?? '', readingId, photoId);
  protected readonly caseNameOf = (caseId: string): string => this.caseName(caseId);

  constructor() {
    effect(() => this.store.wantedRoundId.set(this.round() ?? ''));
    untracked(() => this.sender.start());
  }

  protected async show(round: string): Promise<void> {
    await this.router.navigate([], { queryParams: { round }, queryParamsHandling: 'merge' });
  }

  protected async showGauge(gauge: string): Promise<void> {
    await this.router.navigate([], { relativeTo: this.route, queryParams: { gauge }, queryParamsHandling: 'merge' });
  }

  private caseName(caseId: string): string {
    return this.network.nameOfCase(caseId) || 'As drawn';
  }

  private clock(at: string): string {
    return clockWords(new Date(at), this.timeZone());
  }
}
