import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, output, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import type { EditOp } from '@riseback/network';
import { type Observable, of, startWith, switchMap, timer } from 'rxjs';
import type { CellEdit } from '../grid/cell-editing';
import type { ListTable } from '../list-table';
import { bulkProposal, fillDownProposal, namesOf } from './bulk-edit';

/** A person goes on typing for less than this. */
const OUTLOOK_DELAY_MS = 350;

/** At the foot while rows are ticked: one property set in all of them as one step of undo, or all of them deleted. */
@Component({
  selector: 'app-bulk-bar',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { role: 'region', 'aria-label': 'Selected rows' },
  templateUrl: './bulk-bar.html',
  styleUrl: './bulk-bar.scss',
})
export class BulkBar {
  readonly table = input.required<ListTable>();
  readonly ids = input.required<readonly string[]>();
  readonly one = input.required<string>();
  readonly many = input.required<string>();
  /** One sentence on what a change would do to the results, before it is made. */
  readonly outlook = input<(ops: readonly EditOp[]) => Observable<string>>(() => of(''));
  readonly edited = output<CellEdit>();
  readonly deleteWanted = output();
  readonly cleared = output();

  protected readonly columns = computed(() =>
    this.table().columns.filter(({ bulk, key }) => bulk && key !== 'tag' && key !== 'name'),
  );
  protected readonly key = linkedSignal<string>(() => this.columns()[0]?.key ?? '');
  protected readonly column = computed(() => this.columns().find(({ key }) => key === this.key()));
  /** The first row's editor stands for all: choices and units are the same down a column. */
  protected readonly editor = computed(() => {
    const editor = this.table().editor(this.ids()[0] ?? '', this.key());
    return editor === null || editor.by === 'dialog' ? null : editor;
  });
  protected readonly text = linkedSignal<string, string>({
    source: this.key,
    computation: () => {
      const editor = this.editor();
      return editor?.by === 'choice' ? editor.chosen : '';
    },
  });
  protected readonly complaint = signal('');
  protected readonly echo = computed(() => {
    const editor = this.editor();
    return editor?.by === 'quantity' ? editor.echo(this.text()) : '';
  });
  protected readonly countWords = computed(() => {
    const count = this.ids().length;
    return `${String(count)} ${count === 1 ? this.one() : this.many()} selected`;
  });
  protected readonly fillWords = computed(() => {
    const [first, ...others] = this.ids();
    const from = first === undefined ? '' : this.table().nameOf(first);
    return `Fill down: the ${this.column()?.title.toLowerCase() ?? ''} of ${from} in the other ${String(others.length)}`;
  });
  protected readonly names = computed(() => namesOf(this.table(), this.ids()));

  private readonly change = computed((): readonly EditOp[] => {
    if (this.text() === '' && this.editor()?.by !== 'choice') return [];
    const proposal = bulkProposal(this.table(), this.ids(), this.key(), this.text());
    return proposal.ok ? proposal.ops : [];
  });
  private readonly asked = computed(() => ({ ops: this.change(), outlook: this.outlook() }));
  protected readonly turns = toSignal(
    toObservable(this.asked).pipe(
      switchMap(({ ops, outlook }) =>
        ops.length === 0
          ? of('')
          : timer(OUTLOOK_DELAY_MS).pipe(
              switchMap(() => outlook(ops)),
              startWith(''),
            ),
      ),
    ),
    { initialValue: '' },
  );

  protected chooseColumn(key: string): void {
    this.key.set(key);
    this.complaint.set('');
  }

  protected type(text: string): void {
    this.text.set(text);
    this.complaint.set('');
  }

  protected set(event: Event): void {
    event.preventDefault();
    const proposal = bulkProposal(this.table(), this.ids(), this.key(), this.text());
    this.complaint.set(proposal.ok ? '' : proposal.reason);
    if (!proposal.ok) return;
    const title = this.column()?.title.toLowerCase() ?? '';
    this.edited.emit({ label: `set ${title} in ${String(this.ids().length)} rows`, ops: proposal.ops });
  }

  protected fillDown(): void {
    const proposal = fillDownProposal(this.table(), this.ids(), this.key());
    this.complaint.set(proposal.ok ? '' : proposal.reason);
    if (!proposal.ok) return;
    const title = this.column()?.title.toLowerCase() ?? '';
    this.edited.emit({ label: `fill ${title} down ${String(this.ids().length - 1)} rows`, ops: proposal.ops });
  }
}
