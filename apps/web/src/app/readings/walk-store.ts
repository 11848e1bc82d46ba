import { computed, effect, inject, Injectable, signal, untracked } from '@angular/core';
import type { CaseOutcome, Problem } from '@riseback/contracts';
import { expand, filter, firstValueFrom, map, take, timer, switchMap, EMPTY } from 'rxjs';
import { NetworkApi } from '../networks/network-api';
import { SessionStore } from '../session/session-store';
import { toProblem } from '../shared/problem';
import { DeviceStore, type PhotoToKeep, type ReadingToKeep } from './device-store';
import type { FieldSheet, GaugeCard } from './field-sheet';
import type { KnownReading, KnownRound } from './kept-items';
import { makeSheet } from './make-sheet';
import { RoundApi } from './round-api';
import { Sender } from './sender';
import { standingReadings } from './standing-readings';
import { inOwnOrder } from './walk-order';

type SheetState =
  | { readonly status: 'loading' }
  /** `kept`: nobody could be asked, and this is what the device has. */
  | { readonly status: 'ready'; readonly sheet: FieldSheet; readonly kept: boolean }
  | { readonly status: 'failed'; readonly problem: Problem };

/** A reading as the person gives it. */
export interface GivenReading {
  readonly answer: Pick<ReadingToKeep, 'valuePa'> | Pick<ReadingToKeep, 'whyNot'>;
  readonly note: string;
  readonly photos: readonly PhotoToKeep[];
}

/** Results that are not there yet are asked for so often; each question is held by the server for up to five seconds. */
const RESULT_TRIES = 6;
const AGAIN_MS = 500;
/** More open rounds than anybody walks. */
const MOST_ROUNDS = 10;

/** The walk through the plant: its gauges, the round that is read, and where in it the person stands. In the page's `providers`. */
@Injectable()
export class WalkStore {
  private readonly networks = inject(NetworkApi);
  private readonly roundApi = inject(RoundApi);
  private readonly device = inject(DeviceStore);
  private readonly session = inject(SessionStore);
  private readonly sender = inject(Sender);

  private readonly state = signal<SheetState>({ status: 'loading' });
  private readonly knownRounds = signal<readonly KnownRound[]>([]);
  private readonly knownReadings = signal<readonly KnownReading[]>([]);
  private readonly ownWalk = signal<readonly string[]>([]);
  private readonly wantedGaugeId = signal<string | null>(null);
  private networkId = '';

  readonly roundId = signal('');
  /** Why something could not be kept on the device. */
  readonly keepingProblem = signal('');

  readonly load = this.state.asReadonly();
  readonly sheet = computed(() => {
    const state = this.state();
    return state.status === 'ready' ? state.sheet : null;
  });
  readonly keptSheet = computed(() => {
    const state = this.state();
    return state.status === 'ready' && state.kept;
  });
  readonly cards = computed(() => inOwnOrder(this.sheet()?.cards ?? [], this.ownWalk()));
  readonly openRounds = computed(() =>
    this.knownRounds()
      .filter(({ closedAt }) => closedAt === undefined)
      .sort((a, b) => b.startedAt.localeCompare(a.startedAt)),
  );
  readonly round = computed(() => this.knownRounds().find(({ id }) => id === this.roundId()) ?? null);
  /** By gauge, the reading that counts. */
  readonly standing = computed(() => standingReadings(this.knownReadings()));
  readonly doneCount = computed(() => this.cards().filter(({ gauge }) => this.standing().has(gauge.id)).length);
  readonly complete = computed(() => this.cards().length > 0 && this.doneCount() === this.cards().length);
  /** The gauge that the person stands before; null when all are read, or the round is closed, and none is gone back to. */
  readonly card = computed((): GaugeCard | null => {
    const wanted = this.cards().find(({ gauge }) => gauge.id === this.wantedGaugeId());
    // a closed round is not gone on with
    if (wanted !== undefined || this.round()?.closedAt !== undefined) return wanted ?? null;
    return this.cards().find(({ gauge }) => !this.standing().has(gauge.id)) ?? null;
  });
  readonly expected = computed(() => this.card()?.expected[this.round()?.caseId ?? '']);
  /** Where the walk goes after this one. */
  readonly nextCard = computed(() => this.unreadAfter(this.card()));

  constructor() {
    // what the server has taken is no longer waiting
    effect(() => {
      this.sender.takenCount();
      untracked(() => void this.refresh());
    });
  }

  async open(networkId: string, roundId: string): Promise<void> {
    this.networkId = networkId;
    this.roundId.set(roundId);
    this.state.set({ status: 'loading' });
    this.ownWalk.set(await this.device.walk(networkId));
    await this.loadSheet();
    this.sender.start();
    await this.learnRounds();
    await this.refresh();
  }

  /** After a time without signal: what was kept is replaced by what is. */
  async readAnew(): Promise<void> {
    if (this.state().status !== 'ready' || this.keptSheet()) await this.loadSheet();
    this.sender.start();
    await this.learnRounds();
    await this.refresh();
  }

  async begin(caseId: string, title: string): Promise<string | null> {
    const sheet = this.sheet();
    if (sheet === null) return null;
    const id = crypto.randomUUID();
    const startedAt = new Date().toISOString();
    const kept = await this.keeps(() =>
      this.device.beginRound(sheet.personId, sheet.networkId, {
        id,
        networkVersion: sheet.networkVersion,
        caseId,
        title,
        startedAt,
      }),
    );
    if (!kept) return null;
    this.roundId.set(id);
    await this.refresh();
    return id;
  }

  async close(): Promise<boolean> {
    const round = this.round();
    return round !== null && this.keeps(() => this.device.closeRound(round, new Date().toISOString()));
  }

  /** Keeps the reading of the gauge that the person stands before, and goes on to the next. */
  async keep({ answer, note, photos }: GivenReading): Promise<boolean> {
    const [round, card] = [this.round(), this.card()];
    if (round === null || card === null) return false;
    const former = this.standing().get(card.gauge.id);
    const reading: ReadingToKeep = {
      id: crypto.randomUUID(),
      gaugeId: card.gauge.id,
      ...answer,
      note,
      takenAt: new Date().toISOString(),
      ...(former === undefined ? {} : { replaces: former.id }),
    };
    const next = this.nextCard();
    const kept = await this.keeps(() => this.device.keepReading(round, reading, photos));
    if (kept) this.wantedGaugeId.set(next?.gauge.id ?? null);
    return kept;
  }

  skip(): void {
    this.wantedGaugeId.set(this.nextCard()?.gauge.id ?? null);
  }

  goTo(gaugeId: string): void {
    this.wantedGaugeId.set(gaugeId);
  }

  /** One place earlier or later in the walk; the device remembers it for this network. */
  async move(gaugeId: string, by: -1 | 1): Promise<void> {
    const ids = this.cards().map(({ gauge }) => gauge.id);
    const from = ids.indexOf(gaugeId);
    const other = ids[from + by];
    if (from < 0 || other === undefined) return;
    [ids[from], ids[from + by]] = [other, gaugeId];
    this.ownWalk.set(ids);
    await this.device.keepWalk(this.networkId, ids);
  }

  private unreadAfter(card: GaugeCard | null): GaugeCard | null {
    const cards = this.cards();
    const at = card === null ? -1 : cards.indexOf(card);
    const round = [...cards.slice(at + 1), ...cards.slice(0, Math.max(0, at))];
    return round.find(({ gauge }) => !this.standing().has(gauge.id)) ?? null;
  }

  private async keeps(act: () => Promise<void>): Promise<boolean> {
    try {
      await act();
      this.keepingProblem.set('');
    } catch {
      this.keepingProblem.set(
        'The device could not keep this: its storage may be full or shut. Write it down, then try again.',
      );
      return false;
    }
    await this.refresh();
    this.sender.start();
    return true;
  }

  private async loadSheet(): Promise<void> {
    try {
      const person = await this.session.restore();
      if (person === null) return;
      const network = await firstValueFrom(this.networks.get(this.networkId));
      const outcomes = await this.outcomes(network.version);
      const units = {
        system: person.units,
        atmosphericPressurePa: network.document.site.atmosphericPressurePa,
      };
      const reader = { personId: person.id, units, timeZone: person.timeZone };
      const sheet = makeSheet(network, outcomes, reader, new Date().toISOString());
      await this.device.keepSheet(sheet);
      this.state.set({ status: 'ready', sheet, kept: false });
    } catch (error) {
      await this.takeKeptSheet(toProblem(error));
    }
  }

  private async takeKeptSheet(problem: Problem): Promise<void> {
    const unreachable = problem.status === 0 || problem.status >= 500;
    const personId = this.session.person()?.id;
    const sheet = !unreachable
      ? undefined
      : personId === undefined
        ? await this.device.lastSheetOf(this.networkId)
        : await this.device.sheet(personId, this.networkId);
    this.state.set(sheet === undefined ? { status: 'failed', problem } : { status: 'ready', sheet, kept: true });
  }

  /** Without results the walk goes on all the same: then nothing is expected. */
  private outcomes(version: number): Promise<readonly CaseOutcome[]> {
    const ask = () => this.networks.results(this.networkId, version);
    return firstValueFrom(
      ask().pipe(
        expand((results, tries) =>
          results.state === 'waiting' && tries < RESULT_TRIES ? timer(AGAIN_MS).pipe(switchMap(ask)) : EMPTY,
        ),
        filter((results, tries) => results.state !== 'waiting' || tries >= RESULT_TRIES),
        take(1),
        map((results) => (results.state === 'finished' ? results.cases : [])),
      ),
      { defaultValue: [] },
    );
  }

  /** Rounds that are open on the server, and those that this device holds for open. */
  private async learnRounds(): Promise<void> {
    const personId = this.sheet()?.personId;
    if (personId === undefined || this.keptSheet()) return;
    try {
      const held = new Set((await this.device.rounds(personId, this.networkId)).map(({ id }) => id));
      const listed = await firstValueFrom(this.roundApi.list(this.networkId));
      const wanted = listed.filter(
        ({ id, closedAt }) => closedAt === undefined || held.has(id) || id === this.roundId(),
      );
      for (const { id } of wanted.slice(0, MOST_ROUNDS)) {
        await this.device.learn(personId, await firstValueFrom(this.roundApi.get(this.networkId, id)));
      }
    } catch {
      // what the device knows is enough to go on with; the server is asked again when the signal is back
    }
  }

  private async refresh(): Promise<void> {
    const personId = this.sheet()?.personId;
    if (personId === undefined) return;
    this.knownRounds.set(await this.device.rounds(personId, this.networkId));
    this.knownReadings.set(this.roundId() === '' ? [] : await this.device.readings(this.roundId()));
    await this.sender.look(personId);
  }
}
