import { ChangeDetectionStrategy, Component, computed, inject, input, untracked } from '@angular/core';
import type { Box } from '@riseback/figures';
import { DrawingScene } from '../drawing-scene';
import { labelObstacles, type SheetLabel } from '../labels/sheet-labels';
import type { Viewport } from '../model/viewport';
import { comparisonMarks, ghosts } from './comparison-marks';
import { ComparisonSign } from './comparison-sign';
import { DrawingComparison } from './drawing-comparison';

/** Over the drawing: what is otherwise than in the revision that it is compared with. The elements themselves say it to a screen reader. */
@Component({
  selector: 'app-comparison-layer',
  imports: [ComparisonSign],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './comparison-layer.html',
  styleUrl: './comparison-layer.scss',
})
export class ComparisonLayer {
  private readonly scene = inject(DrawingScene);
  private readonly comparison = inject(DrawingComparison);

  readonly viewport = input.required<Viewport>();
  /** What stands on the sheet already, and where. */
  readonly labels = input.required<readonly SheetLabel[]>();
  readonly placed = input.required<ReadonlyMap<string, number>>();
  readonly commentMarks = input<readonly { readonly box: Box }[]>([]);

  private readonly zoom = computed(() => this.viewport().zoom);
  protected readonly moved = computed(
    () => `translate(${String(this.viewport().panX)} ${String(this.viewport().panY)})`,
  );
  private readonly subject = computed(() => ({
    changes: this.comparison.changes(),
    gone: this.comparison.gone(),
    earlier: this.comparison.earlier(),
    nodes: this.scene.nodeViews(),
    pipes: this.scene.pipeViews(),
  }));
  private readonly obstacles = computed(() => {
    const laid = this.labels().flatMap(({ key, candidates }) => candidates[this.placed().get(key) ?? -1] ?? []);
    const { nodes, pipes } = this.subject();
    return [
      ...labelObstacles(nodes.values(), pipes.values(), this.scene.gaugeViews().values(), this.zoom()),
      ...laid,
      ...this.commentMarks().map(({ box }) => box),
    ];
  });
  protected readonly marks = computed(() => {
    // as labels do, marks look for their places again at another zoom, and not while the sheet is moved
    const { panX, panY, width, height } = untracked(this.viewport);
    return comparisonMarks(this.subject(), this.zoom(), this.obstacles(), { x: -panX, y: -panY, width, height });
  });
  protected readonly ghosts = computed(() => ghosts(this.subject(), this.zoom()));
}
