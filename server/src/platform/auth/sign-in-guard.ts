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
const MOST_KEYS = 100_000;

interface Failures {
  count: number;
  lastAt: number;
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
   * Runs one attempt. Those for the same account from the same address go one after the other, or a thousand sent at
   * once would all pass before the first failure counts.
   * @returns what `attempt` returned; undefined counts as a failure
   * @throws ProblemError 429 while waiting is due; the password is then not even looked at
   */
  async guard<T>(email: string, address: string, attempt: () => Promise<T | undefined>): Promise<T | undefined> {
    const from = ipKeyGenerator(address);
    const key = createHash('sha256').update(`${email.trim().toLowerCase()}\n${from}`).digest('base64');
    return this.inTurn(key, async () => {
      this.demandPatience(key, FREE_FAILURES);
      this.demandPatience(from, FREE_FAILURES_OF_ADDRESS);
      const result = await attempt();
      if (result === undefined) {
        this.count(key);
        this.count(from);
      } else {
        this.failures.delete(key);
      }
      return result;
    });
  }

  private demandPatience(key: string, free: number): void {
    const failures = this.current(key);
    if (failures === undefined || failures.count < free) return;
    const wait = Math.min(FIRST_WAIT_MS * 2 ** (failures.count - free), LONGEST_WAIT_MS);
    const leftMs = failures.lastAt + wait - this.now().getTime();
    if (leftMs > 0)
      throw tooManyRequests('Too many failed attempts to sign in. Wait a little, then try again.', leftMs / 1000);
  }

  private count(key: string): void {
    const count = (this.current(key)?.count ?? 0) + 1;
    this.failures.delete(key);
    this.failures.set(key, { count, lastAt: this.now().getTime() });
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
