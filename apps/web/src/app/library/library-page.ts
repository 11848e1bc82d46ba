import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { LibraryModel, SavedLibraryModel } from '@riseback/contracts';
import { TRAP_TYPES } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { SessionStore } from '../session/session-store';
import { TRAP_TYPE_WORDS } from '../shared/element-words';
import { ChoiceField } from '../shared/fields/choice-field';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AppBar } from '../shell/app-bar';
import { contentOf, LibraryStore } from './library-store';
import { LibraryOverview } from './library-overview';
import { ModelForm } from './model-form';
import { ModelView } from './model-view';

type Editing = 'no' | 'new' | 'chosen';

/** The trap models of a site: find one, read it with its history, and, for designers, keep them. */
@Component({
  selector: 'app-library-page',
  imports: [
    AppBar,
    ChoiceField,
    LibraryOverview,
    MatButton,
    ModelForm,
    ModelView,
    ProblemBanner,
    RouterLink,
    StatusMark,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [LibraryStore],
  templateUrl: './library-page.html',
  styleUrl: './library-page.scss',
})
export class LibraryPage {
  private readonly router = inject(Router);
  protected readonly store = inject(LibraryStore);

  readonly siteId = input.required<string>();
  /** The model that is looked at, as the address has it. */
  readonly model = input<string>();

  protected readonly timeZone = inject(SessionStore).timeZone;
  protected readonly text = signal('');
  protected readonly type = signal<string | undefined>(undefined);
  protected readonly withRetired = signal(false);
  protected readonly editing = signal<Editing>('no');
  /** What the form began with: stays while the list learns of newer versions. */
  protected readonly edited = signal<LibraryModel | null>(null);
  protected readonly said = signal('');
  protected readonly types = TRAP_TYPES.map((value) => ({ value, words: TRAP_TYPE_WORDS[value] }));

  protected readonly retiredCount = computed(() => this.store.models().filter(({ retired }) => retired).length);
  protected readonly listed = computed(() => {
    const wanted = this.text().trim().toLowerCase();
    return this.store
      .models()
      .filter(({ retired }) => this.withRetired() || !retired)
      .filter(({ trapType }) => this.type() === undefined || trapType === this.type())
      .filter(({ name }) => name.toLowerCase().includes(wanted))
      .map((model) => ({ model, under: this.underOf(model) }));
  });

  constructor() {
    effect(() => this.store.siteId.set(this.siteId()));
    effect(() => this.store.chosenId.set(this.model() ?? ''));
  }

  protected begin(editing: Exclude<Editing, 'no'>): void {
    this.store.forget();
    this.edited.set(editing === 'new' ? null : this.store.chosen());
    this.editing.set(editing);
  }

  protected drop(): void {
    this.store.forget();
    this.editing.set('no');
  }

  protected async save(model: SavedLibraryModel, on: LibraryModel | null): Promise<void> {
    const saved = await this.store.save(model, on ?? this.edited());
    if (saved === null) return;
    this.editing.set('no');
    this.said.set(`${saved.name} saved as version ${String(saved.version)}.`);
    await this.show(saved.id);
  }

  protected async retire(model: LibraryModel, retired: boolean): Promise<void> {
    const { retired: _, ...content } = contentOf(model);
    const saved = await this.store.save({ ...content, ...(retired ? { retired } : {}) }, model);
    if (saved !== null) this.said.set(`${saved.name} ${retired ? 'retired' : 'taken into use again'}.`);
  }

  private async show(id: string): Promise<void> {
    await this.router.navigate([], { queryParams: { model: id }, queryParamsHandling: 'merge' });
  }

  private underOf({ trapType, orificeDiameterM, capacity }: LibraryModel): string {
    const units = this.store.units();
    const points = capacity?.length ?? 0;
    return [
      trapType === undefined ? 'Type not given' : TRAP_TYPE_WORDS[trapType],
      ...(orificeDiameterM === undefined
        ? []
        : [`orifice ${formatQuantity(orificeDiameterM, 'diameter', units, { withUnit: true })}`]),
      points === 0 ? 'no capacities' : `${String(points)} ${points === 1 ? 'point' : 'points'}`,
    ].join(', ');
  }
}
