import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  Injector,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatDialog } from '@angular/material/dialog';
import { MatTabLink, MatTabNav, MatTabNavPanel } from '@angular/material/tabs';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import { firstValueFrom } from 'rxjs';
import { NetworkStore } from '../networks/network-store';
import { UndoButtons, type UndoneStep } from '../networks/undo-buttons';
import { NoResults } from '../results/no-results/no-results';
import { DeleteDialog, type DeleteDialogData } from '../shared/delete-dialog/delete-dialog';
import { compareCases } from './case-comparison';
import { type CaseEdit, copyOfCase, deletionOfCase, newCase } from './case-edits';
import { CaseEditor } from './case-editor';
import { CaseList } from './case-list';
import { ComparisonTable } from './comparison-table';
import { madeCaseOf } from './made-case';

const TABS = [
  { id: 'settings', word: 'Settings' },
  { id: 'compare', word: 'Side by side' },
] as const;

/** Operating cases: what each sets apart from the drawing, and what comes out of all of them, trap by trap. */
@Component({
  selector: 'app-cases-page',
  imports: [
    CaseEditor,
    CaseList,
    ComparisonTable,
    MatButton,
    MatTabLink,
    MatTabNav,
    MatTabNavPanel,
    NoResults,
    RouterLink,
    UndoButtons,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './cases-page.html',
  styleUrl: './cases-page.scss',
})
export class CasesPage {
  protected readonly store = inject(NetworkStore);
  private readonly dialog = inject(MatDialog);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);
  private readonly injector = inject(Injector);

  /** From the query: which of the two tabs. */
  readonly show = input<string>();

  private readonly editor = viewChild(CaseEditor);
  private readonly list = viewChild(CaseList);

  protected readonly told = signal('');
  protected readonly tabs = computed(() => {
    const current = TABS.find(({ id }) => id === this.show()) ?? TABS[0];
    return TABS.map((tab) => ({ ...tab, current: tab === current }));
  });
  protected readonly compares = computed(() => this.show() === 'compare');
  protected readonly chosen = computed(() => this.store.cases().find(({ id }) => id === this.store.caseId()) ?? null);
  protected readonly comparison = computed(() => {
    const document = this.store.document();
    if (document === null) return null;
    return compareCases(document, this.store.cases(), this.store.outcomes(), this.store.worst(), this.store.units());
  });
  protected readonly stale = computed(() => this.store.solveState().kind !== 'solved');

  constructor() {
    const made = madeCaseOf(this.router.currentNavigation());
    if (made === null) return;
    this.told.set(`Done: ${made.madeCase}`);
    afterNextRender(() => {
      if (made.loadOf === null) this.editor()?.focusName();
      else this.editor()?.focusSetting(made.loadOf, 'loadKgS');
    });
  }

  protected edit({ label, ops }: CaseEdit): boolean {
    const taken = this.store.edit(label, ops);
    this.told.set(taken ? `Done: ${label}` : `Not taken: ${this.store.lastRefusal().join(' ')}`);
    return taken;
  }

  protected async make(): Promise<void> {
    const document = this.store.document();
    if (document !== null) await this.added(newCase(document));
  }

  protected async copy(): Promise<void> {
    const [document, chosen] = [this.store.document(), this.chosen()];
    if (document !== null && chosen !== null) await this.added(copyOfCase(document, chosen));
  }

  protected async remove(): Promise<void> {
    const [document, chosen] = [this.store.document(), this.chosen()];
    if (document === null || chosen === null) return;
    const { along, ...edit } = deletionOfCase(document, chosen);
    const data: DeleteDialogData = { title: `Delete case ${chosen.name}?`, along };
    const agreed = await firstValueFrom(
      this.dialog.open<DeleteDialog, DeleteDialogData, boolean>(DeleteDialog, { data }).afterClosed(),
    );
    if (agreed !== true || !this.edit(edit)) return;
    await this.choose(null);
    this.list()?.focus();
  }

  /** The case that a step touched is looked at, unless the step took it away. */
  protected async afterStep({ touched, words }: UndoneStep): Promise<void> {
    this.told.set(words);
    const ids = touched.map((id) => id.split('/')[0] ?? '');
    const there = this.store.cases().find(({ id }) => ids.includes(id));
    if (there !== undefined && !this.compares()) await this.choose(there.id);
  }

  /** The new case stands open with its name ready to be typed over. */
  private async added({ id, ...edit }: CaseEdit & { id: string }): Promise<void> {
    if (!this.edit(edit)) return;
    await this.choose(id);
    afterNextRender(
      () => {
        this.editor()?.focusName();
      },
      { injector: this.injector },
    );
  }

  private async choose(id: string | null): Promise<void> {
    await this.router.navigate([], {
      relativeTo: this.route,
      queryParams: { case: id, show: null },
      queryParamsHandling: 'merge',
    });
  }
}
