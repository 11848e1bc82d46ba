import type { CaseOutcome } from '@riseback/contracts';
import type { NetworkFile } from '@riseback/network';

/** One of the two that are compared: a frozen revision, or the network as it is now. */
export interface RevisionSide {
  /** Its letter, or Working. */
  readonly label: string;
  readonly file: NetworkFile;
  readonly results: readonly CaseOutcome[];
}
