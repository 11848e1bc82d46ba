import { FileTrapModel, TRAP_TYPES } from '@riseback/network';
import * as z from 'zod';

/** What a trap model is, the same in a network file and in the library, but for the id. */
const { id: _fileId, ...modelShape } = FileTrapModel.shape;

const savedShape = {
  ...modelShape,
  trapType: z.enum(TRAP_TYPES).optional(),
  /** No longer to be chosen for a trap; what was chosen before keeps it. */
  retired: z.literal(true).optional(),
};

/**
 * Body of POST /api/sites/:siteId/library and, with `If-Match: "<version>"`, of PUT …/library/:modelId: the whole model. A save that
 * changes something makes the next version; earlier ones stay as they are.
 */
export const SavedLibraryModel = z.strictObject(savedShape);
export type SavedLibraryModel = z.infer<typeof SavedLibraryModel>;

/** One version of a model of a site's library. */
export const LibraryModel = z.object({
  ...savedShape,
  id: z.string(),
  version: z.number().int(),
  createdBy: z.string(),
  createdAt: z.iso.datetime(),
});
export type LibraryModel = z.infer<typeof LibraryModel>;

/** The members that problem type /problems/stale-version adds where a library model is saved. */
export const StaleLibraryModel = z.object({ currentVersion: z.number().int(), current: LibraryModel });
export type StaleLibraryModel = z.infer<typeof StaleLibraryModel>;
