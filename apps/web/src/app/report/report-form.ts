import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ReportFormat, ReportRequest } from '@riseback/contracts';
import { type Choice, ChoiceField } from '../shared/fields/choice-field';
import { StatusMark } from '../shared/status-mark/status-mark';
import type { Standing } from './report-standing';
import { CONTENTS, FORMATS, PAPERS } from './report-words';

/** Of the server's contract for what one report may be asked for. */
const MOST_LEDGERS = 50;

/** What a report is to be of and as. */
@Component({
  selector: 'app-report-form',
  imports: [ChoiceField, MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './report-form.html',
  styleUrl: './report-form.scss',
})
export class ReportForm {
  /** Revisions that there are, the newest first. */
  readonly revisions = input.required<readonly Choice[]>();
  /** Undefined for the network as it stands. */
  readonly revisionId = input<string>();
  /** By id, in the order of the lists. */
  readonly traps = input.required<readonly Choice[]>();
  readonly standings = input.required<readonly Standing[]>();
  readonly busy = input(false);
  readonly revisionChosen = output<string | undefined>();
  readonly ordered = output<ReportRequest>();

  protected readonly formats = FORMATS;
  protected readonly papers = PAPERS;
  protected readonly contents = CONTENTS;
  protected readonly format = signal<ReportFormat>('pdf');
  readonly paper = signal<ReportRequest['paper']>('a4');
  private readonly wanted = signal<readonly string[]>([]);

  /** What was chosen and is still there. */
  protected readonly ledgersOf = computed(() => {
    const words = new Map(this.traps().map(({ value, words: name }) => [value, name]));
    return this.wanted().flatMap((id) => {
      const name = words.get(id);
      return name === undefined ? [] : [{ id, name }];
    });
  });
  protected readonly furtherTraps = computed(() => {
    const chosen = new Set(this.wanted());
    return this.ledgersOf().length >= MOST_LEDGERS ? [] : this.traps().filter(({ value }) => !chosen.has(value));
  });
  protected readonly prevented = computed(() => this.standings().some(({ prevents }) => prevents));

  protected choosePaper(value: string | undefined): void {
    this.paper.set(value === 'letter' ? 'letter' : 'a4');
  }

  protected addLedger(id: string | undefined): void {
    if (id !== undefined) this.wanted.update((ids) => [...ids, id]);
  }

  protected removeLedger(id: string): void {
    this.wanted.update((ids) => ids.filter((each) => each !== id));
  }

  protected order(): void {
    if (this.prevented() || this.busy()) return;
    const [format, revisionId] = [this.format(), this.revisionId()];
    this.ordered.emit({
      format,
      paper: this.paper(),
      ledgersOf: format === 'json' ? [] : this.ledgersOf().map(({ id }) => id),
      ...(revisionId === undefined ? {} : { revisionId }),
    });
  }
}
