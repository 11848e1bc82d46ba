import { ChangeDetectionStrategy, Component, DOCUMENT, inject, model } from '@angular/core';

const KEY = 'riseback.findings-height';
/** One row under its head. */
const LEAST_PX = 84;
/** The sheet keeps at least this share of the window. */
const MOST_SHARE = 0.6;
const STEP_PX = 24;

/** Where the sheet ends and the findings begin: dragged, or moved by the arrow keys, and remembered on this device. */
@Component({
  selector: 'app-findings-height',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: '',
  styleUrl: './findings-height.scss',
  host: {
    role: 'separator',
    tabindex: '0',
    'aria-orientation': 'horizontal',
    'aria-label': 'Height of the findings',
    title: 'Drag, or use the arrow keys, to give the findings more or less room',
    'aria-valuemin': '84',
    '[attr.aria-valuemax]': 'most()',
    '[attr.aria-valuenow]': 'height()',
    '[attr.aria-valuetext]': "height() + ' pixels'",
    '(pointerdown)': 'grab($event)',
    '(pointermove)': 'drag($event)',
    '(pointerup)': 'letGo()',
    '(pointercancel)': 'letGo()',
    '(keydown)': 'key($event)',
  },
})
export class FindingsHeight {
  private readonly window = inject(DOCUMENT).defaultView;

  readonly height = model.required<number>();

  private grabbed: { readonly y: number; readonly height: number } | null = null;

  protected most(): number {
    return Math.round((this.window?.innerHeight ?? 900) * MOST_SHARE);
  }

  protected grab(event: PointerEvent): void {
    if (event.button !== 0 || !(event.currentTarget instanceof HTMLElement)) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    this.grabbed = { y: event.clientY, height: this.height() };
  }

  protected drag(event: PointerEvent): void {
    if (this.grabbed !== null) this.set(this.grabbed.height + this.grabbed.y - event.clientY);
  }

  protected letGo(): void {
    if (this.grabbed === null) return;
    this.grabbed = null;
    this.keep();
  }

  protected key(event: KeyboardEvent): void {
    const to = {
      ArrowUp: this.height() + STEP_PX,
      ArrowDown: this.height() - STEP_PX,
      Home: LEAST_PX,
      End: this.most(),
    }[event.key];
    if (to === undefined) return;
    event.preventDefault();
    this.set(to);
    this.keep();
  }

  private set(height: number): void {
    this.height.set(Math.round(Math.min(this.most(), Math.max(LEAST_PX, height))));
  }

  private keep(): void {
    try {
      this.window?.localStorage.setItem(KEY, String(this.height()));
    } catch {
      // without storage it holds until the page is left
    }
  }
}

/** As it was left on this device; else room for a few findings, more on a tall screen. */
export function keptFindingsHeight(window: Window | null): number {
  const tall = window?.innerHeight ?? 900;
  const usual = Math.round(Math.min(320, Math.max(148, tall * 0.21)));
  try {
    const kept = Number(window?.localStorage.getItem(KEY) ?? Number.NaN);
    return kept >= LEAST_PX ? Math.min(kept, Math.round(tall * MOST_SHARE)) : usual;
  } catch {
    return usual;
  }
}
