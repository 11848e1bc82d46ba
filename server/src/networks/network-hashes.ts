import { createHash } from 'node:crypto';
import { solverInputText, type NetworkDocument } from '@riseback/network';

/** SHA-256 of what can change a number: results are stored under it, so moving a symbol makes nothing stale. */
export function solverHashOf(document: NetworkDocument): string {
  return createHash('sha256').update(solverInputText(document)).digest('hex');
}
