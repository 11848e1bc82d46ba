import { badRequest } from '../platform/problem';

/** A device's clock may be ahead of the server's by this much. */
const MOST_AHEAD_MS = 5 * 60_000;
/** What waited longer on a device is older than its clock is to be trusted, or than anyone remembers. */
const MOST_DAYS = 30;

/**
 * A time that a device says, as stored.
 * @param where the key of the body that holds it
 * @throws ProblemError 400 in the future or long ago; the device still has what it sent, and can send it again
 */
export function deviceTime(said: string, where: string, now: Date): string {
  const at = new Date(said);
  const behindMs = now.getTime() - at.getTime();
  const pointer = `/${where}`;
  if (behindMs < -MOST_AHEAD_MS) {
    throw badRequest(
      `The time given, ${at.toISOString()}, is in the future: here it is ${now.toISOString()}. Nothing was stored. Set the device's clock right, put the time right and send it again.`,
      [{ pointer, detail: 'the device’s clock is ahead' }],
    );
  }
  if (behindMs > MOST_DAYS * 24 * 3_600_000) {
    throw badRequest(
      `The time given, ${at.toISOString()}, is over ${MOST_DAYS} days ago. Nothing was stored. If the device's clock was wrong, put the time right and send it again; if it was not, send it with the time of now and say in its note when it was.`,
      [{ pointer, detail: `at most ${MOST_DAYS} days ago` }],
    );
  }
  return at.toISOString();
}
