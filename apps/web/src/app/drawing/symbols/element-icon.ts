import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { NodeKind, TrapType } from '@riseback/network';
import { gaugeSymbol } from '@riseback/figures';
import { NodeSymbol } from './node-symbol';

const FRAMES: Readonly<Record<NodeKind | 'pipe' | 'gauge', string>> = {
  trap: '-12 -12 24 24',
  junction: '-12 -12 24 24',
  pumpedInlet: '-12 -12 24 24',
  receiver: '-34 -30 68 60',
  flashVessel: '-39 -39 78 78',
  pipe: '-12 -12 24 24',
  gauge: '-15 -29 30 31',
};
const GAUGE = gaugeSymbol({ x: 0, y: -1 }, 0);

/** An element's symbol as an icon beside its name; the name says what it is, so it is hidden from readers. */
@Component({
  selector: 'app-element-icon',
  imports: [NodeSymbol],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  template: `
    <svg [attr.viewBox]="frame()" [attr.width]="size()" [attr.height]="size()" focusable="false">
      @if (node(); as kind) {
        @if (kind === 'junction') {
          <path class="run" d="M-11 0H11M0 0V9" />
        }
        <g appNodeSymbol [kind]="kind" [trapType]="trapType()" [vented]="vented()"></g>
      } @else if (kind() === 'gauge') {
        @for (part of gauge; track $index) {
          <path [class]="part.look" [attr.d]="part.d" />
        }
      } @else {
        <path class="run" d="M-10 6H0V-6H10" />
      }
    </svg>
  `,
  styleUrl: './node-symbol.scss',
  styles: `
    :host {
      display: inline-flex;
      flex: none;
    }
    .run {
      fill: none;
      stroke: var(--rb-ink);
      stroke-width: 1.8;
    }
  `,
})
export class ElementIcon {
  readonly kind = input.required<NodeKind | 'pipe' | 'gauge'>();
  readonly trapType = input<TrapType>();
  readonly vented = input(false);
  readonly size = input(20);

  protected readonly gauge = GAUGE;
  protected readonly frame = computed(() => FRAMES[this.kind()]);
  protected readonly node = computed(() => {
    const kind = this.kind();
    return kind === 'pipe' || kind === 'gauge' ? null : kind;
  });
}
