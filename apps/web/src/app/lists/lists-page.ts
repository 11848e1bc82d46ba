import {
  afterNextRender,
  ChangeDetectionStrategy,
  ChangeDetectorRef,
  Component,
  computed,
  DestroyRef,
  effect,
  inject,
  Injector,
  input,
  linkedSignal,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatDialog } from '@angular/material/dialog';
import { MatTabLink, MatTabNav, MatTabNavPanel } from '@angular/material/tabs';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import type { EditOp } from '@riseback/network';
import { firstValueFrom, type Observable, of } from 'rxjs';
import { CopyNews } from '../library/copy-news';
import { Company } from '../networks/company';
import { NetworkStore } from '../networks/network-store';
import { UndoButtons, type UndoneStep } from '../networks/undo-buttons';
import { backPressureLimit } from '@riseback/figures';
import { NoResults } from '../results/no-results/no-results';
import { BulkBar } from './bulk-bar/bulk-bar';
import { fillDownProposal } from './bulk-bar/bulk-edit';
import { TrialSolve } from './bulk-bar/trial-solve';
import type { DialogName } from './columns/column';
import type { ColumnChoice } from './column-choice/column-choice';
import { ColumnChoices } from './column-choice/column-choices';
import type { ColumnsDialogData } from './column-choice/columns-dialog';
import { deletionOf } from './deletion';
import { CellDialogs } from './dialogs/cell-dialogs';
import { StatusMark } from '../shared/status-mark/status-mark';
import { DeleteDialog, type DeleteDialogData } from '../shared/delete-dialog/delete-dialog';
import { HeldSiteSettings } from '../sites/held-site-settings';
import type { CellEdit } from './grid/cell-editing';
import { ListGrid } from './grid/list-grid';
import { ListPrint } from './print/list-print';
import { printTitle } from './print/print-title';
import { writeCopiedCells } from './exchange/block-text';
import { ExchangeTools } from './exchange/exchange-tools';
import type { OpenList } from './exchange/list-exchange';
import { listContext } from './list-context';
import { ELEMENT_LISTS, type ElementList, isDrawn, type NewKind } from './list-definitions';
import type { ListTable } from './list-table';
import { newElementForm } from './new-element';

/** How long the active row must stand before the address names it. */
const ADDRESS_DELAY_MS = 300;

interface Printing {
  readonly table: ListTable;
  readonly title: string;
  readonly keys: readonly string[];
  readonly ids: readonly string[];
}

/** The elements of the network as tables: inputs to be edited in place, results beside them. */
@Component({
  selector: 'app-lists-page',
  imports: [
    BulkBar,
    CopyNews,
    ExchangeTools,
    ListGrid,
    ListPrint,
    MatButton,
    MatTabLink,
    MatTabNav,
    MatTabNavPanel,
    NoResults,
    RouterLink,
    StatusMark,
    UndoButtons,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(window:beforeprint)': 'layOutForPaper()', '(window:afterprint)': 'printing.set(null)' },
  templateUrl: './lists-page.html',
  styleUrl: './lists-page.scss',
})
export class ListsPage {
  protected readonly store = inject(NetworkStore);
  private readonly siteSettings = inject(HeldSiteSettings);
  private readonly company = inject(Company);
  private readonly dialogs = inject(CellDialogs);
  private readonly choices = inject(ColumnChoices);
  private readonly trials = inject(TrialSolve);
  private readonly dialog = inject(MatDialog);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);
  private readonly injector = inject(Injector);
  private readonly changeDetector = inject(ChangeDetectorRef);

  /** From the query: which list, and which element's row; the element's own list comes first. */
  readonly list = input<string>();
  readonly element = input<string>();

  protected readonly grid = viewChild(ListGrid);

  protected readonly filter = signal('');
  protected readonly told = signal('');
  /** What goes on paper, from when the browser asks for it until it has it: the screen holds only the rows in sight. */
  protected readonly printing = signal<Printing | null>(null);
  /** Why a file or the clipboard could not be read. */
  protected readonly complaint = signal('');
  private addressTimer: ReturnType<typeof setTimeout> | undefined;

  /** Kept as it is while the address names an element that is gone. */
  protected readonly current = linkedSignal<{ list: string | undefined; element: string | undefined }, ElementList>({
    source: () => ({ list: this.list(), element: this.element() }),
    computation: ({ list, element }, previous) =>
      untracked(() => this.listOf(element)) ?? findList(list) ?? previous?.value ?? firstList(),
  });
  protected readonly selected = signal<readonly string[]>([]);
  protected readonly tabs = computed(() => {
    const document = this.store.document();
    return ELEMENT_LISTS.map(({ id, word, count }) => ({
      id,
      word,
      count: document === null ? 0 : count(document),
      current: id === this.current().id,
    }));
  });
  private readonly context = computed(() => {
    const document = this.store.document();
    if (document === null) return null;
    return listContext({
      document,
      units: this.store.units(),
      topology: this.store.topology(),
      outcome: this.store.outcome(),
      result: this.store.result(),
      traps: this.store.trapResults(),
      pipes: this.store.pipeResults(),
      nodes: this.store.nodeResults(),
      caseNameOf: this.store.showsWorst() ? (id) => this.store.nameOfCase(this.store.caseOf(id)) : undefined,
    });
  });
  protected readonly table = computed(() => {
    const context = this.context();
    return context === null ? null : this.current().table(context);
  });
  protected readonly outlook = computed(() => {
    const [document, traps] = [this.store.document(), this.store.trapResults()];
    const caseId = this.store.showsWorst() ? null : this.store.caseId();
    return (ops: readonly EditOp[]): Observable<string> =>
      document === null ? of('') : this.trials.outlook({ document, caseId, traps }, ops);
  });
  protected readonly openList = (): OpenList | null => {
    const [target, grid, network] = [this.target(), this.grid(), this.store.document()];
    if (target === null || grid === undefined || network === null) return null;
    const { units } = this.store;
    return { facts: this.current(), target, grid: grid.inSight(), units: units(), networkName: network.name };
  };
  protected readonly staffTopPa = computed(() => this.context()?.staffTopPa ?? 0);
  protected readonly limitPa = computed(() => {
    const context = this.context();
    return (id: string): number | undefined => {
      const [trap, result] = [context?.document.nodes.get(id)?.value, context?.traps.get(id)];
      if (context === null || trap?.kind !== 'trap' || result === undefined) return undefined;
      const model = trap.trapModel === undefined ? undefined : context.document.trapModels.get(trap.trapModel)?.value;
      return backPressureLimit(result, trap, model, context.units)?.pressurePa;
    };
  });
  protected readonly mayEdit = computed(() => this.store.may(this.current().permission));
  protected readonly choice = computed(() => this.choices.of(this.current().id));
  private readonly target = computed(() => {
    const context = this.context();
    return context === null ? null : this.current().block(context);
  });
  protected readonly written = computed(() => {
    const target = this.target();
    return (keys: readonly string[], ids: readonly string[]): string =>
      target === null ? '' : writeCopiedCells(target.sheet(keys, ids));
  });
  protected readonly emptyWords = computed(() =>
    this.filter().trim() === ''
      ? `No ${this.current().many} in this network yet.`
      : `No ${this.current().one} has “${this.filter().trim()}” in its tag, area, type or model.`,
  );

  constructor() {
    effect(() => {
      const element = this.element();
      const grid = this.grid();
      untracked(() => {
        if (element !== undefined && grid !== undefined && grid.shownRow() !== element) grid.showRow(element);
      });
    });
    effect(() => {
      const ids = this.selected();
      // with no row ticked, the one that the address names
      this.company.choose(ids.length > 0 ? ids : null);
    });
    inject(DestroyRef).onDestroy(() => {
      this.company.choose(null);
      clearTimeout(this.addressTimer);
    });
  }

  protected edit({ label, ops }: CellEdit): void {
    const short = label.slice(0, 120);
    const taken = this.store.edit(short, ops);
    this.told.set(taken ? `Done: ${short}` : `Not taken: ${this.store.lastRefusal().join(' ')}`);
  }

  protected fillDown(key: string): void {
    const table = this.table();
    if (table === null) return;
    const proposal = fillDownProposal(table, this.selected(), key);
    if (!proposal.ok) {
      this.told.set(`Not taken: ${proposal.reason}`);
      return;
    }
    const title = table.columns.find((column) => column.key === key)?.title.toLowerCase() ?? '';
    this.edit({ label: `fill ${title} down ${String(this.selected().length - 1)} rows`, ops: proposal.ops });
  }

  protected async openDialog({ id, dialog }: { id: string; dialog: DialogName }): Promise<void> {
    const document = this.store.document();
    if (document === null) return;
    const edit = await this.dialogs.open(dialog, id, document, this.store.units());
    if (edit !== null) this.edit(edit);
  }

  protected async add(kind: NewKind): Promise<void> {
    const document = this.store.document();
    if (document === null) return;
    const form = newElementForm(kind, document, this.siteSettings.tagPatterns(this.store.network()?.siteId ?? ''));
    const words = { submitWord: 'Add', leaveWord: 'Cancel' };
    const values = await this.dialogs.askFields({ ...form, ...words, units: this.store.units() });
    if (values === undefined) return;
    const { id, label, op } = form.make(values);
    this.filter.set('');
    this.edit({ label, ops: [op] });
    this.showRowSoon(id);
  }

  protected async deleteSelected(): Promise<void> {
    const document = this.store.document();
    if (document === null) return;
    const { title, along, label, ops } = deletionOf(document, this.current(), this.selected());
    const data: DeleteDialogData = { title, along };
    const agreed = await firstValueFrom(
      this.dialog.open<DeleteDialog, DeleteDialogData, boolean>(DeleteDialog, { data }).afterClosed(),
    );
    if (agreed !== true) return;
    this.edit({ label, ops });
    this.grid()?.focus();
  }

  protected async chooseColumns(): Promise<void> {
    const columns = this.table()?.columns;
    if (columns === undefined) return;
    const { id, word } = this.current();
    const { ColumnsDialog } = await import('./column-choice/columns-dialog');
    const data: ColumnsDialogData = { list: word, columns, choice: this.choice() };
    const reference = this.dialog.open<unknown, ColumnsDialogData, ColumnChoice | null>(ColumnsDialog, {
      data,
      width: '480px',
    });
    const chosen = await firstValueFrom(reference.afterClosed());
    if (chosen === undefined) return;
    this.choices.set(id, chosen);
    this.told.set('Columns set');
  }

  /** Rows that came in: the filter must not hide them. */
  protected takeIn(edit: CellEdit): void {
    this.filter.set('');
    this.edit(edit);
    const added = edit.ops.find((op) => op.op === 'add');
    const id = added?.op === 'add' ? added.value['id'] : undefined;
    if (typeof id === 'string') this.showRowSoon(id);
    else this.grid()?.focus();
  }

  protected layOutForPaper(): void {
    const [table, grid, network] = [this.table(), this.grid(), this.store.network()];
    if (table === null || grid === undefined || network === null) return;
    const { keys, ids } = grid.inSight();
    const title = printTitle({
      list: this.current().word,
      network: this.store.document()?.name ?? '',
      site: network.siteName,
      caseName: this.store.caseName(),
      filter: this.filter().trim(),
      solved: this.store.solveState().kind === 'solved',
    });
    this.printing.set({ table, keys, ids, title });
    // the browser takes the page as it stands when this returns
    this.changeDetector.detectChanges();
  }

  protected clearSelection(): void {
    this.grid()?.clearSelection();
    this.grid()?.focus();
  }

  /** The address names the active row, so that the other views open at the same element and the link can be passed on. */
  protected nameInAddress(id: string): void {
    clearTimeout(this.addressTimer);
    if (!isDrawn(this.current())) return;
    this.addressTimer = setTimeout(() => {
      // the person is on the way to another view: writing this one's address would call that off
      if (this.router.currentNavigation() !== null) return;
      void this.router.navigate([], {
        relativeTo: this.route,
        queryParams: { element: id, list: this.current().id },
        queryParamsHandling: 'merge',
        replaceUrl: true,
      });
    }, ADDRESS_DELAY_MS);
  }

  protected showOnDrawing(id: string): void {
    clearTimeout(this.addressTimer);
    void this.router.navigate(['../drawing'], {
      relativeTo: this.route,
      queryParams: { element: id, list: null },
      queryParamsHandling: 'merge',
    });
  }

  protected afterStep({ touched, words }: UndoneStep): void {
    this.told.set(words);
    const ids = new Set(this.table()?.ids);
    const shown = touched.find((id) => ids.has(id));
    if (shown !== undefined) this.showRowSoon(shown);
  }

  /** A row that the edit made is there only after the next drawing. */
  private showRowSoon(id: string): void {
    afterNextRender(() => this.grid()?.showRow(id), { injector: this.injector });
  }

  private listOf(element: string | undefined): ElementList | undefined {
    const document = this.store.document();
    if (element === undefined || document === null) return undefined;
    return ELEMENT_LISTS.find((list) => isDrawn(list) && list.holds(document, element));
  }
}

function findList(id: string | undefined): ElementList | undefined {
  return ELEMENT_LISTS.find((list) => list.id === id);
}

function firstList(): ElementList {
  const [first] = ELEMENT_LISTS;
  if (first === undefined) throw new RangeError('There are no lists');
  return first;
}
