import { HttpErrorResponse } from '@angular/common/http';
import { computed, DestroyRef, inject, Injectable, signal } from '@angular/core';
import type { PersonHere, SolveEvent } from '@riseback/contracts';
import type { Subscription } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { nameOf } from '../shared/element-words';
import { EditQueue } from './edit-queue';
import { initialsOf } from './initials';
import { NetworkApi } from './network-api';
import { networkEvents } from './network-events';

/** Someone else who has the network open. */
export interface Companion {
  readonly personId: string;
  readonly name: string;
  /** Stands for them where a name has no room; no two have the same. */
  readonly initials: string;
  /** Counts the others from 0: which kind of outline is theirs. */
  readonly place: number;
  /** Elements that they have selected and that are there. */
  readonly selectedIds: readonly string[];
  /** Their tags. */
  readonly selected: readonly string[];
}

const TELL_AFTER_MS = 250;
/** As many as the contract takes. */
const MOST_TOLD = 100;

/** The others on the network: what they save arrives here, and who they are. In the network page's `providers`. */
@Injectable()
export class Company {
  private readonly api = inject(NetworkApi);
  private readonly queue = inject(EditQueue);
  private readonly session = inject(SessionStore);

  private readonly people = signal<readonly PersonHere[]>([]);
  private readonly reload = signal(0);
  private readonly solve = signal<SolveEvent | null>(null);
  private readonly plan = signal(0);
  private readonly revisions = signal(0);
  private readonly comments = signal(0);
  private readonly rounds = signal(0);
  private networkId = '';
  private stream: Subscription | undefined;
  private lookedAt: readonly string[] = [];
  private chosen: readonly string[] | null = null;
  private telling: ReturnType<typeof setTimeout> | undefined;

  /** Counted up when the page is too far behind and must read the network again. */
  readonly reloadAsked = this.reload.asReadonly();
  /** How far the newest solve is, as it was last told. */
  readonly solveTold = this.solve.asReadonly();
  /** Counted up when the plan under the drawing may have changed: it was told so, or a stream was opened anew. */
  readonly planTold = this.plan.asReadonly();
  /** Likewise for its revisions, its comments and its rounds of readings. */
  readonly revisionsTold = this.revisions.asReadonly();
  readonly commentsTold = this.comments.asReadonly();
  readonly roundsTold = this.rounds.asReadonly();
  readonly others = computed((): Companion[] => {
    const own = this.session.person()?.id;
    const document = this.queue.present();
    const others = this.people().filter(({ personId }) => personId !== own);
    const initials = initialsOf(others.map(({ name }) => name));
    return others.map(({ personId, name, selected }, place) => {
      const found = selected.flatMap((id) => {
        const element = document?.nodes.get(id)?.value ?? document?.pipes.get(id)?.value;
        return element === undefined ? [] : [{ id, tag: nameOf(element) }];
      });
      return {
        personId,
        name,
        initials: initials[place] ?? '',
        place,
        selectedIds: found.map(({ id }) => id),
        selected: found.map(({ tag }) => tag),
      };
    });
  });
  /** Who else has an element selected; without an entry nobody has. */
  readonly selecting = computed((): ReadonlyMap<string, readonly Companion[]> => {
    const selecting = new Map<string, Companion[]>();
    for (const other of this.others()) {
      for (const id of other.selectedIds) selecting.set(id, [...(selecting.get(id) ?? []), other]);
    }
    return selecting;
  });
  /** Of others' edits as they arrive, for the polite live region. */
  readonly said = computed(() => {
    const own = this.session.person()?.id;
    const heard = this.queue.heard();
    const last = heard.at(-1);
    if (last === undefined) return '';
    const who = last.personId === own ? 'You, in another window,' : last.personName;
    const more = heard.length > 1 ? `, and ${String(heard.length - 1)} more` : '';
    return `${who} changed: ${last.label}${more}`;
  });

  constructor() {
    inject(DestroyRef).onDestroy(() => this.leave());
  }

  /** Listens from the version that the page has just loaded. */
  open(networkId: string): void {
    this.leave();
    this.networkId = networkId;
    this.stream = networkEvents(networkId, () => this.queue.version()).subscribe((event) => {
      switch (event.kind) {
        case 'open':
          this.tellSoon();
          for (const told of [this.plan, this.revisions, this.comments, this.rounds]) told.update((count) => count + 1);
          // the server is there again, which no event of the browser's says where only the server was away
          if (this.queue.problem() !== null) this.queue.retry();
          break;
        case 'edit':
          this.queue.receive([event.batch]).catch((error: unknown) => {
            // what could not be fetched comes with the next edit; what does not apply means that the two sides differ
            if (!(error instanceof HttpErrorResponse)) this.reload.update((count) => count + 1);
          });
          break;
        case 'solve':
          this.solve.set(event.solve);
          break;
        case 'people':
          this.people.set(event.people);
          break;
        case 'plan':
        case 'revisions':
        case 'comments':
        case 'rounds':
          this[event.kind].update((count) => count + 1);
          break;
        case 'reload':
          this.reload.update((count) => count + 1);
      }
    });
  }

  /** The element that the address names: what this person has selected where a view does not say more. */
  lookAt(id: string | undefined): void {
    this.lookedAt = id === undefined ? [] : [id];
    this.tellSoon();
  }

  /** What is selected in the view that is open; null when none is that knows. */
  choose(ids: readonly string[] | null): void {
    this.chosen = ids?.slice(0, MOST_TOLD) ?? null;
    this.tellSoon();
  }

  /** Read out after an element's name: "also selected by Ana Reyes"; '' where nobody else has it. */
  wordsFor(id: string): string {
    const names = this.selecting()
      .get(id)
      ?.map(({ name }) => name);
    return names === undefined ? '' : `also selected by ${names.join(' and ')}`;
  }

  private tellSoon(): void {
    clearTimeout(this.telling);
    if (this.networkId === '') return;
    this.telling = setTimeout(() => {
      // nobody waits for it: the next selection is told anew
      this.api.present(this.networkId, this.chosen ?? this.lookedAt).subscribe({ error: () => undefined });
    }, TELL_AFTER_MS);
  }

  private leave(): void {
    clearTimeout(this.telling);
    this.stream?.unsubscribe();
    this.people.set([]);
    this.solve.set(null);
  }
}
