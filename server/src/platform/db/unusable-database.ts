/** The database cannot be used as it is; the message says why and what to do. It stops the start. */
export class UnusableDatabaseError extends Error {
  override readonly name = 'UnusableDatabaseError';
}
