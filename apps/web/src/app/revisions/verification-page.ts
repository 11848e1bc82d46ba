import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { Verification, VerificationStep } from '@riseback/contracts';
import { formatQuantity } from '@riseback/units';
import { elementName } from '../comments/comment-subjects';
import { timeWords } from '../account/time-words';
import { NetworkStore } from '../networks/network-store';
import { type Load, LOADING } from '../shared/load';
import { SessionStore } from '../session/session-store';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { rereading } from '../shared/rereading';
import { type Status, StatusMark } from '../shared/status-mark/status-mark';
import { RevisionApi } from './revision-api';

const OUTCOMES: Readonly<Record<VerificationStep['outcome'], { readonly status: Status; readonly word: string }>> = {
  matches: { status: 'pass', word: 'Matches' },
  broken: { status: 'fail', word: 'Broken' },
  notThere: { status: 'none', word: 'Not there' },
};

const LOGGED_TIME = /\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z/g;

/** What was verified of a revision, one thing after the other, and how anyone can do it without this page. */
@Component({
  selector: 'app-verification-page',
  imports: [MatButton, ProblemBanner, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './verification-page.html',
  styleUrl: './verification-page.scss',
})
export class VerificationPage {
  private readonly api = inject(RevisionApi);
  protected readonly store = inject(NetworkStore);
  private readonly session = inject(SessionStore);

  readonly revisionId = input.required<string>();

  private readonly asked = signal(0);
  protected readonly load = toSignal(
    rereading(
      computed(() => {
        const networkId = this.store.network()?.id;
        return { key: networkId === undefined ? '' : this.revisionId(), count: this.asked() };
      }),
      (revisionId) => this.api.verification(this.store.networkId(), revisionId),
    ),
    { initialValue: LOADING satisfies Load<Verification> },
  );
  protected readonly verification = computed(() => {
    const load = this.load();
    return load.status === 'ready' ? load.value : null;
  });
  protected readonly problem = computed(() => {
    const load = this.load();
    return load.status === 'failed' ? load.problem : null;
  });
  protected readonly steps = computed(() => {
    const verification = this.verification();
    return (verification?.steps ?? []).map((step) => ({
      ...step,
      ...OUTCOMES[step.outcome],
      name: step.name.charAt(0).toUpperCase() + step.name.slice(1),
      detail: this.inOwnTime(step.detail),
      first: step.name === verification?.firstBroken,
    }));
  });
  protected readonly command = computed(() => `npm run --silent verify-revision -- ${this.revisionId()}`);
  protected readonly solvedAgain = computed(() => {
    const again = this.verification()?.solvedAgain;
    if (again === undefined) return '';
    const engine = again.sameEngine
      ? `the same engine, ${again.engineVersion}`
      : `engine ${again.engineVersion}, which is not the one that it was signed with`;
    if (again.largestDifferencePa === 0 && again.verdictsChanged === 0) {
      return `Solved again by ${engine}: every back pressure and every verdict comes out the same.`;
    }
    const difference = formatQuantity(again.largestDifferencePa, 'pressureDifference', this.store.units(), {
      withUnit: true,
    });
    const where = [
      again.trapId === undefined ? '' : ` at ${elementName(again.trapId, this.store.document())}`,
      again.caseId === undefined ? '' : ` in ${this.store.nameOfCase(again.caseId) || again.caseId}`,
    ].join('');
    const verdicts =
      again.verdictsChanged === 0
        ? 'no verdict changes'
        : again.verdictsChanged === 1
          ? '1 verdict changes'
          : `${String(again.verdictsChanged)} verdicts change`;
    return `Solved again by ${engine}: back pressures differ by ${difference} at most${where}, and ${verdicts}.`;
  });

  /** The command line says times as the log keeps them; a person reads them by their own clock. */
  private inOwnTime(detail: string): string {
    return detail.replaceAll(LOGGED_TIME, (at) => timeWords(at, this.session.timeZone()));
  }

  protected again(): void {
    this.asked.update((count) => count + 1);
  }
}
