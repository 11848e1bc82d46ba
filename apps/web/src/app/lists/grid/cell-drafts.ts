import { signal } from '@angular/core';

/** A text that was not taken, with the reason. */
export interface RefusedText {
  readonly text: string;
  readonly reason: string;
}

export interface CellKey {
  readonly id: string;
  readonly key: string;
}

/** Texts that were refused and left standing in their cells, so that nothing typed is lost by going elsewhere. */
export class CellDrafts {
  private readonly byCell = signal<ReadonlyMap<string, RefusedText>>(new Map());

  of(cell: CellKey): RefusedText | undefined {
    return this.byCell().get(nameOf(cell));
  }

  keep(cell: CellKey, refused: RefusedText): void {
    this.byCell.update((drafts) => new Map(drafts).set(nameOf(cell), refused));
  }

  drop(cell: CellKey): void {
    const dropped = nameOf(cell);
    if (!this.byCell().has(dropped)) return;
    this.byCell.update((drafts) => new Map([...drafts].filter(([name]) => name !== dropped)));
  }
}

/** Ids hold no slash. */
function nameOf({ id, key }: CellKey): string {
  return `${id}/${key}`;
}
