import { computed, linkedSignal, signal } from '@angular/core';
import type { DisplayUnits } from '@riseback/units';
import type { BadCell, BlockRow } from './block-plan';
import { type BlockMapping, type GridColumns, type GridRows, mappingFor, rowsOf, startingMapping } from './block-rows';
import type { BlockTarget } from './block-target';
import type { Block } from './block-text';

export interface BlockSource {
  readonly target: BlockTarget;
  readonly units: DisplayUnits;
  readonly grid: GridColumns & GridRows;
}

/** A block under preview: how its columns are taken, what was mended or left out, and what then comes of it. */
export class BlockDraft {
  readonly block = signal<Block>({ rows: [] });
  private readonly mended = signal<ReadonlyMap<string, string>>(new Map());
  private readonly leftOut = signal<ReadonlySet<number>>(new Set());

  readonly mapping = linkedSignal<BlockMapping>(() =>
    startingMapping(this.block(), this.source.target, this.source.units, this.source.grid),
  );
  readonly arrange = signal(false);
  /** Whether an empty cell clears what the list has there; else it changes nothing. */
  readonly clears = signal(false);
  private readonly rows = computed((): BlockRow[] => {
    const [mended, leftOut] = [this.mended(), this.leftOut()];
    return rowsOf(this.block(), this.mapping(), this.source.target, this.source.grid, { clears: this.clears() })
      .filter(({ number }) => !leftOut.has(number))
      .map((row) => withMended(row, mended));
  });
  readonly plan = computed(() => this.source.target.plan(this.rows(), { arrange: this.arrange() }));
  readonly texts = computed(() => new Map(this.rows().map(({ number, texts }) => [number, texts])));
  readonly leftOutCount = computed(() => this.leftOut().size);
  /** Headings of columns that change nothing: not of this list, results, or worked out. */
  readonly idle = computed((): string[] => {
    const { columns, headings } = this.mapping();
    const readable = new Set(this.source.target.fields.filter((field) => field.readable).map(({ key }) => key));
    const cells = this.block().rows[0]?.cells ?? [];
    return columns.flatMap((column, place) => {
      if (column !== null && readable.has(column.key)) return [];
      const named = headings ? (cells[place] ?? '').trim() : '';
      return [named === '' ? `column ${String(place + 1)}` : named];
    });
  });

  constructor(private readonly source: BlockSource) {}

  takeHeadings(headings: boolean): void {
    const { target, units, grid } = this.source;
    this.mapping.set(mappingFor(headings, this.block(), target, units, grid));
  }

  /** @param key '' for a column that is left out */
  takeColumn(place: number, key: string): void {
    this.mapping.update(({ headings, columns }) => ({
      headings,
      columns: columns.map((column, index) => {
        if (index === place) return key === '' ? null : { key, unit: column?.unit ?? '' };
        return column?.key === key ? null : column;
      }),
    }));
  }

  mend({ row, key }: BadCell, text: string): void {
    this.mended.update((mended) => new Map(mended).set(cellKey(row, key), text));
  }

  leaveRowOut(row: number): void {
    this.leftOut.update((rows) => new Set([...rows, row]));
  }
}

function withMended(row: BlockRow, mended: ReadonlyMap<string, string>): BlockRow {
  if (mended.size === 0) return row;
  const prefix = cellKey(row.number, '');
  const texts = new Map(row.texts);
  for (const [cell, text] of mended) {
    if (!cell.startsWith(prefix)) continue;
    const key = cell.slice(prefix.length);
    if (text.trim() === '') texts.delete(key);
    else texts.set(key, text);
  }
  return { ...row, texts };
}

function cellKey(row: number, key: string): string {
  return `${String(row)}/${key}`;
}
