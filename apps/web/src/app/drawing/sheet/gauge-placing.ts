import { computed, inject, Injectable } from '@angular/core';
import type { Position } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE } from '../drawing-state';
import { shareNearest } from '../model/drawn-gauges';

/** Puts a new gauge on an element and asks for its fields; it joins the network when they are given. In the drawing page's `providers`. */
@Injectable()
export class GaugePlacing {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  /** Whoever reads gauges may place them too, without being allowed to draw. */
  readonly may = computed(() => this.store.may('readings'));

  /** On the element with the keyboard; beside another gauge where that has it. */
  onFocus(): void {
    const here = this.scene.tabStop();
    if (here === null) this.state.say('Go to the element or pipe that the gauge taps first');
    else this.on(here);
  }

  /** @param place where a pipe was pointed at; without one, half-way along it */
  on(id: string, place: Position | null = null): void {
    this.state.mode.set(IDLE);
    const { nodes, pipes } = this.scene.settled();
    const gauge = this.scene.gauges().get(id)?.gauge;
    const pipe = pipes.get(gauge?.pipe ?? id);
    const node = gauge?.node ?? id;
    if (pipe !== undefined) {
      const share = place === null ? 0.5 : shareNearest(pipe.points, place);
      this.state.gaugeDraft.set({ pipe: pipe.id, distanceM: share * pipe.pipe.lengthM });
    } else if (nodes.has(node)) {
      this.state.gaugeDraft.set({ node });
    } else return;
    this.state.say(`New gauge on ${this.scene.tagOf(pipe?.id ?? node)}: give its tag and what stands on its dial`);
  }

  /** With the mouse: the element is clicked next. */
  awaitClick(): void {
    const again = this.state.mode().kind === 'tapping';
    this.state.mode.set(again ? IDLE : { kind: 'tapping' });
    if (!again) this.state.say('Click the element or pipe that the gauge taps');
  }
}
