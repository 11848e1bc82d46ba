import { computed, inject, Injectable, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { Round, RoundSummary } from '@riseback/contracts';
import { type AgreementRow, agreementOf } from '@riseback/diagnosis';
import { inOrder, toFile } from '@riseback/network';
import { filter, forkJoin, map, of, scan, switchMap } from 'rxjs';
import { Company } from '../networks/company';
import { NetworkStore } from '../networks/network-store';
import { predictedResult } from '../readings/predicted-result';
import { RoundApi } from '../readings/round-api';
import { Sender } from '../readings/sender';
import { type Load, LOADING, loads } from '../shared/load';
import { rereading } from '../shared/rereading';

/** A gauge's trend looks back over so many rounds. */
export const ROUNDS_IN_TREND = 12;

/** What came of a round: by gauge, against the result of its case. */
export type RoundAgreement = ReadonlyMap<string, AgreementRow>;

/** The rounds of the network, and what the chosen one says. In the page's `providers`. */
@Injectable()
export class RoundStore {
  private readonly api = inject(RoundApi);
  private readonly network = inject(NetworkStore);
  private readonly company = inject(Company);
  private readonly sender = inject(Sender);

  private readonly asked = signal(0);
  /** From the address; '' takes the newest. */
  readonly wantedRoundId = signal('');
  private readonly reading = computed(() => ({
    key: this.network.network()?.id ?? '',
    // what this device itself has brought in may be told late, or not at all to a page that was hidden
    count: this.asked() + this.company.roundsTold() + this.sender.takenCount(),
  }));

  readonly load = toSignal<Load<RoundSummary[]>, Load<RoundSummary[]>>(
    rereading(this.reading, (networkId) => this.api.list(networkId)),
    { initialValue: LOADING },
  );
  /** The newest first. */
  readonly rounds = computed((): readonly RoundSummary[] => {
    const load = this.load();
    return load.status === 'ready' ? load.value.toSorted((a, b) => b.startedAt.localeCompare(a.startedAt)) : [];
  });
  readonly roundId = computed(() => {
    const wanted = this.wantedRoundId();
    const rounds = this.rounds();
    return rounds.some(({ id }) => id === wanted) ? wanted : (rounds[0]?.id ?? '');
  });
  private readonly needed = computed(
    () => ({
      networkId: this.reading().key,
      ids: [
        ...new Set([
          this.roundId(),
          ...this.rounds()
            .slice(0, ROUNDS_IN_TREND)
            .map(({ id }) => id),
        ]),
      ].filter(Boolean),
      rounds: this.rounds(),
    }),
    { equal: (a, b) => a.networkId === b.networkId && a.ids.join() === b.ids.join() && a.rounds === b.rounds },
  );
  private readonly whole = toSignal(
    toObservable(this.needed).pipe(
      filter(({ ids }) => ids.length > 0),
      switchMap(({ networkId, ids }) =>
        loads(ids.length === 0 ? of([]) : forkJoin(ids.map((id) => this.api.get(networkId, id)))),
      ),
      // while they are read anew, what was read stays on the screen
      scan((before: Load<Round[]>, now) => (now.status === 'loading' && before.status === 'ready' ? before : now)),
      map((load): Load<Round[]> => load),
    ),
    { initialValue: LOADING satisfies Load<Round[]> },
  );
  readonly wholeProblem = computed(() => {
    const whole = this.whole();
    return whole.status === 'failed' ? whole.problem : null;
  });
  private readonly wholeRounds = computed(() => {
    const whole = this.whole();
    return whole.status === 'ready' ? whole.value : [];
  });
  readonly round = computed(() => this.wholeRounds().find(({ id }) => id === this.roundId()) ?? null);
  /** The rounds that were read, the oldest first, each with what came of it. */
  readonly history = computed(() =>
    this.wholeRounds()
      .map((round) => ({ round, agreement: this.agreementWith(round) }))
      .sort((a, b) => a.round.startedAt.localeCompare(b.round.startedAt)),
  );
  /** Null while the round's case has no result. */
  readonly agreement = computed(
    () => this.history().find(({ round }) => round.id === this.roundId())?.agreement ?? null,
  );
  readonly mayRead = computed(() => this.network.may('readings'));
  readonly hasGauges = computed(() =>
    inOrder(this.network.document()?.gauges ?? new Map()).some(([, { value }]) => !value.retired),
  );

  reload(): void {
    this.asked.update((count) => count + 1);
  }

  private agreementWith(round: Round): RoundAgreement | null {
    const document = this.network.document();
    const outcome = this.network.outcomes().get(round.caseId);
    if (document === null || outcome?.status !== 'solved') return null;
    return agreementOf(round, { file: toFile(document), result: predictedResult(outcome.result) });
  }
}
