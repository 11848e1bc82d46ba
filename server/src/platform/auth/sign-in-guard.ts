import { createHash } from 'node:crypto';
import { ipKeyGenerator } from 'express-rate-limit';
import { tooManyRequests } from '../problem';

/** Slips of the finger cost nothing. */
const FREE_FAILURES = 5;
const FIRST_WAIT_MS = 2_000;
const LONGEST_WAIT_MS = 15 * 60_000;
const FORGOTTEN_AFTER_MS = 60 * 60_000;
/** Failures from one address over all accounts in an hour, against one password tried on many accounts. */
const FREE_FAILURES_OF_ADDRESS = 50;
/** Wrong one-time codes for one account from everywhere: only who has its password comes this far. */
const FREE_WRONG_CODES = 20;
const MOST_KEYS = 100_000;

interface Failures {
  count: number;
  lastAt: number;
  /** Whether somebody was turned away in this wait already. */
  turnedAway: boolean;
}

/** Whose account is tried, and from where. */
export interface Trial {
  readonly email: string;
  readonly address: string;
}

/** `unfinished` is neither right nor wrong, such as a right password that a code must still follow. */
export interface Attempt {
  readonly outcome: 'passed' | 'failed' | 'unfinished';
}

/**
 * Slows guessing down: after some failures for one account from one address each further one doubles the wait. Counted
 * per account and address, so that a stranger's guesses never lock the owner out of another device.
 */
export class SignInGuard {
  private readonly failures = new Map<string, Failures>();
  private readonly turns = new Map<string, Promise<void>>();

  constructor(private readonly now: () => Date) {}

  /**
   * Runs one attempt. Those from one address go one after the other: a thousand sent at once would all pass before the
   * first failure counts, and would all stand before everybody else in the queue of hashes.
   * @param turnedAway told of the first attempt that is turned away in each wait
   * @throws ProblemError 429 while waiting is due; the password is then not even looked at
   */
  async guard<T extends Attempt>(
    { email, address }: Trial,
    attempt: () => Promise<T>,
    turnedAway: () => void,
  ): Promise<T> {
    const from = ipKeyGenerator(address);
    const key = keyOf('account', `${email.trim().toLowerCase()}\n${from}`);
    return this.inTurn(from, async () => {
      this.demandPatience(key, FREE_FAILURES, turnedAway);
      this.demandPatience(from, FREE_FAILURES_OF_ADDRESS, turnedAway);
      const result = await attempt();
      if (result.outcome === 'passed') this.failures.delete(key);
      if (result.outcome === 'failed') {
        this.count(key);
        this.count(from);
      }
      return result;
    });
  }

  /**
   * Runs one trial of a one-time code, within `guard`. A million codes are few enough to be guessed from many addresses,
   * so that these failures count for the account as a whole; recovery codes are too long for that and stay open.
   * @throws ProblemError 429 while waiting is due; the code is then not even looked at
   */
  guardCode(personId: string, isRight: () => boolean, turnedAway: () => void): boolean {
    const key = keyOf('code', personId);
    this.demandPatience(key, FREE_WRONG_CODES, turnedAway);
    const right = isRight();
    if (right) this.failures.delete(key);
    else this.count(key);
    return right;
  }

  private demandPatience(key: string, free: number, turnedAway: () => void): void {
    const failures = this.current(key);
    if (failures === undefined || failures.count < free) return;
    const wait = Math.min(FIRST_WAIT_MS * 2 ** (failures.count - free), LONGEST_WAIT_MS);
    const leftMs = failures.lastAt + wait - this.now().getTime();
    if (leftMs <= 0) return;
    if (!failures.turnedAway) turnedAway();
    failures.turnedAway = true;
    throw tooManyRequests('Too many failed attempts. Wait a little, then try again.', leftMs / 1000);
  }

  private count(key: string): void {
    const count = (this.current(key)?.count ?? 0) + 1;
    this.failures.delete(key);
    this.failures.set(key, { count, lastAt: this.now().getTime(), turnedAway: false });
    // The oldest go first: a flood of invented accounts must not eat the memory.
    const oldest = this.failures.size > MOST_KEYS ? this.failures.keys().next().value : undefined;
    if (oldest !== undefined) this.failures.delete(oldest);
  }

  private current(key: string): Failures | undefined {
    const failures = this.failures.get(key);
    if (failures === undefined || this.now().getTime() - failures.lastAt < FORGOTTEN_AFTER_MS) return failures;
    this.failures.delete(key);
    return undefined;
  }

  private async inTurn<T>(key: string, work: () => Promise<T>): Promise<T> {
    const before = this.turns.get(key) ?? Promise.resolve();
    const mine = before.then(work);
    const settled = mine.then(
      () => undefined,
      () => undefined,
    );
    this.turns.set(key, settled);
    try {
      return await mine;
    } finally {
      if (this.turns.get(key) === settled) this.turns.delete(key);
    }
  }
}

/** Hashed, so that what somebody typed as an address is not kept in memory for an hour. */
function keyOf(kind: string, text: string): string {
  return createHash('sha256').update(`${kind}\n${text}`).digest('base64');
}
