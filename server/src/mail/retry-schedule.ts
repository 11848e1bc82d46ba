const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
const FIRST_WAIT_MS = MINUTE_MS;
const LONGEST_WAIT_MS = 6 * HOUR_MS;
const PATIENCE_MS = 72 * HOUR_MS;
/** Even of a mail that had waited for days before there was a mail server to try. */
const FEWEST_TRIES = 5;
/** So that mails that failed together do not all come back together. */
const JITTER = 0.25;

/**
 * When to try again after a failure: a minute, doubling to six hours.
 * @param failures how often it failed by now, 1 at least
 * @param random from 0 to 1
 * @returns undefined when it is to be given up, after three days
 */
export function nextTry(failures: number, createdAt: Date, now: Date, random: number): Date | undefined {
  const wait = Math.min(FIRST_WAIT_MS * 2 ** (failures - 1), LONGEST_WAIT_MS) * (1 + JITTER * random);
  const next = new Date(now.getTime() + Math.round(wait));
  const tooLate = next.getTime() - createdAt.getTime() > PATIENCE_MS;
  return tooLate && failures >= FEWEST_TRIES ? undefined : next;
}
