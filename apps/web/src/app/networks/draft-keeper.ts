import { DestroyRef, effect, inject, Injectable, signal, untracked } from '@angular/core';
import { SessionStore } from '../session/session-store';
import { type Draft, type DraftKey, Drafts, holdTabLock } from './drafts';
import { EditQueue } from './edit-queue';
import { UndoStack } from './undo-stack';

/** Well within the 300 ms after which work must be on the device; work that is saved sooner never gets there. */
const WRITE_AFTER_MS = 150;

export interface OfferedDraft {
  readonly key: DraftKey;
  readonly draft: Draft;
}

/** Keeps unsaved work on the device, and offers what an earlier tab left there. In the network page's `providers`. */
@Injectable()
export class DraftKeeper {
  private readonly drafts = inject(Drafts);
  private readonly queue = inject(EditQueue);
  private readonly undoStack = inject(UndoStack);
  private readonly session = inject(SessionStore);

  private readonly offers = signal<readonly OfferedDraft[]>([]);
  private readonly trouble = signal('');
  private readonly underWay = new Set<OfferedDraft>();
  private key: DraftKey | null = null;
  private release: () => void = () => undefined;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private stored = false;
  /** Writes and removals one after the other, in the order in which they were asked for. */
  private last: Promise<void> = Promise.resolve();

  /** Unsaved work of tabs that have gone. */
  readonly offered = this.offers.asReadonly();
  /** Why drafts cannot be kept or brought in; '' when they can. */
  readonly problem = this.trouble.asReadonly();

  constructor() {
    effect(() => {
      const unsaved = this.queue.unsaved();
      untracked(() => {
        if (unsaved === null) this.forget();
        else this.timer ??= setTimeout(() => this.write(), WRITE_AFTER_MS);
      });
    });
    inject(DestroyRef).onDestroy(() => {
      this.flush();
      void this.last.then(this.release);
    });
  }

  /** From now on the unsaved work on this network is kept, and what was left behind is offered. */
  open(networkId: string): void {
    this.flush();
    void this.last.then(this.release);
    const personId = this.session.person()?.id;
    this.offers.set([]);
    this.stored = false;
    this.key = null;
    if (personId === undefined) return;
    const tabId = crypto.randomUUID();
    this.release = holdTabLock(tabId);
    this.key = [personId, networkId, tabId];
    this.drafts.leftBehind(personId, networkId).then(
      (offers) => {
        if (this.key?.[1] === networkId) this.offers.set(offers);
      },
      () => this.trouble.set('Unsaved work cannot be kept on this device: its storage is not available.'),
    );
  }

  /** Writes at once: the tab may be about to end. */
  flush(): void {
    if (this.queue.unsaved() !== null) this.write();
  }

  /** Once and in one tab only: what is brought in twice would add everything twice. */
  async bringIn(offer: OfferedDraft): Promise<void> {
    if (this.underWay.has(offer)) return;
    this.underWay.add(offer);
    await this.bringInOnce(offer);
    this.underWay.delete(offer);
  }

  async leaveOut(offer: OfferedDraft): Promise<void> {
    await this.drafts.remove(offer.key);
    this.offers.update((offers) => offers.filter((other) => other !== offer));
  }

  private async bringInOnce(offer: OfferedDraft): Promise<void> {
    try {
      if (await this.drafts.has(offer.key)) await this.queue.bringIn(offer.draft, offer.draft.undo);
    } catch {
      this.trouble.set('The server cannot be reached, so the unsaved work stays where it is. Try again later.');
      return;
    }
    this.trouble.set('');
    // under this tab's own name first: at no moment is the work in neither place
    this.write();
    await this.last;
    await this.leaveOut(offer);
  }

  private write(): void {
    clearTimeout(this.timer);
    this.timer = undefined;
    const unsaved = this.queue.unsaved();
    const { key } = this;
    if (unsaved === null || unsaved.networkId !== key?.[1]) return;
    this.stored = true;
    const draft: Draft = { ...unsaved, undo: this.undoStack.steps(), at: Date.now() };
    this.inTurn(() => this.drafts.put(key, draft));
  }

  private forget(): void {
    clearTimeout(this.timer);
    this.timer = undefined;
    const { key } = this;
    if (!this.stored || key === null) return;
    this.stored = false;
    this.inTurn(() => this.drafts.remove(key));
  }

  private inTurn(act: () => Promise<void>): void {
    this.last = this.last.then(act).catch(() => {
      this.trouble.set('Unsaved work cannot be kept on this device: its storage is full or not available.');
    });
  }
}
