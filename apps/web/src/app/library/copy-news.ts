import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal, untracked } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { LibraryModel } from '@riseback/contracts';
import { NetworkStore } from '../networks/network-store';
import { nameOf } from '../shared/element-words';
import { DifferenceTable } from './difference-table';
import { type CopyNews as News, newsOfCopies, takeVersionOps } from './library-copies';
import { modelDifferences } from './model-facts';
import { SiteLibrary } from './site-library';

const MOST_TRAPS_NAMED = 4;

/** Tells where the site's library has moved on from the network's copies, and takes a newer version as one edit. */
@Component({
  selector: 'app-copy-news',
  imports: [DifferenceTable, MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './copy-news.html',
  styleUrl: './copy-news.scss',
})
export class CopyNews {
  private readonly library = inject(SiteLibrary);
  protected readonly store = inject(NetworkStore);

  /** Only news of this model of the network; of all where it is left out. */
  readonly modelId = input<string>();

  private readonly siteId = computed(() => this.store.network()?.siteId ?? '');
  private readonly models = computed((): readonly LibraryModel[] => {
    const load = this.library.of(this.siteId())();
    return load.status === 'ready' ? load.value : [];
  });
  /** The model whose changes are looked at. */
  protected readonly opened = signal<string | null>(null);
  protected readonly said = signal('');
  protected readonly news = computed(() => {
    const document = this.store.document();
    if (document === null) return [];
    return newsOfCopies(document, this.models())
      .filter(({ copy }) => this.modelId() === undefined || copy.id === this.modelId())
      .map((one) => ({
        ...one,
        words: this.wordsOf(one),
        differences: modelDifferences(one.copy, withoutType(one.newest), this.store.units()),
      }));
  });

  constructor() {
    effect(() => {
      const siteId = this.siteId();
      if (siteId !== '') untracked(() => this.library.ask(siteId));
    });
  }

  protected toggle(id: string): void {
    this.opened.update((open) => (open === id ? null : id));
  }

  protected take({ copy, newest }: News): void {
    const document = this.store.document();
    if (document === null) return;
    const label = `${copy.name} from version ${String(newest.version)} of the library`.slice(0, 120);
    if (this.store.edit(label, takeVersionOps(document, copy, newest))) {
      this.said.set(`Version ${String(newest.version)} taken. Undo brings back what was there.`);
    }
  }

  private wordsOf({ copy, newest, kind, traps }: News): string {
    if (kind === 'retired')
      return `${copy.name} is retired in the site’s library: it is no longer chosen for new traps.`;
    const named = traps.slice(0, MOST_TRAPS_NAMED).map(nameOf).join(', ');
    const more = traps.length - MOST_TRAPS_NAMED;
    const at = traps.length === 0 ? 'no trap' : named + (more > 0 ? ` and ${String(more)} more` : '');
    return `Version ${String(newest.version)} of ${newest.name} is in the library; this network has version ${String(copy.libraryVersion)}, at ${at}.`;
  }
}

/** A network's copy has no type of its own to differ from. */
function withoutType({ trapType: _, ...model }: LibraryModel): Omit<LibraryModel, 'trapType'> {
  return model;
}
