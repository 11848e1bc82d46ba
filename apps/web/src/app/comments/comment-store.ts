import { computed, inject, Injectable, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { type CommentSubject, type CommentThread, type NamedPerson, type Problem, roleMay } from '@riseback/contracts';
import { firstValueFrom, type Observable } from 'rxjs';
import { Company } from '../networks/company';
import { NetworkStore } from '../networks/network-store';
import { SessionStore } from '../session/session-store';
import { type Load, LOADING } from '../shared/load';
import { toProblem } from '../shared/problem';
import { rereading } from '../shared/rereading';
import { CommentApi } from './comment-api';
import { elementOf, numberedThreads } from './comment-subjects';
import { mentioned } from './mentions';

/** What a new comment is: an answer in a thread, or the beginning of one, at a revision or at the network as it is drawn. */
export type CommentPlace =
  { readonly threadId: string } | { readonly subject: CommentSubject; readonly revisionId?: string | undefined };

/** The comments on the network that is open, read anew whenever the server speaks of them. In the network page's `providers`. */
@Injectable()
export class CommentStore {
  private readonly api = inject(CommentApi);
  private readonly network = inject(NetworkStore);
  private readonly company = inject(Company);
  private readonly session = inject(SessionStore);

  private readonly asked = signal(0);
  private readonly known = signal<readonly NamedPerson[]>([]);
  private namesOf = '';

  /** At which revision the pages comment; undefined at the network as it is drawn. */
  readonly revisionId = signal<string | undefined>(undefined);
  readonly load = toSignal(
    rereading(
      computed(() => ({
        key: this.network.network()?.id ?? '',
        count: this.asked() + this.company.commentsTold(),
      })),
      (networkId) => this.api.threads(networkId),
    ),
    { initialValue: LOADING satisfies Load<CommentThread[]> },
  );
  readonly threads = computed((): readonly CommentThread[] => {
    const load = this.load();
    return load.status === 'ready' ? load.value : [];
  });
  readonly numbers = computed(() => numberedThreads(this.threads()));
  /** Open threads by the element that they are pinned to, in the order of their numbers; at a revision, those of that one alone. */
  readonly openAt = computed((): ReadonlyMap<string, readonly CommentThread[]> => {
    const [numbers, revisionId] = [this.numbers(), this.revisionId()];
    const open = new Map<string, CommentThread[]>();
    for (const thread of this.threads()) {
      const element = elementOf(thread.subject);
      const here = revisionId === undefined || thread.revisionId === revisionId;
      if (element !== null && thread.resolved === undefined && here)
        open.set(element, [...(open.get(element) ?? []), thread]);
    }
    for (const threads of open.values()) threads.sort((a, b) => (numbers.get(a.id) ?? 0) - (numbers.get(b.id) ?? 0));
    return open;
  });
  /** Who can be mentioned; asked for when someone begins to write. */
  readonly people = this.known.asReadonly();
  readonly mayComment = computed(() => this.network.may('comment'));
  /** A new comment is asked for from elsewhere; `opened` once its form stands there. */
  readonly wanted = signal<{ readonly subject: CommentSubject; readonly opened: boolean } | null>(null);

  /** For the name of an element: "2 open comments". */
  wordsFor(elementId: string): string {
    const count = this.openAt().get(elementId)?.length ?? 0;
    if (count === 0) return '';
    return count === 1 ? '1 open comment' : `${String(count)} open comments`;
  }

  /** Who began a thread resolves it, and who draws or signs: by their role, since a frozen copy lets nobody draw. */
  mayResolve({ comments: [first] }: CommentThread): boolean {
    const role = this.network.network()?.role;
    if (role === undefined || !this.mayComment()) return false;
    return roleMay(role, 'draw') || roleMay(role, 'sign') || first?.personId === this.session.person()?.id;
  }

  ask(subject: CommentSubject): void {
    this.wanted.set({ subject, opened: false });
  }

  /** Its form has been opened: coming back to the element later does not open it again. */
  opened(): void {
    this.wanted.update((wanted) => (wanted === null ? null : { ...wanted, opened: true }));
  }

  askForNames(): void {
    const siteId = this.network.network()?.siteId ?? '';
    if (siteId === '' || siteId === this.namesOf) return;
    this.namesOf = siteId;
    this.api.names(siteId).subscribe({
      next: (people) => this.known.set(people),
      // without names nobody can be mentioned; the next one who writes asks again
      error: () => (this.namesOf = ''),
    });
  }

  /** @returns why it could not be added; null when it was */
  add(place: CommentPlace, body: string): Promise<Problem | null> {
    const mentions = mentioned(body, this.known()).map(({ id }) => id);
    return this.tried(this.api.add(this.network.networkId(), { ...given(place), body, mentions }));
  }

  resolve(threadId: string, resolved: boolean): Promise<Problem | null> {
    return this.tried(this.api.resolve(this.network.networkId(), threadId, resolved));
  }

  reload(): void {
    this.asked.update((count) => count + 1);
  }

  private async tried(request: Observable<unknown>): Promise<Problem | null> {
    try {
      await firstValueFrom(request);
      return null;
    } catch (error) {
      return toProblem(error);
    } finally {
      this.reload();
    }
  }
}

function given(place: CommentPlace) {
  if ('threadId' in place) return { threadId: place.threadId };
  const { subject, revisionId } = place;
  return { subject, ...(revisionId === undefined ? {} : { revisionId }) };
}
