import { MOST_PASSWORD_BYTES, normalPassword, passwordBytes } from '@riseback/contracts';
import { compare, hash } from 'bcryptjs';
import { tooManyRequests } from '../problem';

/** Does the work that takes a third of a second of a processor. */
export interface Hasher {
  hash(text: string, cost: number): Promise<string>;
  matches(text: string, hash: string): Promise<boolean>;
}

/** In the thread that asks, in slices of 100 ms: for commands and tests, which nobody else waits for. */
export const HASHES_HERE: Hasher = { hash, matches: compare };

const COST = 12;
/** As many threads hash in the server. */
export const HASHES_AT_ONCE = 2;
/** About half a minute of waiting: more than people wait for. */
const LONGEST_QUEUE = 200;

/** A hash of no known password, at the same cost: comparing with it takes as long as with a real one. */
const NOBODYS_HASH = '$2b$12$1h2QML05PlPMhVNt1.9kJeTH1grGyOCmmO/OBTGdqlLCHBetW4dHa';

/** Hashes and compares passwords in their normal form, two at a time. `passwordMistake` says which may be chosen. */
export class Passwords {
  private running = 0;
  private readonly waiting: (() => void)[] = [];

  constructor(private readonly hasher: Hasher = HASHES_HERE) {}

  async hash(password: string): Promise<string> {
    return this.inTurn(() => this.hasher.hash(normalPassword(password), COST));
  }

  /** @param known the account's hash; without one (no such account) it answers no after the same work */
  async matches(password: string, known: string | undefined): Promise<boolean> {
    // bcrypt reads 72 bytes and drops the rest: a longer text would match the password that it begins with
    const usable = known !== undefined && passwordBytes(password) <= MOST_PASSWORD_BYTES;
    const text = normalPassword(password);
    const same = await this.inTurn(() => this.hasher.matches(text, usable ? known : NOBODYS_HASH));
    return usable && same;
  }

  private async inTurn<T>(work: () => Promise<T>): Promise<T> {
    if (this.waiting.length >= LONGEST_QUEUE)
      throw tooManyRequests('Too many people are signing in. Try again in a moment.', 10);
    if (this.running >= HASHES_AT_ONCE) await new Promise<void>((resolve) => this.waiting.push(resolve));
    else this.running += 1;
    try {
      return await work();
    } finally {
      // The place is handed on, not freed and retaken, so that a newcomer cannot slip in between.
      const next = this.waiting.shift();
      if (next === undefined) this.running -= 1;
      else next();
    }
  }
}
