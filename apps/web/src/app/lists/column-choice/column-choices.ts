import { Injectable, signal } from '@angular/core';
import { ColumnChoice } from './column-choice';

const KEY = 'riseback.columns.';

/** Choices of columns, kept on the device for each list. Where the device keeps nothing, they last as long as the page. */
@Injectable({ providedIn: 'root' })
export class ColumnChoices {
  private readonly choices = signal<ReadonlyMap<string, ColumnChoice | null>>(new Map());

  of(list: string): ColumnChoice | null {
    const known = this.choices().get(list);
    return known === undefined ? stored(list) : known;
  }

  /** @param choice null for the columns as they are at first */
  set(list: string, choice: ColumnChoice | null): void {
    this.choices.update((choices) => new Map(choices).set(list, choice));
    try {
      if (choice === null) localStorage.removeItem(KEY + list);
      else localStorage.setItem(KEY + list, JSON.stringify(choice));
    } catch {
      // a full or forbidden store: the choice holds until the page is left
    }
  }
}

function stored(list: string): ColumnChoice | null {
  try {
    const read = ColumnChoice.safeParse(JSON.parse(localStorage.getItem(KEY + list) ?? 'null'));
    return read.success ? read.data : null;
  } catch {
    return null;
  }
}
