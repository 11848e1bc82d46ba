import {
  afterRenderEffect,
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  DOCUMENT,
  ElementRef,
  inject,
  input,
  viewChild,
} from '@angular/core';
import { OpenTip } from './open-tip';
import { type TermKey, TERMS } from './terms';
import { tipPlace } from './tip-place';

/** A pointer may cross the edge between word and tip, and graze a word on its way elsewhere, ms. */
const CLOSES_AFTER_MS = 150;

let termCount = 0;

/**
 * A word of the trade that explains itself: on pointing, on keyboard focus and on a tap. The tip stays while pointer or focus are on
 * word or tip, can be pointed at, and Escape puts it away without moving either (WCAG 2.2, 1.4.13).
 */
@Component({
  selector: 'app-term',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {
    '(pointerenter)': 'pointed($event)',
    '(pointerleave)': 'left($event)',
  },
  template: `
    <button #word type="button" [attr.aria-describedby]="id" (focus)="show()" (blur)="hide()" (click)="show()">
      <ng-content />
    </button>
    <span #tip class="tip" role="tooltip" popover="manual" [id]="id"
      ><b>{{ text().word }}</b> {{ text().meaning }}</span
    >
  `,
  styleUrl: './term.scss',
})
export class Term {
  private readonly tips = inject(OpenTip);
  private readonly page = inject(DOCUMENT);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly of = input.required<TermKey>();

  private readonly word = viewChild.required<ElementRef<HTMLElement>>('word');
  private readonly tip = viewChild.required<ElementRef<HTMLElement>>('tip');
  protected readonly id = `term-${String(++termCount)}`;
  private closing: ReturnType<typeof setTimeout> | undefined;
  protected readonly text = computed(() => TERMS[this.of()]);
  private readonly open = computed(() => this.tips.id() === this.id);

  constructor() {
    afterRenderEffect((onCleanup) => {
      if (!this.open()) return;
      const tip = this.tip().nativeElement;
      const stopListening = this.listenWhileOpen();
      this.place(tip);
      onCleanup(() => {
        stopListening();
        // a page that is left has taken it out already
        if (tip.isConnected) tip.hidePopover();
      });
    });
    inject(DestroyRef).onDestroy(() => {
      clearTimeout(this.closing);
      this.hide();
    });
  }

  protected show(): void {
    clearTimeout(this.closing);
    this.tips.show(this.id);
  }

  protected hide(): void {
    clearTimeout(this.closing);
    this.tips.hide(this.id);
  }

  /** A finger taps; it does not point. */
  protected pointed(event: PointerEvent): void {
    if (event.pointerType !== 'touch') this.show();
  }

  protected left(event: PointerEvent): void {
    if (event.pointerType === 'touch' || this.page.activeElement === this.word().nativeElement) return;
    clearTimeout(this.closing);
    this.closing = setTimeout(() => {
      this.hide();
    }, CLOSES_AFTER_MS);
  }

  private listenWhileOpen(): () => void {
    const listening = new AbortController();
    const { signal } = listening;
    const putAway = (event: KeyboardEvent): void => {
      if (event.key !== 'Escape') return;
      // whoever else listens would close what lies under the tip
      event.preventDefault();
      event.stopPropagation();
      this.hide();
    };
    const hideWhenElsewhere = ({ target }: Event): void => {
      const own = this.host.nativeElement;
      if (!(target instanceof Node) || !own.contains(target)) this.hide();
    };
    this.page.addEventListener('keydown', putAway, { signal, capture: true });
    this.page.addEventListener('pointerdown', hideWhenElsewhere, { signal, capture: true });
    // a tip does not follow a word that moves
    this.page.addEventListener('scroll', hideWhenElsewhere, { signal, capture: true });
    this.page.defaultView?.addEventListener('resize', hideWhenElsewhere, { signal });
    return () => {
      listening.abort();
    };
  }

  private place(tip: HTMLElement): void {
    tip.showPopover();
    const window = this.page.documentElement;
    const screen = { width: window.clientWidth, height: window.clientHeight };
    const { left, top } = tipPlace(
      this.word().nativeElement.getBoundingClientRect(),
      tip.getBoundingClientRect(),
      screen,
    );
    tip.style.left = `${String(left)}px`;
    tip.style.top = `${String(top)}px`;
  }
}
