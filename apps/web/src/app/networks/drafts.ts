import { Injectable } from '@angular/core';
import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { Unsaved } from './queue-state';
import type { UndoStep } from './undo-stack';

/** Whose work it is, on which network, in which tab. */
export type DraftKey = readonly [personId: string, networkId: string, tabId: string];

/** Work that the server has not acknowledged, as it lies on the device. */
export interface Draft extends Unsaved {
  readonly undo: readonly UndoStep[];
  /** When it was last worked on, ms since the epoch. */
  readonly at: number;
}

interface DraftDb extends DBSchema {
  drafts: { key: [string, string, string]; value: Draft };
}

const NAME = 'riseback-drafts';

/** Drafts in the browser's own database; and whether the tab that made one still lives, which its lock says. */
@Injectable({ providedIn: 'root' })
export class Drafts {
  private opened: Promise<IDBPDatabase<DraftDb>> | undefined;

  async put(key: DraftKey, draft: Draft): Promise<void> {
    await (await this.database()).put('drafts', draft, [...key]);
  }

  async remove(key: DraftKey): Promise<void> {
    await (await this.database()).delete('drafts', [...key]);
  }

  /** Whether it is still there: another tab may have brought it in. */
  async has(key: DraftKey): Promise<boolean> {
    return (await (await this.database()).getKey('drafts', [...key])) !== undefined;
  }

  /** Drafts of a person on a network whose tabs have gone, the oldest first. */
  async leftBehind(personId: string, networkId: string): Promise<{ readonly key: DraftKey; readonly draft: Draft }[]> {
    const database = await this.database();
    // an array sorts behind every text, so this takes in every tab
    const range = IDBKeyRange.bound([personId, networkId], [personId, networkId, []]);
    const [keys, values, alive] = await Promise.all([
      database.getAllKeys('drafts', range),
      database.getAll('drafts', range),
      heldLocks(),
    ]);
    return keys
      .flatMap((key, index) => {
        const draft = values[index];
        return draft === undefined || alive.has(lockName(key[2])) ? [] : [{ key, draft }];
      })
      .sort((a, b) => a.draft.at - b.draft.at);
  }

  /** On how many networks a person's work lies on this device. */
  async networksOf(personId: string): Promise<number> {
    const keys = await (await this.database()).getAllKeys('drafts', rangeOf(personId));
    return new Set(keys.map(([, networkId]) => networkId)).size;
  }

  async removeAllOf(personId: string): Promise<void> {
    await (await this.database()).delete('drafts', rangeOf(personId));
  }

  private database(): Promise<IDBPDatabase<DraftDb>> {
    this.opened ??= openDB<DraftDb>(NAME, 1, {
      upgrade: (database) => {
        database.createObjectStore('drafts');
      },
    });
    return this.opened;
  }
}

/** All networks and tabs: an array sorts behind every text. */
function rangeOf(personId: string): IDBKeyRange {
  return IDBKeyRange.bound([personId], [personId, []]);
}

/** Holds the lock that says that this tab lives; the browser lets go of it when the tab ends, however it ends. */
export function holdTabLock(tabId: string): () => void {
  let release: () => void = () => undefined;
  const held = new Promise<void>((resolve) => {
    release = resolve;
  });
  void navigator.locks.request(lockName(tabId), () => held);
  return release;
}

function lockName(tabId: string): string {
  return `riseback-tab-${tabId}`;
}

async function heldLocks(): Promise<Set<string>> {
  const { held } = await navigator.locks.query();
  return new Set((held ?? []).flatMap(({ name }) => name ?? []));
}
