import type { LibraryModel, SavedLibraryModel, StaleLibraryModel } from '@riseback/contracts';
import { jsonEqual } from '@riseback/network';
import type { SiteAccess } from '../platform/auth/access';
import { conflict, notFound, staleVersion } from '../platform/problem';
import type { LibraryRepository } from './library-repository';

/** Who saves: a person behind a request, or the demo. */
interface Saver {
  readonly id: string;
  readonly sessionId?: string;
}

/** The trap models of a site. Saving never changes a version: it makes the next one. */
export class LibraryService {
  constructor(
    private readonly models: LibraryRepository,
    private readonly newId: () => string,
    private readonly now: () => Date,
  ) {}

  /** Each model in its newest version, by name. */
  list(access: SiteAccess): LibraryModel[] {
    return this.models.newest(access.siteId);
  }

  /** @throws ProblemError 404 no such model at this site */
  get(access: SiteAccess, modelId: string): LibraryModel {
    const model = this.models.newestOf(access.siteId, modelId);
    if (model === undefined) throw noSuchModel();
    return model;
  }

  /** The newest first. @throws ProblemError 404 no such model at this site */
  versions(access: SiteAccess, modelId: string): LibraryModel[] {
    const versions = this.models.versions(access.siteId, modelId);
    if (versions.length === 0) throw noSuchModel();
    return versions;
  }

  /** @throws ProblemError 409 a model that is not retired has the name already */
  add(access: SiteAccess, saved: SavedLibraryModel): LibraryModel {
    return this.addFor(access.siteId, access.person, saved);
  }

  /** As `add`, without a request behind it (the demo). */
  addFor(siteId: string, by: Saver, saved: SavedLibraryModel): LibraryModel {
    return this.models.transaction((models) => this.store(models, siteId, by, this.newId(), 1, saved, 'library.add'));
  }

  /**
   * Saves the whole model as its next version. Nothing different is nothing to save: then the present version is the answer.
   * @throws ProblemError 404 no such model; 412 not made on the newest version, with that version; 409 the name is taken
   */
  save(access: SiteAccess, modelId: string, onVersion: number, saved: SavedLibraryModel): LibraryModel {
    const { siteId, person } = access;
    return this.models.transaction((models) => {
      const current = models.newestOf(siteId, modelId);
      if (current === undefined) throw noSuchModel();
      if (current.version !== onVersion) throw stale(current, onVersion);
      const before = contentOf(current);
      if (jsonEqual(before, saved)) return current;
      return this.store(models, siteId, person, modelId, current.version + 1, saved, actionOf(before, saved));
    });
  }

  /** As `save`, without a request behind it (the demo). */
  saveFor(siteId: string, by: Saver, modelId: string, onVersion: number, saved: SavedLibraryModel): LibraryModel {
    return this.models.transaction((models) => {
      const current = models.newestOf(siteId, modelId);
      if (current === undefined) throw noSuchModel();
      if (current.version !== onVersion) throw stale(current, onVersion);
      const before = contentOf(current);
      if (jsonEqual(before, saved)) return current;
      return this.store(models, siteId, by, modelId, current.version + 1, saved, actionOf(before, saved));
    });
  }

  private store(
    models: LibraryRepository,
    siteId: string,
    by: Saver,
    modelId: string,
    version: number,
    saved: SavedLibraryModel,
    action: string,
  ): LibraryModel {
    refuseTakenName(models.newest(siteId), modelId, saved);
    const at = this.now();
    models.insert(siteId, {
      ...saved,
      id: modelId,
      version,
      createdBy: by.id,
      createdAt: at.toISOString(),
    });
    models.audit({
      at,
      personId: by.id,
      ...(by.sessionId === undefined ? {} : { sessionId: by.sessionId }),
      siteId,
      action,
      subject: modelId,
      details: { name: saved.name, version },
    });
    const stored = models.newestOf(siteId, modelId);
    if (stored === undefined) throw new Error(`library model ${modelId} was written but cannot be read`);
    return stored;
  }
}

function noSuchModel(): Error {
  return notFound('There is no such trap model in the library of this site.');
}

function stale(current: LibraryModel, onVersion: number): Error {
  return staleVersion(
    `The model is at version ${current.version}, saved by ${current.createdBy}; this change was made on version ${onVersion}. Compare the two, then save again on the newest.`,
    { currentVersion: current.version, current } satisfies StaleLibraryModel,
  );
}

/** Two models of one name cannot be told apart where one is chosen. One writer at a time makes this check hold. */
function refuseTakenName(newest: readonly LibraryModel[], modelId: string, saved: SavedLibraryModel): void {
  if (saved.retired) return;
  const wanted = saved.name.toLowerCase();
  const taken = newest.some(({ id, name, retired }) => id !== modelId && !retired && name.toLowerCase() === wanted);
  if (taken) {
    throw conflict(
      `The library of this site already has a trap model named “${saved.name}”: give this one another name, or retire the other.`,
    );
  }
}

function contentOf({ id: _i, version: _v, createdBy: _b, createdAt: _a, ...content }: LibraryModel): SavedLibraryModel {
  return content;
}

function actionOf(before: SavedLibraryModel, after: SavedLibraryModel): string {
  if (before.retired === after.retired) return 'library.save';
  return after.retired ? 'library.retire' : 'library.reinstate';
}
