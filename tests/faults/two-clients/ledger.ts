import { applyBatch, type EditOp, type NetworkDocument } from '@riseback/network';
import type { Unsaved } from '../../../apps/web/src/app/networks/queue-state';
import type { Tab } from './tab';

/**
 * Work that is younger than this when its tab crashes may be lost: "at most the last second". A draft is due after 300 ms, which
 * tests/browser/drafts.spec.ts measures; here a busy machine may take longer.
 */
export const DRAFT_WITHIN_MS = 1_000;

const OFFER = 'an offer';

/** Where each typed value stands. */
type Screen = ReadonlyMap<number, string>;

/**
 * Keeps account of every value that was typed, each of its own kind, so that none is dropped: at any time it is on its tab's
 * screen (in the document, in an open conflict, among what was refused or is offered), or its person has taken it back, or it was
 * saved, which `owed` is checked against in the end.
 */
export class Ledger {
  /** Values that left a screen without their person's doing: they must be among what the server has saved. */
  readonly owed = new Map<number, string>();
  /** Lost with a tab that crashed before its draft was due. */
  readonly excused = new Set<number>();
  private count = 0;
  /** When its person last put it on a screen. */
  private readonly typedAt = new Map<number, number>();
  private readonly onScreen = new Map<Tab, Screen>();
  /** Who brought it in, or gave it up. */
  private readonly takers = new Map<number, Tab>();
  /** Where each value went, for who has to find out why one was dropped. */
  private readonly trails = new Map<number, string[]>();

  /** A value that nobody has typed before; its whole part is between 1 and 5. */
  freshValue(whole: number): number {
    this.count += 1;
    const value = whole + this.count / 65_536;
    this.typedAt.set(value, Date.now());
    return value;
  }

  get typed(): number {
    return this.count;
  }

  trailOf(value: number): readonly string[] {
    return this.trails.get(value) ?? [];
  }

  /** What a person does: what leaves the screen by it was taken away by them. */
  deed(tab: Tab, what: string, act: () => void): void {
    this.look(tab, `before ${what}`);
    act();
    const before = this.onScreen.get(tab);
    const after = this.screenOf(tab);
    for (const value of after.keys()) if (before?.has(value) !== true) this.typedAt.set(value, Date.now());
    this.show(tab, after, what);
  }

  /** Whatever happened since the last look was not this person's doing. */
  look(tab: Tab, meanwhile = ''): void {
    const after = this.screenOf(tab);
    for (const [value, where] of this.onScreen.get(tab) ?? []) {
      if (after.has(value) || (where === OFFER && this.takenBy(tab, value))) continue;
      this.owed.set(value, `left ${where} ${meanwhile}`);
    }
    this.show(tab, after, meanwhile);
  }

  /** What has left the screen since the last look, its person has given up, also where another tab still offers it. */
  givenUp(tab: Tab): void {
    const after = this.screenOf(tab);
    for (const value of this.onScreen.get(tab)?.keys() ?? []) if (!after.has(value)) this.takers.set(value, tab);
    this.show(tab, after, 'given up');
  }

  /** A tab has crashed and another one is open in its place. */
  crashed(tab: Tab, next: Tab, at: number): void {
    const after = this.screenOf(next);
    for (const [value, where] of this.onScreen.get(tab) ?? []) {
      if (after.has(value) || (where === OFFER && this.takenBy(tab, value))) continue;
      if (at - (this.typedAt.get(value) ?? 0) < DRAFT_WITHIN_MS) this.excused.add(value);
      else this.owed.set(value, `was in ${where} of a tab that crashed`);
    }
    this.show(tab, new Map(), 'closed');
    this.onScreen.delete(tab);
    this.show(next, after, 'opened');
  }

  /** What two tabs of a person offer goes into one of them, and from then on is that one's to hold. */
  private takenBy(tab: Tab, value: number): boolean {
    const taker = this.takers.get(value);
    return taker !== undefined && taker !== tab;
  }

  private show(tab: Tab, after: Screen, how: string): void {
    const before = this.onScreen.get(tab);
    for (const value of new Set([...(before?.keys() ?? []), ...after.keys()])) {
      const [from = 'nowhere', to = 'nowhere'] = [before?.get(value), after.get(value)];
      if (from === to) continue;
      if (from === OFFER && to !== 'nowhere') this.takers.set(value, tab);
      this.trails.set(value, [...this.trailOf(value), `${tab.person.name} at ${Date.now()}, ${how}: ${from} to ${to}`]);
    }
    this.onScreen.set(tab, after);
  }

  private screenOf({ store, keeper, queue }: Tab): Screen {
    const found = new Map<number, string>();
    const collect = (where: string, held: unknown): void => {
      if (typeof held === 'number' && this.typedAt.has(held)) found.set(held, where);
      else if (held instanceof Map) for (const value of held.values()) collect(where, value);
      else if (typeof held === 'object' && held !== null)
        for (const value of Object.values(held)) collect(where, value);
    };
    for (const { draft } of keeper.offered()) {
      collect(OFFER, [shownBy(draft), draft.conflicts.map(({ mine, whole }) => [mine, whole])]);
    }
    for (const { batch } of queue.refused()) collect('what was refused', batch.ops);
    for (const { place, mine, whole } of store.conflicts())
      collect(`the choice at ${JSON.stringify(place)}`, [mine, whole]);
    const document = store.document();
    for (const [key, part] of Object.entries(document ?? {})) {
      if (!(part instanceof Map)) collect(key, part);
      else for (const [id, element] of part as Map<string, unknown>) collect(`${key} ${id}`, element);
    }
    return found;
  }
}

/** What its tab showed. */
function shownBy({ base, pending }: Unsaved): NetworkDocument {
  return pending.reduce((document, { ops }) => {
    const applied = applyBatch(document, ops);
    if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
    return applied.document;
  }, base);
}

/** Every number that saved batches put into the document. */
export function numbersSaved(ops: readonly EditOp[]): Set<number> {
  const found = new Set<number>();
  const collect = (held: unknown): void => {
    if (typeof held === 'number') found.add(held);
    else if (typeof held === 'object' && held !== null) for (const value of Object.values(held)) collect(value);
  };
  for (const op of ops) collect(op.op === 'add' ? op.value : op.op === 'set' ? op.to : undefined);
  return found;
}
