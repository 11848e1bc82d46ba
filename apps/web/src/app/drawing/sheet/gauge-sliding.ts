import { inject, Injectable } from '@angular/core';
import { formatQuantity } from '@riseback/units';
import { NetworkStore } from '../../networks/network-store';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE, type Mode } from '../drawing-state';

type Sliding = Extract<Mode, { kind: 'sliding' }>;

/** One step along a pipe; ten with Shift. A tape measure in the plant is read to about this. */
const STEP_M = { us: 0.3048, si: 0.25 } as const;
const TOWARDS_END = new Set(['ArrowRight', 'ArrowDown']);
const TOWARDS_START = new Set(['ArrowLeft', 'ArrowUp']);

/** Moves a gauge along its pipe by keys: arrows move, Enter sets down as one step of undo, Escape puts back. In the drawing page's `providers`. */
@Injectable()
export class GaugeSliding {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);

  start(id: string): void {
    const gauge = this.scene.gauges().get(id)?.gauge;
    if (gauge?.pipe === undefined) {
      this.state.say(`${this.scene.tagOf(id)} stands at an element and goes where that goes; its fields say which`);
      return;
    }
    this.state.select(id);
    this.state.mode.set({ kind: 'sliding', id, distanceM: gauge.distanceM ?? 0 });
    this.state.say(
      `Moving ${this.scene.tagOf(id)} along its pipe: right and down towards its end, left and up towards its start; Enter sets down, Escape puts back`,
    );
  }

  handle(event: KeyboardEvent, mode: Sliding): boolean {
    if (TOWARDS_END.has(event.key)) this.shift(mode, event.shiftKey ? 10 : 1);
    else if (TOWARDS_START.has(event.key)) this.shift(mode, event.shiftKey ? -10 : -1);
    else if (event.key === 'Enter') this.setDown(mode);
    else if (event.key === 'Escape') {
      this.state.mode.set(IDLE);
      this.state.say('Put back');
    }
    return true;
  }

  private shift(mode: Sliding, steps: number): void {
    const gauge = this.scene.gauges().get(mode.id)?.gauge;
    const lengthM = this.store.document()?.pipes.get(gauge?.pipe ?? '')?.value.lengthM ?? 0;
    const units = this.store.units();
    const wanted = mode.distanceM + steps * STEP_M[units.system];
    const distanceM = Math.min(lengthM, Math.max(0, wanted));
    this.state.mode.set({ ...mode, distanceM });
    this.state.say(`${formatQuantity(distanceM, 'length', units, { withUnit: true })} from its start`);
  }

  private setDown({ id, distanceM }: Sliding): void {
    this.state.mode.set(IDLE);
    const moved = this.commands.set(id, 'distanceM', distanceM, 'place');
    this.state.say(moved ? `${this.scene.tagOf(id)} set down` : `Not possible: ${this.store.lastRefusal().join(' ')}`);
  }
}
