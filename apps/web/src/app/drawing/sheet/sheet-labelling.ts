import { computed, inject, Injectable, linkedSignal, type Signal, signal, untracked } from '@angular/core';
import { CommentStore } from '../../comments/comment-store';
import { Company } from '../../networks/company';
import { NetworkStore } from '../../networks/network-store';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { type Box, placeLabels, areaOutlines } from '@riseback/figures';
import { labelObstacles, type SheetLabel, sheetLabels } from '../labels/sheet-labels';
import type { Viewport } from '../model/viewport';
import { commentMarks } from './comment-marks';
import { companyOutlines } from './company-outlines';

interface LabelSubject {
  readonly labels: readonly SheetLabel[];
  readonly obstacles: readonly Box[];
  readonly zoom: number;
}

const NOWHERE: Viewport = { zoom: 1, panX: 0, panY: 0, width: 0, height: 0 };

/** Which labels the sheet shows and where each finds room. In the sheet's `providers`. */
@Injectable()
export class SheetLabelling {
  private readonly store = inject(NetworkStore);
  private readonly state = inject(DrawingState);
  private readonly scene = inject(DrawingScene);
  private readonly others = inject(Company);
  private readonly comments = inject(CommentStore);

  private readonly followed = signal<Signal<Viewport> | null>(null);
  private readonly viewport = computed(() => this.followed()?.() ?? NOWHERE);
  private readonly zoom = computed(() => this.viewport().zoom);
  /** What is seen of the sheet, in the pixels that labels are placed in. */
  private readonly seen = computed(() => {
    const { panX, panY, width, height } = this.viewport();
    return { x: -panX, y: -panY, width, height };
  });

  /** The element under the pointer. */
  readonly hovered = signal<string | null>(null);
  private readonly pointedAt = computed(
    () => new Set([this.hovered(), this.state.focusId()].flatMap((id) => (id === null ? [] : [id]))),
  );
  readonly areas = computed(() => areaOutlines(this.scene.network()));
  readonly labels = computed(() =>
    sheetLabels(
      {
        nodes: this.scene.nodeViews().values(),
        pipes: this.scene.pipeViews().values(),
        gauges: this.scene.gaugeViews().values(),
        areas: this.areas(),
        selected: this.state.selection(),
        pointedAt: this.pointedAt(),
      },
      this.zoom(),
      this.scene.scale().kind,
      this.store.units(),
    ),
  );
  /** What others have selected. */
  readonly company = computed(() =>
    companyOutlines(
      this.others.selecting(),
      { nodes: this.scene.nodeViews(), pipes: this.scene.pipeViews() },
      this.zoom(),
    ),
  );
  /** Where comments are open. */
  readonly commentMarks = computed(() => {
    const numbers = this.comments.numbers();
    const at = [...this.comments.openAt()].map(
      ([elementId, threads]) => [elementId, threads.map(({ id }) => numbers.get(id) ?? 0)] as const,
    );
    return commentMarks(new Map(at), { nodes: this.scene.nodeViews(), pipes: this.scene.pipeViews() }, this.zoom());
  });
  private readonly obstacles = computed(() => [
    ...labelObstacles(
      this.scene.nodeViews().values(),
      this.scene.pipeViews().values(),
      this.scene.gaugeViews().values(),
      this.zoom(),
    ),
    ...this.company().map(({ tag }) => tag),
    ...this.commentMarks().map(({ box }) => box),
  ]);
  /** The candidate that each label took, by key. */
  readonly placed = linkedSignal<LabelSubject, ReadonlyMap<string, number>>({
    source: () => ({ labels: this.labels(), obstacles: this.obstacles(), zoom: this.zoom() }),
    // at another zoom there is other room, so only there do labels look for their best place again
    computation: ({ labels, obstacles, zoom }, before) =>
      before?.source.zoom === zoom
        ? placeLabels(labels, obstacles, before.value)
        : placeLabels(labels, obstacles, undefined, untracked(this.seen)),
  });

  /** The window that the labels are for. */
  follow(viewport: Signal<Viewport>): void {
    this.followed.set(viewport);
  }
}
