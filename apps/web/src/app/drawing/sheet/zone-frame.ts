import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { FIELD, rowLetter, type Sheet } from '@riseback/figures';
import type { Viewport } from '../model/viewport';

interface Mark {
  readonly at: number;
  readonly text: string;
}

/** The width of the strip that holds letters and numbers, px. */
export const FRAME_STRIP = 18;
const ROOM_FOR_TEXT = 10;

/** The edge of the drawing sheet: numbers along, letters down, moving with the paper. A picture for pointing at; zones are named in words. */
@Component({
  selector: 'app-zone-frame',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  template: `
    <svg width="100%" height="100%" focusable="false">
      <rect
        class="frame"
        [attr.x]="strip"
        [attr.y]="strip"
        [attr.width]="viewport().width"
        [attr.height]="viewport().height"
      />
      @for (x of ticks().x; track x) {
        <path [attr.d]="'M' + x + ' 4V' + strip + 'M' + x + ' ' + (viewport().height + strip) + 'v14'" />
      }
      @for (y of ticks().y; track y) {
        <path [attr.d]="'M4 ' + y + 'H' + strip + 'M' + (viewport().width + strip) + ' ' + y + 'h14'" />
      }
      @for (mark of columns(); track mark.text) {
        <text [attr.x]="mark.at" y="12">{{ mark.text }}</text>
        <text [attr.x]="mark.at" [attr.y]="viewport().height + strip + 13">{{ mark.text }}</text>
      }
      @for (mark of rows(); track mark.text) {
        <text x="9" [attr.y]="mark.at + 4">{{ mark.text }}</text>
        <text [attr.x]="viewport().width + strip + 9" [attr.y]="mark.at + 4">{{ mark.text }}</text>
      }
    </svg>
  `,
  styles: `
    :host {
      position: absolute;
      inset: 0;
      pointer-events: none;
    }
    .frame {
      fill: none;
      stroke: var(--rb-ink);
      stroke-width: 1.5;
    }
    path {
      stroke: var(--rb-rule-strong);
    }
    text {
      fill: var(--rb-ink-2);
      font:
        400 11px/14px Inter,
        sans-serif;
      text-anchor: middle;
    }
  `,
})
export class ZoneFrame {
  readonly sheet = input.required<Sheet>();
  readonly viewport = input.required<Viewport>();

  protected readonly strip = FRAME_STRIP;
  protected readonly ticks = computed(() => {
    const { left, top, columns, rows } = this.sheet();
    const { zoom, panX, panY, width, height } = this.viewport();
    const edges = (count: number, start: number, step: number, pan: number, room: number) =>
      Array.from({ length: count + 1 }, (_, i) => (start + i * step) * zoom + pan)
        .filter((at) => at > 0 && at < room)
        .map((at) => at + FRAME_STRIP);
    return { x: edges(columns, left, FIELD.width, panX, width), y: edges(rows, top, FIELD.height, panY, height) };
  });
  protected readonly columns = computed((): Mark[] => {
    const { left, columns } = this.sheet();
    const { zoom, panX, width } = this.viewport();
    return marks(columns, left, FIELD.width, zoom, panX, width, (i) => String(i + 1));
  });
  protected readonly rows = computed((): Mark[] => {
    const { top, rows } = this.sheet();
    const { zoom, panY, height } = this.viewport();
    return marks(rows, top, FIELD.height, zoom, panY, height, rowLetter);
  });
}

/** A field's name in the middle of what is seen of it. */
function marks(
  count: number,
  start: number,
  step: number,
  zoom: number,
  pan: number,
  room: number,
  name: (index: number) => string,
): Mark[] {
  return Array.from({ length: count }, (_, i) => {
    const low = Math.max(0, (start + i * step) * zoom + pan);
    const high = Math.min(room, (start + (i + 1) * step) * zoom + pan);
    return { text: name(i), at: (low + high) / 2 + FRAME_STRIP, seen: high - low };
  }).filter(({ seen }) => seen >= ROOM_FOR_TEXT);
}
