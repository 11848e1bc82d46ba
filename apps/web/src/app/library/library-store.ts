import { computed, inject, Injectable, linkedSignal, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { type LibraryModel, type Problem, SavedLibraryModel, type Site, StaleLibraryModel } from '@riseback/contracts';
import type { DisplayUnits } from '@riseback/units';
import { filter, firstValueFrom, forkJoin, of, switchMap } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { type Load, LOADING, loads } from '../shared/load';
import { toProblem } from '../shared/problem';
import { SiteApi } from '../sites/site-api';
import { LibraryApi } from './library-api';

interface SiteLibrary {
  readonly site: Site;
  readonly models: readonly LibraryModel[];
}

/** The trap library of the page's site. In the library page's `providers`. */
@Injectable()
export class LibraryStore {
  private readonly api = inject(LibraryApi);
  private readonly siteApi = inject(SiteApi);
  private readonly session = inject(SessionStore);

  readonly siteId = signal('');
  /** The model that is looked at; '' for none. */
  readonly chosenId = signal('');
  private readonly asked = signal(0);
  private readonly query = computed(() => ({ siteId: this.siteId(), asked: this.asked() }));

  readonly load = toSignal<Load<SiteLibrary>, Load<SiteLibrary>>(
    toObservable(this.query).pipe(
      filter(({ siteId }) => siteId !== ''),
      switchMap(({ siteId }) => loads(forkJoin({ site: this.siteApi.get(siteId), models: this.api.list(siteId) }))),
    ),
    { initialValue: LOADING },
  );
  readonly site = computed(() => {
    const load = this.load();
    return load.status === 'ready' ? load.value.site : null;
  });
  /** By name, what was saved here included. */
  readonly models = linkedSignal((): readonly LibraryModel[] => {
    const load = this.load();
    return load.status === 'ready' ? load.value.models : [];
  });
  readonly chosen = computed(() => this.models().find(({ id }) => id === this.chosenId()) ?? null);
  readonly mayEdit = computed(() => this.site()?.permissions.includes('draw') ?? false);
  readonly units = computed((): DisplayUnits => ({
    system: this.session.unitSystem(),
    atmosphericPressurePa: this.site()?.atmosphericPressurePa ?? 101_325,
  }));

  private readonly chosenVersion = computed(() => {
    const chosen = this.chosen();
    return chosen === null ? null : { siteId: this.siteId(), id: chosen.id, version: chosen.version };
  });
  /** Every version of the chosen model, the newest first. */
  readonly versions = toSignal<Load<readonly LibraryModel[]>, Load<readonly LibraryModel[]>>(
    toObservable(this.chosenVersion).pipe(
      switchMap((wanted) =>
        wanted === null
          ? of<Load<readonly LibraryModel[]>>(LOADING)
          : loads<readonly LibraryModel[]>(this.api.versions(wanted.siteId, wanted.id)),
      ),
    ),
    { initialValue: LOADING },
  );

  readonly saving = signal(false);
  /** Why the last save was refused; null when it was not. */
  readonly rejection = signal<Problem | null>(null);
  /** What someone else saved meanwhile, at a save that was made on an older version. */
  readonly overtaken = signal<LibraryModel | null>(null);

  reload(): void {
    this.asked.update((n) => n + 1);
  }

  forget(): void {
    this.rejection.set(null);
    this.overtaken.set(null);
  }

  /** Saves a new model (`on` null), or one as its next version. The saved one, or null when it was refused. */
  async save(model: SavedLibraryModel, on: LibraryModel | null): Promise<LibraryModel | null> {
    this.saving.set(true);
    this.forget();
    try {
      const siteId = this.siteId();
      const saved = await firstValueFrom(
        on === null ? this.api.add(siteId, model) : this.api.save(siteId, on.id, on.version, model),
      );
      this.put(saved);
      return saved;
    } catch (error) {
      const problem = toProblem(error);
      const stale = problem.status === 412 ? StaleLibraryModel.safeParse(problem) : undefined;
      if (stale?.success === true) {
        this.put(stale.data.current);
        this.overtaken.set(stale.data.current);
      } else this.rejection.set(problem);
      return null;
    } finally {
      this.saving.set(false);
    }
  }

  private put(model: LibraryModel): void {
    this.models.update((models) =>
      [...models.filter(({ id }) => id !== model.id), model].sort((a, b) => a.name.localeCompare(b.name, 'en')),
    );
  }
}

/** What a version holds, without whose it is. */
export function contentOf(model: LibraryModel): SavedLibraryModel {
  const { id: _i, version: _v, createdBy: _b, createdAt: _a, ...content } = model;
  return SavedLibraryModel.parse(content);
}
