import { computed, inject, Injectable, type Signal, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import type { CaseOutcome, NewSignature, Problem, Revision, SignatureMeaning, SigningTerms } from '@riseback/contracts';
import { compareIds, type NetworkFile, toFile } from '@riseback/network';
import { compareNetworks, countChanges } from '@riseback/revisions';
import { firstValueFrom, map, type Observable, shareReplay } from 'rxjs';
import { NetworkStore } from '../networks/network-store';
import { type Load, LOADING } from '../shared/load';
import { toProblem } from '../shared/problem';
import { rereading } from '../shared/rereading';
import { RevisionApi, type RevisionStep } from './revision-api';
import { WORKING } from './revision-choice';
import { RevisionHistory } from './revision-history';
import type { RevisionSide } from './revision-side';

/** The revision that the Revisions view shows, the one beside it, and what the person does with it. In the page's `providers`. */
@Injectable()
export class RevisionReader {
  private readonly api = inject(RevisionApi);
  private readonly store = inject(NetworkStore);
  private readonly history = inject(RevisionHistory);

  /** Set by the page: a revision's id, WORKING, or '' while that is not known. */
  readonly shownId = signal('');
  readonly comparedId = signal('');
  readonly meaning = signal<SignatureMeaning>('approved');

  readonly shown = this.read(this.shownId);
  private readonly compared = this.read(this.comparedId);
  readonly revision = computed(() => {
    const load = this.shown();
    return load.status === 'ready' && load.value.id === this.shownId() ? load.value : null;
  });

  private readonly frozenResults = new Map<string, Observable<readonly CaseOutcome[]>>();
  private readonly shownResults = this.readResults(this.shownId);
  private readonly comparedResults = this.readResults(this.comparedId);
  readonly after = computed(() => this.sideOf(this.shownId(), this.shown(), this.shownResults()));
  readonly before = computed(() => this.sideOf(this.comparedId(), this.compared(), this.comparedResults()));
  /** How many inputs differ between the two; null while there are not two. */
  readonly changeCount = computed(() => {
    const [before, after] = [this.before(), this.after()];
    return before === null || after === null ? null : countChanges(compareNetworks(before.file, after.file)).inputs;
  });
  /** Why there is no comparison, where there should be one. */
  readonly sideProblem = computed(() => {
    const loads = [this.shownResults(), this.compared(), this.comparedResults()];
    return loads.flatMap((load) => (load.status === 'failed' ? [load.problem] : []))[0] ?? null;
  });

  /** Asked for only where the person may sign; null elsewhere. */
  readonly terms: Signal<Load<SigningTerms>> = toSignal(
    rereading(
      computed(() => {
        const revision = this.revision();
        const asks = revision?.deeds.sign.allowed === true;
        return { key: asks ? `${revision.id} ${this.meaning()}` : '', count: this.history.count() };
      }),
      (key) => {
        const [id = ''] = key.split(' ');
        return this.api.terms(this.history.networkId(), id, this.meaning());
      },
    ),
    { initialValue: LOADING },
  );

  /** @returns why it could not be done; null when it was */
  take(step: RevisionStep, note: string): Promise<Problem | null> {
    return this.tried(this.api.step(this.history.networkId(), this.shownId(), step, note));
  }

  sign(input: NewSignature): Promise<Problem | null> {
    return this.tried(this.api.sign(this.history.networkId(), this.shownId(), input));
  }

  retry(): void {
    this.history.reload();
  }

  /** Whatever came of it, how things stand is read anew: a refusal mostly means that someone was first. */
  private async tried(request: Observable<unknown>): Promise<Problem | null> {
    try {
      await firstValueFrom(request);
      return null;
    } catch (error) {
      return toProblem(error);
    } finally {
      this.history.reload();
    }
  }

  private read(id: Signal<string>): Signal<Load<Revision>> {
    const reading = computed(() => ({
      key: this.history.networkId() === '' || id() === WORKING ? '' : id(),
      count: this.history.count(),
    }));
    return toSignal(
      rereading(reading, (revisionId) => this.api.get(this.history.networkId(), revisionId)),
      { initialValue: LOADING satisfies Load<Revision> },
    );
  }

  private readResults(id: Signal<string>): Signal<Load<Kept>> {
    const reading = computed(() => ({
      key: this.history.networkId() === '' || id() === WORKING ? '' : id(),
      count: 0,
    }));
    return toSignal(
      rereading(reading, (revisionId) => this.resultsOf(revisionId).pipe(map((cases) => ({ revisionId, cases })))),
      { initialValue: LOADING satisfies Load<Kept> },
    );
  }

  /** Frozen, so read once. */
  private resultsOf(revisionId: string): Observable<readonly CaseOutcome[]> {
    const known = this.frozenResults.get(revisionId);
    if (known !== undefined) return known;
    const results = this.api.results(this.history.networkId(), revisionId).pipe(
      map((answer) => (answer.state === 'finished' ? answer.cases : [])),
      shareReplay(1),
    );
    this.frozenResults.set(revisionId, results);
    return results;
  }

  private sideOf(id: string, frozen: Load<Revision>, results: Load<Kept>): RevisionSide | null {
    if (id === WORKING) return this.working();
    if (frozen.status !== 'ready' || results.status !== 'ready') return null;
    if (frozen.value.id !== id || results.value.revisionId !== id) return null;
    return { label: frozen.value.letter, file: frozen.value.file, results: results.value.cases };
  }

  private readonly working = computed((): RevisionSide | null => {
    const document = this.store.document();
    if (document === null) return null;
    return { label: 'Working', file: sortedById(toFile(document)), results: this.store.finished()?.cases ?? [] };
  });
}

/** As a frozen file is, so that no order differs that nobody changed. */
function sortedById(file: NetworkFile): NetworkFile {
  const sorted = <T extends { readonly id: string }>(list: readonly T[]) =>
    [...list].sort((a, b) => compareIds(a.id, b.id));
  return {
    ...file,
    nodes: sorted(file.nodes),
    pipes: sorted(file.pipes),
    trapModels: sorted(file.trapModels),
    gauges: sorted(file.gauges),
  };
}

interface Kept {
  readonly revisionId: string;
  readonly cases: readonly CaseOutcome[];
}
