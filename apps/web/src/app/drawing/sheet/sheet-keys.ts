import { inject, Injectable } from '@angular/core';
import type { NodeKind } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { DrawingClipboard } from '../drawing-clipboard';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE } from '../drawing-state';
import { gaugeIdOf } from '../model/gauge-keys';
import type { Direction } from '../model/navigation';
import { DeletePrompt } from './delete-prompt';
import { ElementMoving } from './element-moving';
import { GaugePlacing } from './gauge-placing';
import { GaugeSliding } from './gauge-sliding';
import { NodePlacing } from './node-placing';
import { PipeDrawing } from './pipe-drawing';
import { ARROWS, WalkKeys } from './walk-keys';

export const PLACE_KEYS: Readonly<Record<string, NodeKind>> = {
  t: 'trap',
  j: 'junction',
  r: 'receiver',
  v: 'flashVessel',
  u: 'pumpedInlet',
};

/** What moves the view and opens the menu; the sheet is one. */
export interface SheetView {
  zoomBy(factor: number): void;
  fit(): void;
  panBy(direction: Direction): void;
  openMenu(): void;
}

/** The keyboard model of the drawing (`KeyList` says it to people): each key does one thing and says what it did. */
@Injectable()
export class SheetKeys {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);
  private readonly clipboard = inject(DrawingClipboard);
  private readonly deletePrompt = inject(DeletePrompt);
  private readonly placing = inject(NodePlacing);
  private readonly pipes = inject(PipeDrawing);
  private readonly moving = inject(ElementMoving);
  private readonly gaugePlacing = inject(GaugePlacing);
  private readonly sliding = inject(GaugeSliding);
  private readonly walk = inject(WalkKeys);

  /** True when the key meant something here. Tab never does: it always leaves. */
  handle(event: KeyboardEvent, view: SheetView): boolean {
    if (event.key === 'Tab' || event.altKey) return false;
    if (event.key === 'ContextMenu' || (event.key === 'F10' && event.shiftKey)) {
      view.openMenu();
      return true;
    }
    if (event.ctrlKey || event.metaKey) return this.chord(event, view);
    const mode = this.state.mode();
    switch (mode.kind) {
      case 'piping':
        return this.pipes.handle(event, mode);
      case 'moving':
        return this.moving.handle(event, mode);
      case 'sliding':
        return this.sliding.handle(event, mode);
      case 'placing':
      case 'tapping':
      case 'idle':
        return this.walk.handle(event) || this.selectKey(event) || this.letterKey(event, view);
    }
  }

  private chord(event: KeyboardEvent, view: SheetView): boolean {
    const key = event.key.toLowerCase();
    const direction = ARROWS[event.key];
    if (direction !== undefined) {
      view.panBy(direction);
      return true;
    }
    if (key === 'a') {
      const { nodes, pipes } = this.scene.settled();
      this.state.selectAll([...nodes.keys(), ...pipes.keys()]);
      return true;
    }
    if (key === ' ') {
      this.addFocused();
      return true;
    }
    if (key === 'c' && !event.shiftKey) {
      void this.clipboard.copy(this.actedOn());
      return true;
    }
    return this.undoChord(key, event.shiftKey) || (this.store.mayDraw() && this.drawChord(key, event.shiftKey));
  }

  /** Whoever may change anything here may take it back. */
  private undoChord(key: string, shift: boolean): boolean {
    if (!this.store.mayDraw() && !this.gaugePlacing.may()) return false;
    if (key === 'y' ? shift : key !== 'z') return false;
    if (key === 'y' || shift) this.commands.redo();
    else this.commands.undo();
    return true;
  }

  private drawChord(key: string, shift: boolean): boolean {
    if (shift) return false;
    if (key === 'x') void this.clipboard.cut(this.actedOn());
    else if (key === 'v') void this.clipboard.paste();
    else if (key === 'd') this.clipboard.duplicate(this.actedOn());
    else return false;
    return true;
  }

  private selectKey(event: KeyboardEvent): boolean {
    const here = this.scene.tabStop();
    switch (event.key) {
      case ' ':
        if (here === null) return true;
        if (this.state.selection().has(here) && this.state.selection().size === 1) this.state.select();
        else this.state.select(here);
        this.state.say(
          `${this.scene.tagOf(here)} ${this.state.selection().has(here) ? 'selected' : 'no longer selected'}`,
        );
        return true;
      case 'Enter':
        if (here === null) return true;
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

  /** To what is selected, or out of it: what is picked need not lie side by side. */
  private addFocused(): void {
    const here = this.scene.tabStop();
    if (here === null) return;
    this.state.toggle(here);
    const word = this.state.selection().has(here) ? 'selected too' : 'no longer selected';
    this.state.say(`${this.scene.tagOf(here)} ${word}`);
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

  private letterKey(event: KeyboardEvent, view: SheetView): boolean {
    const may = this.store.mayDraw();
    const mayPlace = may || this.gaugePlacing.may();
    if ((event.key === 'Delete' || event.key === 'Backspace') && this.commands.mayRemove(this.actedOn())) {
      void this.deletePrompt.ask(this.actedOn());
      return true;
    }
    if (mayPlace && event.key === 'Insert') {
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
        return this.gaugeLetter(event.key.toLowerCase()) || (may && this.drawLetter(event.key.toLowerCase()));
    }
  }

  /** Gauges are placed and moved without leave to draw. */
  private gaugeLetter(letter: string): boolean {
    if (!this.gaugePlacing.may()) return false;
    const here = this.scene.tabStop();
    if (letter === 'g') this.gaugePlacing.onFocus();
    else if (letter === 'm' && here !== null && gaugeIdOf(here) !== undefined) this.sliding.start(here);
    else return false;
    return true;
  }

  private drawLetter(letter: string): boolean {
    const kind = PLACE_KEYS[letter];
    const here = this.scene.tabStop();
    if (kind !== undefined) {
      this.placing.besideFocus(kind);
      return true;
    }
    switch (letter) {
      case 'p':
        if (here !== null && this.scene.settled().nodes.has(here)) this.pipes.start(here);
        else this.state.say('Go to the element that the pipe starts from first');
        return true;
      case 'm':
        if (here !== null) this.moving.start(here);
        return true;
      case 'b':
        if (here !== null) this.moving.startBend(here);
        return true;
      default:
        return false;
    }
  }

  /** The selection, or the element with the keyboard where nothing is selected. */
  private actedOn(): ReadonlySet<string> {
    const selected = this.state.selection();
    const here = this.scene.tabStop();
    return selected.size > 0 || here === null ? selected : new Set([here]);
  }
}
