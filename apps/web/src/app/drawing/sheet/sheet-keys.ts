import { inject, Injectable } from '@angular/core';
import type { NodeKind } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE, type Mode } from '../drawing-state';
import { movableBends, shiftBend, shiftNodes } from '../model/displacement';
import { NOTHING_DISPLACED } from '../model/drawn-network';
import { isPipe, KIND_WORDS, nameOf } from '../../shared/element-words';
import {
  type Direction,
  downstreamOf,
  endOfWalk,
  findByTag,
  nearestInDirection,
  nextEntering,
  trapAbove,
  upstreamOf,
} from '../model/navigation';
import { GRID } from '../../shared/placement';
import { DeletePrompt } from './delete-prompt';
import { NodePlacing } from './node-placing';

const ARROWS: Readonly<Record<string, Direction>> = {
  ArrowLeft: 'left',
  ArrowRight: 'right',
  ArrowUp: 'up',
  ArrowDown: 'down',
};
const STEPS: Readonly<Record<Direction, readonly [number, number]>> = {
  left: [-1, 0],
  right: [1, 0],
  up: [0, -1],
  down: [0, 1],
};
export const PLACE_KEYS: Readonly<Record<string, NodeKind>> = {
  t: 'trap',
  j: 'junction',
  r: 'receiver',
  v: 'flashVessel',
  u: 'pumpedInlet',
};

/** What zooms the view; the sheet is one. */
export interface Zoomable {
  zoomBy(factor: number): void;
  fit(): void;
}

/** The keyboard model of the drawing (`KeyList` says it to people): each key does one thing and says what it did. */
@Injectable()
export class SheetKeys {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);
  private readonly deletePrompt = inject(DeletePrompt);
  private readonly placing = inject(NodePlacing);

  /** True when the key meant something here. Tab never does: it always leaves. */
  handle(event: KeyboardEvent, view: Zoomable): boolean {
    if (event.key === 'Tab' || event.altKey) return false;
    if (event.ctrlKey || event.metaKey) return this.chord(event);
    const mode = this.state.mode();
    switch (mode.kind) {
      case 'piping':
        return this.pipingKey(event, mode);
      case 'moving':
        return this.movingKey(event, mode);
      case 'placing':
      case 'idle':
        return this.walkKey(event) || this.selectKey(event) || this.letterKey(event, view);
    }
  }

  /** Starts a pipe at a node, by key or from the tray; without a node the first click or tag chooses it. */
  startPipe(from: string | null): void {
    this.state.mode.set({ kind: 'piping', from, to: null, typed: '', pointer: null });
    const start =
      from === null
        ? 'Choose where the pipe starts'
        : `Pipe from ${this.tagOf(from)}: choose its end with the arrows or type its tag`;
    this.state.say(start);
  }

  private chord(event: KeyboardEvent): boolean {
    const key = event.key.toLowerCase();
    if (key === 'a') {
      const { nodes, pipes } = this.scene.settled();
      this.state.select(...nodes.keys(), ...pipes.keys());
      this.state.say(`${String(nodes.size + pipes.size)} elements selected`);
      return true;
    }
    if (!this.store.mayDraw()) return false;
    if (key === 'z' && !event.shiftKey) this.commands.undo();
    else if (key === 'y' || key === 'z') this.commands.redo();
    else return false;
    return true;
  }

  private walkKey(event: KeyboardEvent): boolean {
    const next = this.nextFocus(event);
    if (next === null) return false;
    if (next === undefined) {
      this.state.say('Nothing that way');
      return true;
    }
    const before = this.focused();
    if (event.shiftKey && event.key in ARROWS) {
      this.state.selection.update(
        (selected) => new Set([...selected, ...(before === undefined ? [] : [before]), next]),
      );
    }
    this.state.focusOn(next);
    return true;
  }

  /** Undefined when there is nothing there, null when the key is no walk. */
  private nextFocus(event: KeyboardEvent): string | undefined | null {
    const network = this.scene.settled();
    const here = this.focused();
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

  private selectKey(event: KeyboardEvent): boolean {
    const here = this.focused();
    switch (event.key) {
      case ' ':
        if (here === undefined) return true;
        if (this.state.selection().has(here) && this.state.selection().size === 1) this.state.select();
        else this.state.select(here);
        this.state.say(`${this.tagOf(here)} ${this.state.selection().has(here) ? 'selected' : 'no longer selected'}`);
        return true;
      case 'Enter':
        if (here === undefined) return true;
        this.state.select(here);
        this.state.openFields();
        return true;
      case 'Escape':
        this.escape();
        return true;
      default:
        return false;
    }
  }

  private escape(): void {
    if (this.state.mode().kind !== 'idle') {
      this.state.mode.set(IDLE);
      this.state.say('Left off');
    } else if (this.state.selection().size > 0) {
      this.state.select();
      this.state.say('Selection cleared');
    }
  }

  private letterKey(event: KeyboardEvent, view: Zoomable): boolean {
    const may = this.store.mayDraw();
    if (may && (event.key === 'Delete' || event.key === 'Backspace')) {
      void this.deletePrompt.ask(this.actedOn());
      return true;
    }
    if (may && event.key === 'Insert') {
      this.state.menuAsked.update((count) => count + 1);
      return true;
    }
    if (!this.state.lettersAct()) return false;
    switch (event.key) {
      case '+':
      case '=':
        view.zoomBy(1.25);
        return true;
      case '-':
        view.zoomBy(0.8);
        return true;
      case '0':
        view.fit();
        return true;
      case '/':
        this.state.tagAsked.update((count) => count + 1);
        return true;
      case '?':
        this.state.keysAsked.update((count) => count + 1);
        return true;
      default:
        return may && this.drawLetter(event.key.toLowerCase());
    }
  }

  private drawLetter(letter: string): boolean {
    const kind = PLACE_KEYS[letter];
    const here = this.focused();
    if (kind !== undefined) {
      this.placing.besideFocus(kind);
      return true;
    }
    if (letter === 'p') {
      const onNode = here !== undefined && this.scene.settled().nodes.has(here);
      if (onNode) this.startPipe(here);
      else this.state.say('Go to the element that the pipe starts from first');
      return true;
    }
    if (letter === 'm' && here !== undefined) {
      this.startMove(here);
      return true;
    }
    return false;
  }

  private startMove(here: string): void {
    const { pipes } = this.scene.settled();
    const selected = this.state.selection();
    const ids = selected.has(here) ? [...selected] : [here];
    const onBend = pipes.has(here) && ids.length === 1;
    this.state.mode.set({ kind: 'moving', ids, bend: onBend ? 0 : -1, dx: 0, dy: 0 });
    this.state.say(
      onBend
        ? `Moving bend 1 of ${this.tagOf(here)}; comma and full stop choose another, Enter sets it down`
        : `Moving ${ids.length === 1 ? this.tagOf(here) : `${String(ids.length)} elements`}; Enter sets down, Escape puts back`,
    );
  }

  private movingKey(event: KeyboardEvent, mode: Extract<Mode, { kind: 'moving' }>): boolean {
    const direction = ARROWS[event.key];
    if (direction !== undefined) {
      const [x, y] = STEPS[direction];
      const step = GRID * (event.shiftKey ? 10 : 1);
      this.displace({ ...mode, dx: mode.dx + x * step, dy: mode.dy + y * step });
      this.state.say(`${direction} ${String(step / GRID)}`);
      return true;
    }
    switch (event.key) {
      case 'Enter':
        this.commands.settle();
        return true;
      case 'Escape':
        this.state.displaced.set(NOTHING_DISPLACED);
        this.state.mode.set(IDLE);
        this.state.say('Put back');
        return true;
      case ',':
      case '.':
        return this.otherBend(mode, event.key === ',' ? -1 : 1);
      default:
        return true;
    }
  }

  private displace(mode: Extract<Mode, { kind: 'moving' }>): void {
    const network = this.scene.settled();
    const pipe = mode.bend < 0 ? undefined : network.pipes.get(mode.ids[0] ?? '');
    this.state.mode.set(mode);
    this.state.displaced.set(
      pipe === undefined
        ? shiftNodes(network, mode.ids, mode.dx, mode.dy)
        : shiftBend(pipe, mode.bend, mode.dx, mode.dy),
    );
  }

  private otherBend(mode: Extract<Mode, { kind: 'moving' }>, step: number): boolean {
    const pipe = this.scene.settled().pipes.get(mode.ids[0] ?? '');
    if (mode.bend < 0 || pipe === undefined) return true;
    const count = movableBends(pipe).length;
    const bend = (mode.bend + step + count) % count;
    this.displace({ ...mode, bend, dx: 0, dy: 0 });
    this.state.say(`Bend ${String(bend + 1)} of ${String(count)}`);
    return true;
  }

  private pipingKey(event: KeyboardEvent, mode: Extract<Mode, { kind: 'piping' }>): boolean {
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
        if (mode.from !== null && mode.to !== null) this.askPipe(mode.from, mode.to);
        else this.state.say('Choose the end of the pipe first');
        return true;
      case 'Escape':
        this.state.mode.set(IDLE);
        this.state.say('No pipe drawn');
        return true;
      case 'Backspace':
        this.chooseTyped(mode, mode.typed.slice(0, -1));
        return true;
      default:
        if (event.key.length === 1) this.chooseTyped(mode, mode.typed + event.key);
        return true;
    }
  }

  private chooseTyped(mode: Extract<Mode, { kind: 'piping' }>, typed: string): void {
    const nodes = [...this.scene.settled().nodes.values()]
      .filter(({ id }) => id !== mode.from)
      .map(({ node }) => ({ id: node.id, tag: node.tag }));
    this.chooseEnd(mode, findByTag(nodes, typed), typed);
  }

  private chooseEnd(mode: Extract<Mode, { kind: 'piping' }>, to: string | undefined, typed: string): void {
    this.state.mode.set({ ...mode, to: to ?? (typed === '' ? mode.to : null), typed });
    if (to !== undefined) this.state.say(`To ${this.tagOf(to)}: Enter makes the pipe`);
    else this.state.say(typed === '' ? 'Nothing that way' : `No tag starts with ${typed}`);
  }

  /** Both ends are chosen: the pipe's length and size are asked for. */
  askPipe(from: string, to: string): void {
    this.state.mode.set(IDLE);
    this.state.draft.set({ kind: 'pipe', from, to });
    this.state.say(`Pipe from ${this.tagOf(from)} to ${this.tagOf(to)}: give its length and size`);
  }

  private focused(): string | undefined {
    return this.scene.tabStop() ?? undefined;
  }

  /** The selection, or the element with the keyboard where nothing is selected. */
  private actedOn(): ReadonlySet<string> {
    const selected = this.state.selection();
    const here = this.focused();
    return selected.size > 0 || here === undefined ? selected : new Set([here]);
  }

  private tagOf(id: string): string {
    const { nodes, pipes } = this.scene.settled();
    const element = nodes.get(id)?.node ?? pipes.get(id)?.pipe;
    if (element === undefined) return id;
    return isPipe(element)
      ? `pipe ${nameOf(element)}`
      : element.tag === undefined
        ? `${KIND_WORDS[element.kind]} ${element.id}`
        : element.tag;
  }
}
