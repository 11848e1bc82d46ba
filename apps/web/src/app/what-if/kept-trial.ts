import { inject, Injectable, DOCUMENT } from '@angular/core';
import * as z from 'zod';
import { Trial } from './trial';

/** With the version of the network that it was begun on, and when it was last worked on, ms since the epoch. */
const Kept = z.object({ trial: Trial, version: z.number(), at: z.number() });
export type Kept = z.infer<typeof Kept>;

/**
 * What is being tried, on this device only, so that a reload or a closed tab loses none of it. One per person and network: whichever
 * window tried last (docs/decisions/0110).
 */
@Injectable({ providedIn: 'root' })
export class KeptTrial {
  private readonly storage = inject(DOCUMENT).defaultView?.localStorage;

  /** False where the device's storage is full or not available. */
  put(personId: string, networkId: string, trial: Trial, version: number): boolean {
    const key = keyOf(personId, networkId);
    try {
      if (trial.steps.length === 0) this.storage?.removeItem(key);
      else this.storage?.setItem(key, JSON.stringify({ trial, version, at: Date.now() } satisfies Kept));
      return this.storage !== undefined;
    } catch {
      return false;
    }
  }

  /** Null where there is none, or one that an older program left in another form. */
  get(personId: string, networkId: string): Kept | null {
    try {
      const text = this.storage?.getItem(keyOf(personId, networkId)) ?? null;
      if (text === null) return null;
      const parsed = Kept.safeParse(JSON.parse(text));
      return parsed.success ? parsed.data : null;
    } catch {
      return null;
    }
  }
}

function keyOf(personId: string, networkId: string): string {
  return `riseback-tried/${personId}/${networkId}`;
}
