import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal, untracked } from '@angular/core';
import { Title } from '@angular/platform-browser';
import { Router, RouterLink } from '@angular/router';
import { onlineSignal } from '../shared/online';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { GaugeEntry } from './gauge-entry';
import { readingWords } from './reading-words';
import { RoundDone } from './round-done';
import { RoundStart } from './round-start';
import { SignalLine } from './signal-line';
import { type DialUnit, dialUnitOf } from './typed-reading';
import { WalkList } from './walk-list';
import { type GivenReading, WalkStore } from './walk-store';

/** Readings on a phone: one gauge at a time, with a signal and without. Which round stands in the address. */
@Component({
  selector: 'app-reading-page',
  imports: [GaugeEntry, ProblemBanner, RoundDone, RoundStart, RouterLink, SignalLine, WalkList],
  providers: [WalkStore],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(window:online)': 'store.readAnew()' },
  templateUrl: './reading-page.html',
  styleUrl: './reading-page.scss',
})
export class ReadingPage {
  protected readonly store = inject(WalkStore);
  private readonly router = inject(Router);

  /** From the address. */
  readonly siteId = input.required<string>();
  readonly networkId = input.required<string>();
  readonly round = input<string>();

  protected readonly online = onlineSignal();
  protected readonly listShown = signal(false);
  protected readonly ownUnit = signal<DialUnit | null>(null);
  /** What was just done, said once. */
  protected readonly news = signal('');

  protected readonly unit = computed(() => {
    const units = this.store.sheet()?.units;
    return this.ownUnit() ?? (units === undefined ? 'psig' : dialUnitOf(units));
  });
  protected readonly problem = computed(() => {
    const load = this.store.load();
    return load.status === 'failed' ? load.problem : null;
  });
  protected readonly former = computed(() => this.store.standing().get(this.store.card()?.gauge.id ?? ''));
  protected readonly backTo = computed(() => ['/sites', this.siteId(), 'networks', this.networkId(), 'gauges']);
  private opened = '';

  constructor() {
    const title = inject(Title);
    effect(() => {
      const [networkId, round] = [this.networkId(), this.round() ?? ''];
      // a round begun here is in the address later than in the store
      if (this.opened === networkId && untracked(this.store.roundId) === round) return;
      this.opened = networkId;
      untracked(() => void this.store.open(networkId, round));
    });
    effect(() => {
      const name = this.store.sheet()?.networkName;
      if (name !== undefined) title.setTitle(`Readings, ${name} · Riseback`);
    });
  }

  protected async begin({ caseId, title }: { caseId: string; title: string }): Promise<void> {
    const round = await this.store.begin(caseId, title);
    if (round !== null) await this.choose(round);
  }

  protected async choose(round: string): Promise<void> {
    await this.router.navigate([], { queryParams: { round }, queryParamsHandling: 'merge' });
  }

  protected async keep(given: GivenReading): Promise<void> {
    const name = this.store.card()?.name ?? '';
    const words = readingWords(given.answer, this.unit());
    if (await this.store.keep(given)) this.news.set(`${name} kept: ${words}.`);
  }

  protected skip(): void {
    const name = this.store.card()?.name ?? '';
    if (this.store.nextCard() === null) this.listShown.set(true);
    else this.store.skip();
    this.news.set(`${name} skipped.`);
  }

  protected goTo(gaugeId: string): void {
    this.store.goTo(gaugeId);
    this.listShown.set(false);
  }

  protected async close(): Promise<void> {
    if (!(await this.store.close())) return;
    this.store.goTo('');
    this.listShown.set(false);
    this.news.set('The round is closed.');
  }

  protected async toAgreement(): Promise<void> {
    await this.router.navigate(this.backTo(), { queryParams: { round: this.store.roundId() } });
  }
}
