/** What a mail says, before it becomes text or HTML. All of it is plain text. */
export interface Letter {
  readonly subject: string;
  /** Of the person it goes to; absent for who has no account yet. */
  readonly name?: string;
  readonly paragraphs: readonly string[];
  /** Somebody's own words; their lines are kept. */
  readonly quote?: string;
  readonly facts: readonly Fact[];
  readonly action: { readonly label: string; readonly url: string };
  /** Whether it tells results, which the caution then goes with. */
  readonly tellsResults: boolean;
  /** Why the person gets it, and what to do about it. */
  readonly footing: string;
}

export interface Fact {
  readonly label: string;
  readonly value: string;
}

/** docs/cautions.md */
export const CAUTION =
  'Steam and hot condensate burn and kill; water hammer breaks pipes. The calculation does not replace local codes or a licensed engineer’s judgement, and nobody opens a line on its word.';
