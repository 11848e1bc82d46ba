import { SavedLibraryModel } from '@riseback/contracts';
import { type CapacityPoint, mistakesOf } from '@riseback/network';
import type { ModelContent } from './model-facts';

/** A model while it is edited: its rows of capacity stand apart until they are read. */
export type ModelDraft = Partial<Omit<ModelContent, 'capacity' | 'retired'>>;

export interface DraftVerdict {
  readonly saved: SavedLibraryModel | null;
  /** Why not, by key. */
  readonly refusals: ReadonlyMap<string, string>;
}

export function draftOf({ capacity: _c, retired: _r, ...draft }: ModelContent): ModelDraft {
  return draft;
}

/** The draft with its points as the contract wants it; a model that is edited comes into use again. */
export function judgeDraft(draft: ModelDraft, points: readonly CapacityPoint[]): DraftVerdict {
  const wanted = {
    ...Object.fromEntries(Object.entries(draft).filter(([, value]) => value !== undefined)),
    ...(points.length === 0 ? {} : { capacity: points }),
  };
  const read = SavedLibraryModel.safeParse(wanted);
  if (read.success) return { saved: read.data, refusals: new Map() };
  const refusals = mistakesOf(read.error, wanted).map(
    ({ pointer, detail }) => [pointer.split('/')[1] ?? '', detail] as const,
  );
  const missingName = draft.name === undefined || draft.name.trim() === '';
  return {
    saved: null,
    refusals: new Map([...refusals, ...(missingName ? [['name', 'Give the model a name.'] as const] : [])]),
  };
}
