import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  type ElementRef,
  input,
  linkedSignal,
  output,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { CapacityPoint } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { StatusMark } from '../shared/status-mark/status-mark';
import { readCapacityText } from './capacity-text';

/** More text than 200 points could ever be. */
const LARGEST_FILE_BYTES = 200_000;

/** Two columns pasted, typed or read from a CSV file, with what they were understood as before anything is taken. */
@Component({
  selector: 'app-points-import',
  imports: [MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { role: 'group', 'aria-label': 'Paste capacities' },
  templateUrl: './points-import.html',
  styleUrl: './points-import.scss',
})
export class PointsImport {
  /** What the box begins with. */
  readonly start = input('');
  readonly units = input.required<DisplayUnits>();
  /** Points that would be replaced. */
  readonly replaces = input(0);
  readonly taken = output<readonly CapacityPoint[]>();
  readonly closed = output();

  private readonly box = viewChild.required<ElementRef<HTMLTextAreaElement>>('box');

  protected readonly text = linkedSignal(() => this.start());
  protected readonly fileProblem = signal('');
  protected readonly reading = computed(() => readCapacityText(this.text(), this.units()));
  protected readonly points = computed(() => this.reading()?.points ?? null);
  protected readonly notes = computed(() => {
    const reading = this.reading();
    return reading === null ? [] : [reading.differential, reading.flow].filter(({ note }) => note !== '');
  });
  protected readonly bad = computed(() => (this.reading()?.rows ?? []).filter(({ complaint }) => complaint !== ''));
  protected readonly verdict = computed(() => {
    const reading = this.reading();
    if (reading === null) return '';
    const rows = reading.rows.length;
    if (reading.points !== null) return `${String(rows)} ${rows === 1 ? 'point' : 'points'} understood.`;
    const bad = this.bad().length;
    if (bad > 0) return `${String(bad)} of ${String(rows)} rows cannot be taken. Mend them in the box.`;
    return rows === 0 ? 'There are no rows of numbers yet.' : 'A heading cannot be followed. Mend it in the box.';
  });

  constructor() {
    afterNextRender(() => this.box().nativeElement.focus());
  }

  protected async load(box: HTMLInputElement): Promise<void> {
    const file = box.files?.[0];
    if (file === undefined) return;
    box.value = '';
    if (file.size > LARGEST_FILE_BYTES) {
      this.fileProblem.set(`${file.name} is too large for a list of capacities: give at most 200 points.`);
      return;
    }
    const text = await file.text();
    // a spreadsheet's own format begins as an archive; U+FFFD stands where bytes were no text
    if (text.startsWith('PK') || text.includes('\uFFFD')) {
      this.fileProblem.set(`${file.name} is not a CSV file: save it from the spreadsheet as CSV (UTF-8) first.`);
      return;
    }
    this.fileProblem.set('');
    this.text.set(text.replace(/^\uFEFF/, ''));
  }

  protected take(): void {
    const points = this.points();
    if (points !== null) this.taken.emit(points);
  }
}
