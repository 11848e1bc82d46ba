import {
  afterRenderEffect,
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  ElementRef,
  inject,
  input,
  untracked,
  viewChild,
} from '@angular/core';
import type { Position } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { NetworkStore } from '../../networks/network-store';
import { GRID } from '@riseback/figures';
import { DrawingState } from '../drawing-state';
import { toScreen, toSheet, type Viewport } from '../model/viewport';
import { scaleBar } from './plan-geometry';
import { PlanStore } from './plan-store';
import { PlanTool } from './plan-tool';

/** A press that moves the pointer further than this pans the sheet and shows no point, px. */
const STILL_PX = 4;
/** Steps of the keyboard's cross, px of the screen: plain and with Shift. */
const CROSS_STEP = { plain: 2, shift: 20 } as const;
/** Steps of the plan by the keyboard, units. */
const PLAN_STEP = { plain: 1, shift: GRID } as const;
const FOOT_M = 0.3048;
const ARROWS: Readonly<Record<string, Position>> = {
  ArrowLeft: { x: -1, y: 0 },
  ArrowRight: { x: 1, y: 0 },
  ArrowUp: { x: 0, y: -1 },
  ArrowDown: { x: 0, y: 1 },
};

/** Over the sheet: the points, the cross and the scale bar of the plan, and what pointer and keys mean while the plan is being placed. */
@Component({
  selector: 'app-plan-overlay',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './plan-overlay.html',
  styleUrl: './plan-overlay.scss',
})
export class PlanOverlay {
  protected readonly tool = inject(PlanTool);
  private readonly store = inject(PlanStore);
  private readonly network = inject(NetworkStore);
  private readonly state = inject(DrawingState);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly viewport = input.required<Viewport>();

  private readonly hand = viewChild<ElementRef<HTMLElement>>('hand');

  protected readonly busy = computed(() => this.tool.mode().kind !== 'idle');
  protected readonly words = computed(() =>
    this.tool.mode().kind === 'moving'
      ? 'Moving the plan. Arrows move it by a unit, with Shift by a grid step; Enter leaves it there, Escape puts it back.'
      : 'Two points on the plan. Arrows move the cross, with Shift further; Enter shows a point, Escape ends it.',
  );
  protected readonly points = computed(() => {
    const mode = this.tool.mode();
    return mode.kind === 'measuring' ? mode.points.map((point) => toScreen(point, this.viewport())) : [];
  });
  protected readonly cross = computed(() => {
    const mode = this.tool.mode();
    return mode.kind === 'measuring' && mode.cross !== null ? toScreen(mode.cross, this.viewport()) : null;
  });
  protected readonly bar = computed(() => {
    const metresPerUnit = this.store.plan()?.metresPerUnit;
    if (metresPerUnit === undefined || this.store.shown() === null) return null;
    const units = this.network.units();
    const bar = scaleBar(metresPerUnit, this.viewport().zoom, units.system === 'us' ? FOOT_M : 1);
    if (bar === null) return null;
    return {
      width: bar.width,
      y: this.viewport().height - 14,
      words: formatQuantity(bar.metres, 'length', units, { withUnit: true }),
    };
  });

  constructor() {
    effect((onCleanup) => {
      if (!this.busy()) return;
      const stop = new AbortController();
      untracked(() => this.takePointer(stop.signal));
      onCleanup(() => stop.abort());
    });
    // the keyboard goes to the sheet when pointing begins, not at each point
    const kind = computed(() => this.tool.mode().kind);
    afterRenderEffect(() => {
      if (kind() !== 'idle') untracked(() => this.hand()?.nativeElement.focus());
    });
    inject(DestroyRef).onDestroy(() => this.tool.cancel());
  }

  protected keyDown(event: KeyboardEvent): void {
    if (!this.take(event)) return;
    event.preventDefault();
    event.stopPropagation();
  }

  private take({ key, shiftKey }: KeyboardEvent): boolean {
    const arrow = ARROWS[key];
    if (arrow !== undefined) this.step(arrow, shiftKey);
    else if (key === 'Escape') this.tool.cancel();
    else if (key === 'Enter' || key === ' ') this.confirm();
    else if (key === '+' || key === '-') this.state.zoomAsked.set({ factor: key === '+' ? 1.25 : 0.8 });
    else return false;
    return true;
  }

  private step(arrow: Position, far: boolean): void {
    const mode = this.tool.mode();
    if (mode.kind === 'moving') {
      const by = far ? PLAN_STEP.shift : PLAN_STEP.plain;
      this.tool.moveBy(arrow.x * by, arrow.y * by);
      return;
    }
    const view = this.viewport();
    const from = this.cross() ?? { x: view.width / 2, y: view.height / 2 };
    const by = far ? CROSS_STEP.shift : CROSS_STEP.plain;
    const within = (value: number, most: number) => Math.min(Math.max(value, 0), most);
    const to = { x: within(from.x + arrow.x * by, view.width), y: within(from.y + arrow.y * by, view.height) };
    this.tool.moveCross(toSheet(to, view));
  }

  private confirm(): void {
    const mode = this.tool.mode();
    if (mode.kind === 'moving') {
      this.tool.done();
      this.state.say('The plan lies here now');
      return;
    }
    const view = this.viewport();
    this.show(this.cross() ?? { x: view.width / 2, y: view.height / 2 });
  }

  private show(at: Position): void {
    this.tool.show(toSheet(at, this.viewport()));
    this.state.say(this.tool.measured() === null ? 'First point shown' : 'Second point shown. Give their distance.');
  }

  /** Before the sheet hears of them: a press shows a point or takes the plan along, and selects or draws nothing. */
  private takePointer(signal: AbortSignal): void {
    const surface = this.host.nativeElement.parentElement;
    if (surface === null) return;
    let pressed: Position | null = null;
    let last: Position | null = null;
    const at = ({ clientX, clientY }: MouseEvent): Position => {
      const { left, top } = surface.getBoundingClientRect();
      return { x: clientX - left, y: clientY - top };
    };
    const moving = () => this.tool.mode().kind === 'moving';
    const on = <K extends keyof HTMLElementEventMap>(name: K, act: (event: HTMLElementEventMap[K]) => void): void => {
      const onSheet = (event: HTMLElementEventMap[K]): void => {
        // not what lies on the sheet, such as the overview
        if (event.target instanceof Element && event.target.closest('app-graph-canvas') !== null) act(event);
      };
      surface.addEventListener(name, onSheet, { capture: true, signal });
    };
    on('pointerdown', (event) => {
      event.stopPropagation();
      if (event.button === 0) pressed = last = at(event);
    });
    // the library pans on these two: so it shall while points are shown, but not while the plan goes along
    for (const name of ['mousedown', 'touchstart'] as const) {
      on(name, (event) => {
        if (moving()) event.stopPropagation();
      });
    }
    on('pointermove', (event) => {
      if (last === null || !moving()) return;
      event.stopPropagation();
      const now = at(event);
      const { zoom } = this.viewport();
      this.tool.moveBy((now.x - last.x) / zoom, (now.y - last.y) / zoom);
      last = now;
    });
    on('pointerup', (event) => {
      const now = at(event);
      const still = pressed !== null && Math.hypot(now.x - pressed.x, now.y - pressed.y) < STILL_PX;
      pressed = last = null;
      if (still && !moving()) this.show(now);
    });
    on('pointercancel', () => {
      pressed = last = null;
    });
    on('click', (event) => event.stopPropagation());
  }
}
