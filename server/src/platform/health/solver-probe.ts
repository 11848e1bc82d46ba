/** How long an answer of the solver is believed. */
const FRESH_MS = 5_000;
/** /readyz answers within this time, with what was last known when the solver is busy. */
const PATIENCE_MS = 1_000;
/** Several solves at their own limit may stand before the probe's; beyond this it counts as dead. */
const LONGEST_MS = 60_000;

/** Asks the solver thread now and then for a small answer; many who ask at once share one probe. */
export class SolverProbe {
  private lastAnswer = true;
  private answeredAt = Number.NEGATIVE_INFINITY;
  private underWay: { readonly since: number; readonly done: Promise<void> } | undefined;

  /** @param ask whether a small solve comes back right */
  constructor(
    private readonly ask: () => Promise<boolean>,
    private readonly now: () => Date,
  ) {}

  async isAlive(): Promise<boolean> {
    const now = this.now().getTime();
    if (now - this.answeredAt < FRESH_MS) return this.lastAnswer;
    this.underWay ??= { since: now, done: this.probe() };
    if (now - this.underWay.since > LONGEST_MS) return false;
    await Promise.race([this.underWay.done, pause(PATIENCE_MS)]);
    return this.lastAnswer;
  }

  private async probe(): Promise<void> {
    try {
      this.lastAnswer = await this.ask();
    } catch {
      this.lastAnswer = false;
    } finally {
      this.answeredAt = this.now().getTime();
      this.underWay = undefined;
    }
  }
}

function pause(ms: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, ms).unref());
}
