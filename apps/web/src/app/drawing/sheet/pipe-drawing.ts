import { inject, Injectable } from '@angular/core';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE, type Mode } from '../drawing-state';
import { findByTag, nearestInDirection } from '../model/navigation';
import { ARROWS } from './walk-keys';

type Piping = Extract<Mode, { kind: 'piping' }>;

/** Drawing a pipe: its ends by arrows, a typed tag or a click, then its fields are asked for. In the drawing page's `providers`. */
@Injectable()
export class PipeDrawing {
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  /** Starts a pipe at a node; without one the first click or tag chooses it. */
  start(from: string | null): void {
    this.state.mode.set({ kind: 'piping', from, to: null, typed: '', pointer: null });
    const words =
      from === null
        ? 'Choose where the pipe starts'
        : `Pipe from ${this.scene.tagOf(from)}: choose its end with the arrows or type its tag`;
    this.state.say(words);
  }

  handle(event: KeyboardEvent, mode: Piping): boolean {
    const network = this.scene.settled();
    const direction = ARROWS[event.key];
    if (direction !== undefined) {
      const start = mode.to ?? mode.from;
      const to = start === null ? undefined : nearestInDirection({ ...network, pipes: new Map() }, start, direction);
      this.chooseEnd(mode, to === mode.from ? undefined : to, '');
      return true;
    }
    switch (event.key) {
      case 'Enter':
        if (mode.from !== null && mode.to !== null) this.ask(mode.from, mode.to);
        else this.state.say('Choose the end of the pipe first');
        return true;
      case 'Escape':
        this.giveUp();
        return true;
      case 'Backspace':
        this.chooseTyped(mode, mode.typed.slice(0, -1));
        return true;
      default:
        if (event.key.length === 1) this.chooseTyped(mode, mode.typed + event.key);
        return true;
    }
  }

  /** Both ends are chosen: the pipe's length and size are asked for. */
  ask(from: string, to: string): void {
    this.state.mode.set(IDLE);
    this.state.draft.set({ kind: 'pipe', from, to });
    this.state.say(`Pipe from ${this.scene.tagOf(from)} to ${this.scene.tagOf(to)}: give its length and size`);
  }

  giveUp(): void {
    this.state.mode.set(IDLE);
    this.state.say('No pipe drawn');
  }

  private chooseTyped(mode: Piping, typed: string): void {
    const nodes = [...this.scene.settled().nodes.values()]
      .filter(({ id }) => id !== mode.from)
      .map(({ node }) => ({ id: node.id, tag: node.tag }));
    this.chooseEnd(mode, findByTag(nodes, typed), typed);
  }

  private chooseEnd(mode: Piping, to: string | undefined, typed: string): void {
    this.state.mode.set({ ...mode, to: to ?? (typed === '' ? mode.to : null), typed });
    if (to !== undefined) this.state.say(`To ${this.scene.tagOf(to)}: Enter makes the pipe`);
    else this.state.say(typed === '' ? 'Nothing that way' : `No tag starts with ${typed}`);
  }
}
