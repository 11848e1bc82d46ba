import type { RevisionSummary } from '@riseback/contracts';

/** Stands for the network as it is drawn now where a revision's id stands. */
export const WORKING = 'working';

/** The newest first. */
export function newestFirst(revisions: readonly RevisionSummary[]): readonly RevisionSummary[] {
  return [...revisions].sort((a, b) => b.createdAt.localeCompare(a.createdAt) || b.networkVersion - a.networkVersion);
}

/**
 * Which revision the page shows: the one that the address names, or the newest that is not withdrawn. Null while there is none at all.
 * @param revisions the newest first
 */
export function shownRevision(revisions: readonly RevisionSummary[], wanted: string | undefined): string | null {
  if (wanted === WORKING) return WORKING;
  if (revisions.some(({ id }) => id === wanted)) return wanted ?? null;
  return (revisions.find(({ state }) => state !== 'withdrawn') ?? revisions[0])?.id ?? null;
}

/**
 * What it is compared with: what the address names, or the last approved one before it, since that is what the plant was built by; where
 * none was approved, the one just before. Null for the first.
 * @param revisions the newest first
 */
export function comparedRevision(
  revisions: readonly RevisionSummary[],
  shown: string,
  wanted: string | undefined,
): string | null {
  const others = revisions.filter(({ id }) => id !== shown);
  if (wanted === WORKING && shown !== WORKING) return WORKING;
  if (others.some(({ id }) => id === wanted)) return wanted ?? null;
  const at = revisions.findIndex(({ id }) => id === shown);
  const earlier = revisions.slice(shown === WORKING ? 0 : at + 1).filter(({ state }) => state !== 'withdrawn');
  const approved = earlier.find(({ state }) => state === 'approved' || state === 'superseded');
  return (approved ?? earlier[0])?.id ?? null;
}
