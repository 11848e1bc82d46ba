import { computed, inject, Injectable, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { drawnNetwork, EMPTY_DRAWING } from '@riseback/figures';
import { fromFile, toFile } from '@riseback/network';
import { compareNetworks, compareResults, hasMoved, type NetworkComparison } from '@riseback/revisions';
import { forkJoin, map } from 'rxjs';
import { NetworkStore } from '../../networks/network-store';
import { RevisionApi } from '../../revisions/revision-api';
import type { RevisionSide } from '../../revisions/revision-side';
import { type Load, LOADING } from '../../shared/load';
import { rereading } from '../../shared/rereading';
import { changesAt, type ElementChangeAt, goneElements } from './changes-at';

const NO_CHANGES: ReadonlyMap<string, ElementChangeAt> = new Map();

/** What is drawn, beside the revision that the address names: what was changed since, and how far each trap moved. */
@Injectable()
export class DrawingComparison {
  private readonly api = inject(RevisionApi);
  private readonly store = inject(NetworkStore);

  /** From the address; '' while nothing is compared. */
  readonly revisionId = signal('');
  private readonly asked = signal(0);

  private readonly load = toSignal(
    rereading(
      computed(() => ({ key: this.store.network() === null ? '' : this.revisionId(), count: this.asked() })),
      (revisionId) =>
        forkJoin([
          this.api.get(this.store.networkId(), revisionId),
          this.api.results(this.store.networkId(), revisionId),
        ]).pipe(
          map(([{ letter, file }, results]): RevisionSide & { id: string } => ({
            id: revisionId,
            label: letter,
            file,
            results: results.state === 'finished' ? results.cases : [],
          })),
        ),
    ),
    { initialValue: LOADING as Load<RevisionSide & { id: string }> },
  );

  readonly active = computed(() => this.revisionId() !== '');
  readonly problem = computed(() => {
    const load = this.load();
    return this.active() && load.status === 'failed' ? load.problem : null;
  });
  readonly before = computed(() => {
    const load = this.load();
    return load.status === 'ready' && load.value.id === this.revisionId() ? load.value : null;
  });

  private readonly network = computed(() => {
    const [before, document] = [this.before(), this.store.document()];
    return before === null || document === null ? null : compareNetworks(before.file, toFile(document));
  });
  /** Of the case that is shown. */
  private readonly effects = computed(() => {
    const before = this.before();
    const after = this.store.finished()?.cases;
    if (before === null || after === undefined) return null;
    const { cases, worst } = compareResults(before.results, after);
    if (this.store.showsWorst()) return worst;
    return cases.find(({ caseId }) => caseId === this.store.caseId()) ?? null;
  });

  readonly changes = computed((): ReadonlyMap<string, ElementChangeAt> => {
    const network = this.network();
    return network === null ? NO_CHANGES : changesAt(network, this.effects(), this.store.units());
  });
  /** As it was drawn then. */
  readonly earlier = computed(() => {
    const before = this.before();
    return before === null ? EMPTY_DRAWING : drawnNetwork(fromFile(before.file));
  });
  readonly gone = computed(() => goneElements(this.network(), this.earlier()));

  readonly counts = computed(() => {
    const network = this.network();
    const kinds = [...this.changes().values()];
    const drawn = network?.elements.filter(({ in: list }) => list === 'nodes' || list === 'pipes') ?? [];
    return {
      added: drawn.filter(({ kind }) => kind === 'added').length,
      removed: this.gone().length,
      changed: kinds.filter(({ kind }) => kind === 'changed').length,
      moved: this.effects()?.traps.filter((trap) => trap.changePa !== undefined && hasMoved(trap)).length ?? null,
      /** What the drawing has no element for: settings, cases, models, gauges. */
      elsewhere: network === null ? 0 : countElsewhere(network),
    };
  });

  again(): void {
    this.asked.update((n) => n + 1);
  }

  /** What is read out with an element; '' where nothing is otherwise. */
  wordsFor(elementId: string): string {
    return this.changes().get(elementId)?.spoken ?? '';
  }
}

const DRAWN: ReadonlySet<string> = new Set(['nodes', 'pipes', 'overrides']);

function countElsewhere({ settings, elements }: NetworkComparison): number {
  return settings.length + elements.filter(({ in: list }) => !DRAWN.has(list)).length;
}
