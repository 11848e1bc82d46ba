import { compare, hash } from 'bcryptjs';
import { tooManyRequests } from '../problem';

const COST = 12;
/** Each takes about 0.4 s of the one thread that also answers everybody else. */
const HASHES_AT_ONCE = 2;
/** About a minute of waiting: more than people wait for. */
const LONGEST_QUEUE = 200;
/** bcrypt reads 72 bytes and drops the rest without a word. */
const MOST_BYTES = 72;
const FEWEST_BYTES = 12;

/** A hash of no known password, at the same cost: comparing with it takes as long as with a real one. */
const NOBODYS_HASH = '$2b$12$1h2QML05PlPMhVNt1.9kJeTH1grGyOCmmO/OBTGdqlLCHBetW4dHa';

/** What people pick when they must fill twelve characters. */
const TOO_COMMON = [
  '123456789012',
  '1234567890123',
  'password1234',
  'passwordpassword',
  'qwertyuiop12',
  'qwertyqwerty',
  'administrator',
  'letmeinletmein',
  'iloveyou1234',
  'changeme1234',
  'welcome12345',
  'abcdefghijkl',
  'abc123abc123',
  'steamsteamsteam',
  'condensate123',
];

/** Hashes and compares, two at a time. */
export class Passwords {
  private running = 0;
  private readonly waiting: (() => void)[] = [];

  async hash(password: string): Promise<string> {
    return this.inTurn(() => hash(password, COST));
  }

  /** @param known the account's hash; without one (no such account) it answers no after the same work */
  async matches(password: string, known: string | undefined): Promise<boolean> {
    const usable = known !== undefined && Buffer.byteLength(password) <= MOST_BYTES;
    const same = await this.inTurn(() => compare(password, usable ? known : NOBODYS_HASH));
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

/** Why a new password is refused, or undefined when it is good. No rules of composition: length is what counts. */
export function passwordMistake(password: string, personal: readonly string[]): string | undefined {
  const bytes = Buffer.byteLength(password);
  if (bytes < FEWEST_BYTES)
    return `The password needs at least ${String(FEWEST_BYTES)} characters; a few words do well.`;
  if (bytes > MOST_BYTES) return `The password may hold ${String(MOST_BYTES)} bytes at most.`;
  const lower = password.toLowerCase();
  if (TOO_COMMON.includes(lower) || new Set(lower).size < 5)
    return 'That password is among the first that others would try.';
  if (personal.some((word) => word.length > 3 && lower.includes(word.toLowerCase()))) {
    return 'The password must not contain your name or your e-mail address.';
  }
  return undefined;
}
