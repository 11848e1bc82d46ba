import { computed, inject, Injectable } from '@angular/core';
import type { Position } from '@riseback/network';
import { DrawingCommands } from './drawing-commands';
import { DrawingScene } from './drawing-scene';
import { DrawingState } from './drawing-state';
import { aligned, type Alignment, distributed, type Distribution, stackedBy } from './model/arrange';
import { nodesTo } from './model/displacement';

/** Where an alignment puts things, as it is said. */
const LINE_WORDS: Readonly<Record<Alignment, string>> = {
  left: 'the leftmost',
  centre: 'the middle column',
  right: 'the rightmost',
  top: 'the topmost',
  middle: 'the middle row',
  bottom: 'the lowest',
};

/** Aligns and distributes the selected elements, each as one step of undo; nothing is ever stacked. In the drawing page's `providers`. */
@Injectable()
export class NodeArranging {
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);

  /** Selected elements that have a place of their own; pipes follow. */
  readonly nodeIds = computed(() => [...this.state.selection()].filter((id) => this.scene.settled().nodes.has(id)));
  readonly canAlign = computed(() => this.nodeIds().length >= 2);
  readonly canDistribute = computed(() => this.nodeIds().length >= 3);

  align(alignment: Alignment): void {
    if (!this.canAlign()) {
      this.state.say('Select two elements or more to align them');
      return;
    }
    const moved = aligned(this.scene.settled(), this.nodeIds(), alignment);
    this.put(moved, `${String(this.nodeIds().length)} elements aligned to ${LINE_WORDS[alignment]}`);
  }

  distribute(along: Distribution): void {
    if (!this.canDistribute()) {
      this.state.say('Select three elements or more to distribute them');
      return;
    }
    const moved = distributed(this.scene.settled(), this.nodeIds(), along);
    this.put(moved, `${String(this.nodeIds().length)} elements distributed ${along}`);
  }

  private put(moved: ReadonlyMap<string, Position>, label: string): void {
    const network = this.scene.settled();
    const stacked = stackedBy(network, moved);
    if (moved.size === 0) this.state.say('They stand like that already');
    else if (stacked === undefined) this.commands.lay(nodesTo(network, moved), label);
    else {
      const [a, b] = stacked.map((id) => this.scene.tagOf(id));
      this.state.say(`Nothing moved: ${a ?? ''} would lie on ${b ?? ''}`);
    }
    this.state.focusOn(this.state.focusId());
  }
}
