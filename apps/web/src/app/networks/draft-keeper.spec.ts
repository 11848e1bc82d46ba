import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { emptyDocument } from '@riseback/network';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { SessionStore } from '../session/session-store';
import { DraftKeeper } from './draft-keeper';
import { type Draft, type DraftKey, Drafts } from './drafts';
import { EditQueue } from './edit-queue';
import type { Unsaved } from './queue-state';
import { UndoStack } from './undo-stack';

const draft: Draft = {
  networkId: 'n1',
  base: emptyDocument('Trial'),
  version: 1,
  pending: [{ batchId: 'b1', label: 'left behind', ops: [] }],
  conflicts: [],
  undo: [],
  at: 0,
};

describe('DraftKeeper', () => {
  const stored = new Map<string, Draft>();
  const unsaved = signal<Unsaved | null>(null);
  const bringIn = vi.fn(() => Promise.resolve());
  let keeper: DraftKeeper;

  beforeEach(async () => {
    stored.clear();
    unsaved.set(null);
    bringIn.mockClear();
    vi.stubGlobal('navigator', { locks: { request: (_name: string, act: () => Promise<void>) => act() } });
    const drafts: Pick<Drafts, 'put' | 'remove' | 'has' | 'leftBehind'> = {
      put: (key, value) => Promise.resolve(void stored.set(key.join(), value)),
      remove: (key) => Promise.resolve(void stored.delete(key.join())),
      has: (key) => Promise.resolve(stored.has(key.join())),
      leftBehind: () =>
        Promise.resolve(
          [...stored].map(([key, value]) => ({ key: key.split(',') as unknown as DraftKey, draft: value })),
        ),
    };
    TestBed.configureTestingModule({
      providers: [
        DraftKeeper,
        UndoStack,
        { provide: Drafts, useValue: drafts },
        { provide: EditQueue, useValue: { unsaved, bringIn } },
        { provide: SessionStore, useValue: { person: signal({ id: 'p1' }) } },
      ],
    });
    stored.set('p1,n1,t1', draft);
    keeper = TestBed.inject(DraftKeeper);
    keeper.open('n1');
    await vi.waitFor(() => expect(keeper.offered()).toHaveLength(1));
  });

  afterEach(() => {
    vi.unstubAllGlobals();
  });

  const offer = () => {
    const [first] = keeper.offered();
    if (first === undefined) throw new Error('nothing is offered');
    return first;
  };

  it('brings a draft in once, however often it is asked to', async () => {
    const one = offer();
    await Promise.all([keeper.bringIn(one), keeper.bringIn(one)]);
    expect(bringIn).toHaveBeenCalledTimes(1);
    expect(keeper.offered()).toEqual([]);
    expect(stored.size).toBe(0);
  });

  it('does not bring in what another window has brought in meanwhile', async () => {
    stored.clear();
    await keeper.bringIn(offer());
    expect(bringIn).not.toHaveBeenCalled();
    expect(keeper.offered()).toEqual([]);
  });

  it('keeps what could not be brought in, and says so', async () => {
    bringIn.mockRejectedValueOnce(new Error('no answer'));
    await keeper.bringIn(offer());
    expect(keeper.offered()).toHaveLength(1);
    expect(keeper.problem()).toContain('stays where it is');
  });

  it('writes unsaved work within 300 ms, and at once when the tab ends', async () => {
    stored.clear();
    unsaved.set(draft);
    TestBed.tick();
    await vi.waitFor(() => expect(stored.size).toBe(1), { timeout: 300, interval: 5 });
    stored.clear();
    keeper.flush();
    await Promise.resolve();
    expect(stored.size).toBe(1);
    unsaved.set(null);
    TestBed.tick();
    await vi.waitFor(() => expect(stored.size).toBe(0));
  });
});
