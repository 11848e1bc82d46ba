import { inject, Injectable } from '@angular/core';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import {
  type Direction,
  downstreamOf,
  endOfWalk,
  nearestInDirection,
  nextEntering,
  trapAbove,
  upstreamOf,
} from '../model/navigation';

export const ARROWS: Readonly<Record<string, Direction>> = {
  ArrowLeft: 'left',
  ArrowRight: 'right',
  ArrowUp: 'up',
  ArrowDown: 'down',
};
export const STEPS: Readonly<Record<Direction, readonly [number, number]>> = {
  left: [-1, 0],
  right: [1, 0],
  up: [0, -1],
  down: [0, 1],
};

/** Keys that go from element to element: by direction, with and against the flow, to the ends of a walk. In the drawing page's `providers`. */
@Injectable()
export class WalkKeys {
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  handle(event: KeyboardEvent): boolean {
    const next = this.nextFocus(event);
    if (next === null) return false;
    if (next === undefined) {
      this.state.say('Nothing that way');
      return true;
    }
    const before = this.scene.tabStop();
    if (event.shiftKey && event.key in ARROWS) {
      this.state.selection.update((selected) => new Set([...selected, ...(before === null ? [] : [before]), next]));
    }
    this.state.focusOn(next);
    return true;
  }

  /** Undefined when there is nothing there, null when the key is no walk. */
  private nextFocus(event: KeyboardEvent): string | undefined | null {
    const network = this.scene.walked();
    const here = this.scene.tabStop() ?? undefined;
    const { reversed } = this.scene;
    const direction = ARROWS[event.key];
    if (direction !== undefined) return here === undefined ? undefined : nearestInDirection(network, here, direction);
    switch (event.key) {
      case 'PageDown':
        return here === undefined ? undefined : downstreamOf(network, here, reversed);
      case 'PageUp':
        if (here === undefined) return undefined;
        return event.shiftKey ? nextEntering(network, here, reversed) : upstreamOf(network, here, reversed);
      case 'End':
        return endOfWalk(network, here, reversed);
      case 'Home': {
        const last = this.state.lastTrapId();
        return last !== null && last !== here && network.nodes.has(last) ? last : trapAbove(network, here, reversed);
      }
      default:
        return null;
    }
  }
}
