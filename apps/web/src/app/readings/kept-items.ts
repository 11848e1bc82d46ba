import type { NewReading, NewRound, Problem, RoundClosing } from '@riseback/contracts';

/** A round as this device knows it. */
export interface KnownRound extends NewRound {
  readonly personId: string;
  readonly networkId: string;
  readonly closedAt?: string;
}

/** A reading as this device knows it, made here or told by the server. */
export type KnownReading = Omit<NewReading, 'deviceId' | 'deviceSeq'> & {
  readonly networkId: string;
  readonly roundId: string;
  /** Made here and not acknowledged yet. */
  readonly waiting: boolean;
  readonly personName?: string;
};

interface ItemBase {
  readonly personId: string;
  readonly networkId: string;
  readonly roundId: string;
  /** Why the server will not have it; it is left alone until the person says to try again. */
  readonly refused?: Problem;
}

/** What the server has yet to be told, in the order in which it happened. */
export type OutboxItem =
  | (ItemBase & { readonly kind: 'round'; readonly body: NewRound })
  | (ItemBase & { readonly kind: 'reading'; readonly body: NewReading })
  | (ItemBase & { readonly kind: 'closing'; readonly body: RoundClosing })
  | (ItemBase & {
      readonly kind: 'photo';
      readonly readingId: string;
      readonly photoId: string;
      readonly mediaType: string;
      readonly content: ArrayBuffer;
    });

export interface QueuedItem {
  /** Counts up in the order in which things were kept. */
  readonly place: number;
  readonly item: OutboxItem;
}
