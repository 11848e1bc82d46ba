import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, signal, untracked } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { CapacityPoint } from '@riseback/network';
import { displayUnit, type DisplayUnits, formatQuantity } from '@riseback/units';
import { CapacityChart } from './capacity-chart';
import { readCapacityText } from './capacity-text';
import { PointsImport } from './points-import';

/** A cell as it stands there; `si` until it is typed in, so that a rounded number on the screen rounds nothing that is saved. */
interface Cell {
  readonly text: string;
  readonly si?: number;
}
interface PointRow {
  readonly differential: Cell;
  readonly flow: Cell;
}

const NOTHING: PointRow = { differential: { text: '' }, flow: { text: '' } };

/** Capacity points as rows to type in, a block to paste or a CSV file, with the curve that they make. */
@Component({
  selector: 'app-points-editor',
  imports: [CapacityChart, MatButton, PointsImport],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './points-editor.html',
  styleUrl: './points-editor.scss',
})
export class PointsEditor {
  /** What the rows begin with. */
  readonly capacity = input.required<readonly CapacityPoint[]>();
  readonly units = input.required<DisplayUnits>();

  /** Half-typed rows keep the units that they were begun in, whatever the person changes meanwhile. */
  private readonly start = computed(() => ({ capacity: this.capacity(), units: untracked(this.units) }));
  protected readonly ownUnits = computed(() => this.start().units);
  protected readonly rows = linkedSignal((): readonly PointRow[] =>
    this.start().capacity.map((point) => rowOf(point, this.start().units)),
  );
  /** What was pasted into a cell, or '' for an empty box; null while there is no box. */
  protected readonly importing = signal<string | null>(null);
  protected readonly reading = computed(() =>
    readCapacityText(
      this.rows()
        .map(({ differential, flow }) => `${differential.text}\t${flow.text}`)
        .join('\n'),
      this.ownUnits(),
    ),
  );
  /** In order of rising differential; null while a row is wrong. */
  readonly points = computed((): readonly CapacityPoint[] | null => {
    const [reading, rows] = [this.reading(), this.rows()];
    if (reading === null) return [];
    if (reading.points === null) return null;
    return reading.rows
      .flatMap(({ line, point }) => {
        const row = rows[line - 1];
        if (row === undefined || point === null) return [];
        const { differentialPa, flowKgS } = point;
        return [{ differentialPa: row.differential.si ?? differentialPa, flowKgS: row.flow.si ?? flowKgS }];
      })
      .sort((a, b) => a.differentialPa - b.differentialPa);
  });
  protected readonly complaints = computed(
    () => new Map((this.reading()?.rows ?? []).map(({ line, complaint }) => [line - 1, complaint])),
  );
  protected readonly differentialUnit = computed(() => displayUnit('pressureDifference', this.ownUnits().system));
  protected readonly flowUnit = computed(() => displayUnit('massFlow', this.ownUnits().system));

  protected type(index: number, key: keyof PointRow, text: string): void {
    this.rows.update((rows) => rows.map((row, i) => (i === index ? { ...row, [key]: { text } } : row)));
  }

  protected add(table: HTMLElement): void {
    this.rows.update((rows) => [...rows, NOTHING]);
    setTimeout(() => table.querySelector<HTMLInputElement>('tr:last-child input')?.focus());
  }

  protected remove(index: number): void {
    this.rows.update((rows) => rows.filter((_, i) => i !== index));
  }

  /** A block that is pasted into a cell goes to the preview; a single value goes into the cell. */
  protected paste(event: ClipboardEvent): void {
    const text = event.clipboardData?.getData('text/plain') ?? '';
    if (!/[\t\n]/.test(text.trim())) return;
    event.preventDefault();
    this.importing.set(text);
  }

  protected take(points: readonly CapacityPoint[]): void {
    this.rows.set(points.map((point) => rowOf(point, this.ownUnits())));
    this.importing.set(null);
  }
}

function rowOf({ differentialPa, flowKgS }: CapacityPoint, units: DisplayUnits): PointRow {
  return {
    differential: { text: formatQuantity(differentialPa, 'pressureDifference', units), si: differentialPa },
    flow: { text: formatQuantity(flowKgS, 'massFlow', units), si: flowKgS },
  };
}
