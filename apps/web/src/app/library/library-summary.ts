import type { LibraryModel } from '@riseback/contracts';
import { TRAP_TYPES } from '@riseback/network';
import { TRAP_TYPE_WORDS } from '../shared/element-words';

export interface TypeRow {
  readonly words: string;
  readonly models: number;
  /** Of them, those that no capacity is known of. */
  readonly without: number;
}

/** How many models of each trap type are in use; types that the library does not have are left out. */
export function typeRows(models: readonly LibraryModel[]): TypeRow[] {
  const inUse = models.filter(({ retired }) => retired !== true);
  return [...TRAP_TYPES, undefined].flatMap((type) => {
    const ofType = inUse.filter(({ trapType }) => trapType === type);
    if (ofType.length === 0) return [];
    const without = ofType.filter(({ capacity }) => (capacity?.length ?? 0) === 0).length;
    return [{ words: type === undefined ? 'Type not given' : TRAP_TYPE_WORDS[type], models: ofType.length, without }];
  });
}

export function newestFirst(models: readonly LibraryModel[]): LibraryModel[] {
  return [...models].sort((a, b) => b.createdAt.localeCompare(a.createdAt));
}
