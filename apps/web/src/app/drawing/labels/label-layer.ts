import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { lasting } from '../../shared/lasting';
import type { Viewport } from '../model/viewport';
import { LINE_HEIGHT, type LabelLine, type LabelPlace, type SheetLabel } from './sheet-labels';

interface LaidLine extends LabelLine {
  readonly x: number;
  readonly y: number;
  readonly anchor: LabelPlace['align'];
  /** Left edge of the status shape; null where none stands. */
  readonly markX: number | null;
}
interface LaidLabel {
  readonly key: string;
  readonly lines: readonly LaidLine[];
}

const MARK = 15;
const BASELINE = 11;
/** Most solves are over sooner; turning grey and back all labels would be painted twice, and the new pressures wait for it. */
const GREY_AFTER_MS = 200;

/** The labels over the sheet, in pixels of the screen whatever the zoom. The same words are in the elements' names, so readers skip it. */
@Component({
  selector: 'app-label-layer',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true', '[class.stale]': 'grey()' },
  templateUrl: './label-layer.html',
  styleUrl: './label-layer.scss',
})
export class LabelLayer {
  readonly labels = input.required<readonly SheetLabel[]>();
  /** The candidate that each label took, by key. */
  readonly placed = input.required<ReadonlyMap<string, number>>();
  readonly viewport = input.required<Viewport>();
  readonly chosen = input<ReadonlySet<string>>(new Set());
  /** Values wait for a solve. */
  readonly stale = input(false);
  protected readonly grey = lasting(this.stale, GREY_AFTER_MS);

  protected readonly laid = computed((): LaidLabel[] =>
    this.labels().flatMap((label) => {
      const place = label.candidates[this.placed().get(label.key) ?? -1];
      return place === undefined
        ? []
        : [{ key: label.key, lines: label.lines.map((line, i) => laidLine(line, i, place)) }];
    }),
  );
  protected readonly moved = computed(() => {
    const { panX, panY } = this.viewport();
    return `translate(${panX} ${panY})`;
  });
}

function laidLine(line: LabelLine, index: number, { x, y, width, align }: LabelPlace): LaidLine {
  const mark = line.concern === null ? 0 : MARK;
  const anchorX = align === 'start' ? x : align === 'end' ? x + width : x + width / 2;
  const textWidth = line.text.length * 7.3;
  const textX = align === 'start' ? anchorX + mark : align === 'middle' ? anchorX + mark / 2 : anchorX;
  const left = align === 'start' ? x : align === 'middle' ? textX - textWidth / 2 - mark : textX - textWidth - mark;
  return {
    ...line,
    x: textX,
    y: y + index * LINE_HEIGHT + BASELINE,
    anchor: align,
    markX: line.concern === null ? null : left,
  };
}
