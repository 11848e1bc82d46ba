import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { niceTicks } from '@riseback/figures';
import type { ExpectedReading } from './field-sheet';
import { expectedWords } from './reading-words';
import { dialText, type DialUnit, inDialUnit } from './typed-reading';

const WIDTH = 348;
const TUBE = { top: 22, height: 20 } as const;
const MOST_STEPS = 5;
/** A number that stands nearer than this to an end leans inwards. */
const LEANS_WITHIN = 10;

/** A lying staff: the band within which the reading agrees, and the reading on it. */
@Component({
  selector: 'app-expected-staff',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <p>
      <span>{{ words() }} {{ unit() }}</span>
      <span class="read">{{ readText() }} read</span>
    </p>
    <svg role="img" [attr.viewBox]="'-2 14 ' + (WIDTH + 4) + ' 46'" [attr.aria-label]="sentence()">
      <rect class="tube" x="0" [attr.y]="TUBE.top" [attr.width]="WIDTH" [attr.height]="TUBE.height" />
      @if (figure().band; as band) {
        <rect
          class="band"
          [attr.x]="band.x"
          [attr.y]="TUBE.top"
          [attr.width]="band.width"
          [attr.height]="TUBE.height"
        />
      }
      <path class="expected" [attr.d]="'M' + figure().expected + ' ' + TUBE.top + 'v' + TUBE.height" />
      @for (tick of figure().ticks; track tick.x) {
        <path class="tick" [attr.d]="'M' + tick.x + ' ' + (TUBE.top + TUBE.height) + 'v5'" />
        <text [attr.x]="tick.x" y="58" [attr.text-anchor]="tick.anchor">{{ tick.text }}</text>
      }
      <path
        class="needle"
        [attr.d]="'M' + figure().read + ' ' + (TUBE.top + TUBE.height) + 'V' + (TUBE.top - 1) + 'l-6 -7h12l-6 7'"
      />
    </svg>
  `,
  styleUrl: './expected-staff.scss',
})
export class ExpectedStaff {
  readonly expected = input.required<ExpectedReading>();
  readonly valuePa = input.required<number>();
  readonly unit = input.required<DialUnit>();

  protected readonly WIDTH = WIDTH;
  protected readonly TUBE = TUBE;
  protected readonly words = computed(() => expectedWords(this.expected(), this.unit()));
  protected readonly readText = computed(() => dialText(this.valuePa(), this.unit()));
  protected readonly sentence = computed(() => `${this.words()}, read ${this.readText()} ${this.unit()}`);
  protected readonly figure = computed(() => {
    const unit = this.unit();
    const { dialPa, abovePa, belowPa } = this.expected();
    const [expected, read] = [inDialUnit(dialPa, unit), inDialUnit(this.valuePa(), unit)];
    const low = inDialUnit(dialPa - (belowPa ?? 0), unit);
    const high = inDialUnit(dialPa + (abovePa ?? 0), unit);
    const ticks = niceTicks(Math.min(0, low, read), Math.max(high, read), MOST_STEPS);
    const [from = 0, to = 1] = [ticks[0], ticks.at(-1)];
    const x = (value: number) => ((value - from) / (to - from)) * WIDTH;
    return {
      expected: x(expected),
      read: x(read),
      band: abovePa === undefined ? null : { x: x(low), width: x(high) - x(low) },
      ticks: ticks.map((tick) => ({
        x: x(tick),
        text: String(tick).replace('-', '−'),
        anchor: x(tick) < LEANS_WITHIN ? 'start' : x(tick) > WIDTH - LEANS_WITHIN ? 'end' : 'middle',
      })),
    };
  });
}
