import { ProblemError } from '../problem';

interface Piece {
  readonly work: () => unknown;
  readonly resolve: (result: unknown) => void;
  readonly reject: (error: unknown) => void;
}

/** A transaction, or within one a savepoint. */
export type RunTransaction = <T>(work: () => T) => T;

/**
 * Pieces of work that arrive together are committed together: each in a savepoint of its own, all in one transaction, so
 * that they wait for the disk once and not one after the other. Nobody is answered before that commit.
 */
export class SharedCommit {
  private waiting: Piece[] = [];

  /** @param undone told when nothing of a transaction was kept, so that nobody remembers what was read in it */
  constructor(
    private readonly transaction: RunTransaction,
    private readonly undone: () => void,
  ) {}

  /** @returns what the work returned, once it is committed; what it threw, its own changes undone, or why the commit failed */
  run<T>(work: () => T): Promise<T> {
    return new Promise<T>((resolve, reject) => {
      this.waiting.push({ work, resolve: resolve as (result: unknown) => void, reject });
      // after all requests that the network brought in this turn
      if (this.waiting.length === 1) setImmediate(() => this.commit());
    });
  }

  private commit(): void {
    const pieces = this.waiting;
    this.waiting = [];
    const settle: (() => void)[] = [];
    try {
      this.transaction(() => {
        for (const { work, resolve, reject } of pieces) {
          try {
            const result = this.transaction(work);
            settle.push(() => resolve(result));
          } catch (error) {
            // a refusal undoes its own piece; a fault, such as a full disk, may have ended the transaction from within
            if (!(error instanceof ProblemError)) throw error;
            settle.push(() => reject(error));
          }
        }
      });
    } catch (error) {
      this.undone();
      for (const { reject } of pieces) reject(error);
      return;
    }
    for (const tell of settle) tell();
  }
}
