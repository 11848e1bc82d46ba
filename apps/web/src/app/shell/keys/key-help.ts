import { Injectable } from '@angular/core';

/** Who shows the list of keys when "?" is pressed: a view with a list of its own, otherwise the general one. */
@Injectable({ providedIn: 'root' })
export class KeyHelp {
  private general: (() => void) | null = null;
  private own: (() => void) | null = null;

  open(): void {
    (this.own ?? this.general)?.();
  }

  /** @returns to be called when that list is no longer there */
  offer(kind: 'general' | 'own', open: () => void): () => void {
    this[kind] = open;
    return () => {
      if (this[kind] === open) this[kind] = null;
    };
  }
}

/** A question mark that is not being typed into something, nor already answered. */
export function asksForKeys(event: KeyboardEvent): boolean {
  if (event.key !== '?' || event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return false;
  const { target } = event;
  return !(target instanceof Element) || target.closest('input, textarea, select, [contenteditable], dialog') === null;
}
