import { computed, Injectable, signal } from '@angular/core';
import type { NodeKind, Position } from '@riseback/network';
import type { ColouredBy } from '@riseback/figures';
import type { GaugeDraft } from './model/gauge-draft';
import { type Displaced, NOTHING_DISPLACED } from './model/drawn-network';
import type { PipeGrip } from './model/pipe-shape';

/** What the pointer and the keys do at the moment. */
export type Mode =
  | { readonly kind: 'idle' }
  /** Waiting for the place of a new node. */
  | { readonly kind: 'placing'; readonly what: NodeKind }
  /** Waiting for the element that a new gauge is to tap. */
  | { readonly kind: 'tapping' }
  /** Moving a gauge along its pipe by keys, before it is set down. */
  | { readonly kind: 'sliding'; readonly id: string; readonly distanceM: number }
  /** Waiting for the ends of a new pipe; `from` is null until the first is chosen. */
  | {
      readonly kind: 'piping';
      readonly from: string | null;
      readonly to: string | null;
      readonly typed: string;
      readonly pointer: Position | null;
    }
  /** Moving the selection, or a part of one pipe, before it is set down. */
  | {
      readonly kind: 'moving';
      readonly ids: readonly string[];
      /** What of the one pipe is moved; null for elements. */
      readonly grip: PipeGrip | null;
      readonly dx: number;
      readonly dy: number;
    };

/** A new element whose fields are being asked for; it joins the network when they are accepted. */
export type Draft =
  | { readonly kind: 'node'; readonly what: NodeKind; readonly at: Position }
  | { readonly kind: 'pipe'; readonly from: string; readonly to: string };

export const IDLE: Mode = { kind: 'idle' };

/** What the person is looking at and doing on the drawing; nothing of it is stored. In the drawing page's `providers`. */
@Injectable()
export class DrawingState {
  readonly selection = signal<ReadonlySet<string>>(new Set());
  /** The element that has, or last had, the keyboard. */
  readonly focusId = signal<string | null>(null);
  /** The trap that was focused last. */
  readonly lastTrapId = signal<string | null>(null);
  readonly pointedAt = signal<string | null>(null);
  readonly mode = signal<Mode>(IDLE);
  readonly draft = signal<Draft | null>(null);
  readonly gaugeDraft = signal<GaugeDraft | null>(null);
  /** Fields of something new are being asked for. */
  readonly asking = computed(() => this.draft() !== null || this.gaugeDraft() !== null);
  readonly displaced = signal<Displaced>(NOTHING_DISPLACED);
  readonly colouredBy = signal<ColouredBy>('pressure');
  readonly zoom = signal(1);
  /** What the polite live region says. */
  readonly said = signal('');
  /** Single letters act as commands. */
  readonly lettersAct = signal(true);
  /** Counted up to ask for something once: the keyboard on `focusId`, an element's fields, the place menu, the tag field, the list of keys. */
  readonly focusAsked = signal(0);
  readonly fieldsAsked = signal(0);
  readonly menuAsked = signal(0);
  readonly tagAsked = signal(0);
  readonly keysAsked = signal(0);
  /** Zoom wanted from outside the sheet; a null factor fits everything. Each request is a new object. */
  readonly zoomAsked = signal<{ readonly factor: number | null } | null>(null);

  /** The one selected element; null for none or several. */
  readonly chosenId = computed(() => {
    const [first, ...others] = this.selection();
    return first !== undefined && others.length === 0 ? first : null;
  });

  select(...ids: readonly string[]): void {
    this.selection.set(new Set(ids));
  }

  selectAll(ids: Iterable<string>): void {
    this.selection.set(new Set(ids));
    this.say(`${String(this.selection().size)} elements selected`);
  }

  toggle(id: string): void {
    this.selection.update((before) => {
      const after = new Set(before);
      if (!after.delete(id)) after.add(id);
      return after;
    });
  }

  /** Moves the keyboard to an element, or to the drawing itself. */
  focusOn(id: string | null): void {
    this.focusId.set(id);
    this.focusAsked.update((count) => count + 1);
  }

  openFields(): void {
    this.fieldsAsked.update((count) => count + 1);
  }

  say(words: string): void {
    // the same words twice must still be read out, and a live region speaks only when it changes
    this.said.update((before) => (before === words ? `${words}\u00a0` : words));
  }
}
