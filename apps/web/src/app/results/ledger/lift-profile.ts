import {
  afterNextRender,
  ApplicationRef,
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  type ElementRef,
  inject,
  input,
  linkedSignal,
  signal,
  viewChild,
} from '@angular/core';
import type { Band } from '@riseback/contracts';
import { type DisplayUnits, displayUnit, formatQuantity } from '@riseback/units';
import type { ProfileBand, ProfilePoint } from '@riseback/solver';
import {
  type BackPressureLimit,
  bandWords,
  type PressureRamp,
  type GaugeOnWay,
  type BandMark,
  PROFILE,
  profileFigure,
} from '@riseback/figures';
import { profileRows } from './profile-rows';
import { svgText } from './svg-text';

/** Width on the screen's page, px; on paper, where that leaves the ledger its room; and the least in which its words find room. */
const FULL_WIDTH = 1056;
const PAPER_WIDTH = 1200;
const LEAST_WIDTH = 300;
/** What only a pointer or the keys leave on the figure. */
const TRANSIENT = '.read, .read-line';

let profileCount = 0;

/** Pressure over elevation along the way from a trap to its vessel; pointer or arrow keys read it place by place. */
@Component({
  selector: 'app-lift-profile',
  host: { '(window:beforeprint)': 'drawForPaper()', '(window:afterprint)': 'drawForScreen()' },
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './lift-profile.html',
  styleUrl: './lift-profile.scss',
})
export class LiftProfile {
  /** From the trap down; at least two. */
  readonly points = input.required<readonly ProfilePoint[]>();
  readonly units = input.required<DisplayUnits>();
  readonly ramp = input.required<PressureRamp>();
  readonly trapName = input.required<string>();
  readonly endName = input.required<string>();
  readonly nameOfPipe = input.required<(pipeId: string) => string>();
  /** "1½″", '' where it is not known. */
  readonly sizeOfPipe = input<(pipeId: string) => string>(() => '');
  /** Along the way, one for each point; undefined where they are known at the trap alone. */
  readonly bands = input<readonly ProfileBand[]>();
  readonly gauges = input<readonly GaugeOnWay[]>([]);
  readonly limit = input<BackPressureLimit | null>(null);
  readonly exceeded = input(false);
  readonly spread = input<Band>();
  readonly credible = input<Band>();

  private readonly drawing = viewChild.required<ElementRef<SVGSVGElement>>('drawing');
  private readonly application = inject(ApplicationRef);
  private readonly frame = viewChild.required<ElementRef<HTMLElement>>('frame');

  protected readonly PROFILE = PROFILE;
  protected readonly clipId = `profile-plot-${String(++profileCount)}`;
  /** Drawn as wide as the page gives room, so that its words keep their size on a phone. */
  protected readonly width = signal(FULL_WIDTH);
  /** The place that is read; another way begins at its trap again, unread. */
  protected readonly at = linkedSignal<readonly ProfilePoint[], number | null>({
    source: this.points,
    computation: () => null,
  });

  protected readonly figure = computed(() =>
    profileFigure({
      points: this.points(),
      nameOfPipe: this.nameOfPipe(),
      units: this.units(),
      ramp: this.ramp(),
      limitPa: this.limit()?.pressurePa,
      spread: this.spread(),
      credible: this.credible(),
      bands: this.bands(),
      sizeOf: this.sizeOfPipe(),
      gauges: this.gauges(),
      width: this.width(),
    }),
  );
  protected readonly titles = computed(() => ({
    pressure: displayUnit('pressure', this.units().system),
    length: displayUnit('length', this.units().system),
  }));
  protected readonly ends = computed(() => ({
    start: this.pressureAt(0),
    end: this.pressureAt(-1),
    limit: this.limit() === null ? '' : formatQuantity(this.limit()?.pressurePa ?? 0, 'pressure', this.units()),
  }));
  protected readonly sentence = computed(() => {
    const { length, pressure } = this.titles();
    const { lifts } = this.figure();
    const way = formatQuantity(this.points().at(-1)?.distanceM ?? 0, 'length', this.units());
    const bands = bandWords({ spread: this.spread(), credible: this.credible() }, this.units());
    const risen = lifts.map(({ text }) => text).filter((text) => text !== '');
    return (
      `Lift profile: over ${way} ${length} of way the pressure falls from ${this.ends().start} ${pressure} at ${this.trapName()} ` +
      `to ${this.ends().end} ${pressure} in ${this.endName()}${risen.length === 0 ? '' : `, with ${risen.join(' and ')}`}. ` +
      `${bands === '' ? '' : `${bands} `}The tables below have every number.`
    );
  });
  protected readonly table = computed(() =>
    profileRows({
      points: this.points(),
      bands: this.bands(),
      gauges: this.gauges(),
      nameOfPipe: this.nameOfPipe(),
      sizeOf: this.sizeOfPipe(),
      trapName: this.trapName(),
      endName: this.endName(),
      units: this.units(),
    }),
  );
  /** The classes of pressure as widths, for a print without colour. */
  protected readonly legend = computed(() => {
    const { limits } = this.ramp();
    return ([1, 2, 3, 4, 5, 6, 7] as const).flatMap((pressureClass) => {
      const [low, high] = [limits[pressureClass - 1], limits[pressureClass]];
      if (low === undefined || high === undefined) return [];
      return [{ pressureClass, words: `${printed(low)} to ${printed(high)}` }];
    });
  });
  protected readonly sample = computed(() => {
    const at = this.at();
    return at === null ? null : (this.figure().samples[at] ?? null);
  });

  constructor() {
    const destroyed = inject(DestroyRef);
    afterNextRender(() => {
      const frame = this.frame().nativeElement;
      const observer = new ResizeObserver(() => {
        this.fit();
      });
      observer.observe(frame);
      destroyed.onDestroy(() => {
        observer.disconnect();
      });
    });
  }

  /** The figure as a file of its own. */
  svg(): string {
    return svgText(this.drawing().nativeElement, TRANSIENT);
  }

  /** Paper is as wide as the page is made for, whatever the screen is. */
  protected drawForPaper(): void {
    this.width.set(PAPER_WIDTH);
    this.application.tick();
  }

  protected drawForScreen(): void {
    this.fit();
  }

  protected step(event: Event, to: 'next' | 'before' | 'first' | 'last'): void {
    event.preventDefault();
    const last = this.figure().samples.length - 1;
    const at = this.at();
    switch (to) {
      case 'next':
        this.at.set(at === null ? 0 : Math.min(last, at + 1));
        break;
      case 'before':
        this.at.set(at === null ? last : Math.max(0, at - 1));
        break;
      case 'first':
        this.at.set(0);
        break;
      case 'last':
        this.at.set(last);
    }
  }

  /** The place nearest to the pointer, whatever size the figure is shown in. */
  protected point(event: PointerEvent): void {
    const box = (event.currentTarget as Element).getBoundingClientRect();
    if (box.width === 0) return;
    const { right, samples } = this.figure();
    const x = PROFILE.left + ((event.clientX - box.left) / box.width) * (right - PROFILE.left);
    this.at.set(
      samples.reduce((best, { x: at }, i) => (Math.abs(at - x) < Math.abs((samples[best]?.x ?? 0) - x) ? i : best), 0),
    );
  }

  /** A line with a cap at each end that lies within the plot. */
  protected whisker({ top, bottom, capped }: BandMark): string {
    const cap = (y: number) => `M${PROFILE.left - 5} ${y}h10`;
    return `M${PROFILE.left} ${top}V${bottom}${capped.top ? cap(top) : ''}${capped.bottom ? cap(bottom) : ''}`;
  }

  private fit(): void {
    const { clientWidth } = this.frame().nativeElement;
    // a page that is not shown at all gives no width worth a new drawing
    if (clientWidth > 0) this.width.set(Math.max(LEAST_WIDTH, Math.min(clientWidth, 1.2 * FULL_WIDTH)));
  }

  private pressureAt(index: number): string {
    const point = this.points().at(index);
    return point === undefined ? '' : formatQuantity(point.pressurePa, 'pressure', this.units());
  }
}

function printed(limit: number): string {
  return limit.toLocaleString('en', { maximumFractionDigits: 1 }).replace('-', '−');
}
