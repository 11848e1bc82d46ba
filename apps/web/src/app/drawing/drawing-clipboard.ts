import { inject, Injectable } from '@angular/core';
import type { NetworkDocument, Position } from '@riseback/network';
import { nameOf } from '../shared/element-words';
import { GRID, snapPoint } from '@riseback/figures';
import { NetworkStore } from '../networks/network-store';
import { HeldSiteSettings } from '../sites/held-site-settings';
import { DrawingCommands } from './drawing-commands';
import { DrawingScene } from './drawing-scene';
import { DrawingState } from './drawing-state';
import { type Clip, clipText, partOf, readClip } from './model/clip';
import { clearOffset } from './model/clear-offset';
import { drawnNetwork } from './model/drawn-network';
import { pasteOps } from './model/paste';
import { DeletePrompt } from './sheet/delete-prompt';
import { SystemClipboard } from './system-clipboard';

/** Where a copy lands beside its original when there is room. */
const BESIDE: Position = { x: 2 * GRID, y: 2 * GRID };

/** Copy, cut, paste and duplicate, within a network and between networks; each paste is one step of undo. In the drawing page's `providers`. */
@Injectable()
export class DrawingClipboard {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);
  private readonly deletePrompt = inject(DeletePrompt);
  private readonly clipboard = inject(SystemClipboard);
  private readonly siteSettings = inject(HeldSiteSettings);

  async copy(ids: ReadonlySet<string>): Promise<void> {
    const taken = this.take(ids, false);
    if (taken === null) return;
    await this.clipboard.write(clipText(taken.clip));
    this.state.say(`${taken.words} copied${taken.leftBehind}`);
  }

  /** What hangs on the elements and cannot go with them is said first, as before a deletion. */
  async cut(ids: ReadonlySet<string>): Promise<void> {
    const taken = this.take(ids, true);
    if (taken === null) return;
    const { part } = taken.clip;
    const going = new Set([...part.nodes.keys(), ...part.pipes.keys()]);
    // into the clipboard first: browsers allow that only right after the key or click
    await this.clipboard.write(clipText(taken.clip));
    const removed =
      this.commands.goingAlong(going).length === 0
        ? this.commands.remove(going, 'cut')
        : await this.deletePrompt.ask(going);
    if (removed) this.state.say(`${taken.words} cut. Undo brings it back.`);
  }

  /** @param at where the person pointed; the piece's upper left corner goes there if there is room */
  async paste(at: Position | null = null): Promise<void> {
    const read = readClip(await this.clipboard.read());
    if (!read.ok) {
      this.state.say(`Nothing pasted. ${read.why}.`);
      return;
    }
    this.putIn(read.clip, at, 'pasted');
  }

  /** The same as copy and paste, without the clipboard. */
  duplicate(ids: ReadonlySet<string>): void {
    const taken = this.take(ids, false);
    if (taken !== null) this.putIn(taken.clip, null, 'duplicated', taken.leftBehind);
  }

  private take(
    ids: ReadonlySet<string>,
    cut: boolean,
  ): { readonly clip: Clip; readonly words: string; readonly leftBehind: string } | null {
    const document = this.store.document();
    if (document === null) return null;
    const { part, nodes, pipes, leftBehind } = partOf(document, ids);
    if (nodes === 0) {
      this.state.say(
        ids.size === 0
          ? 'Nothing is selected'
          : 'A pipe alone cannot be copied: select the elements at both its ends too',
      );
      return null;
    }
    return {
      clip: { part, siteId: this.store.network()?.siteId ?? '', cut },
      words: counted(nodes, pipes),
      leftBehind:
        leftBehind === 0
          ? ''
          : `; ${String(leftBehind)} ${leftBehind === 1 ? 'pipe to an element' : 'pipes to elements'} outside the selection left behind`,
    };
  }

  private putIn(clip: Clip, at: Position | null, word: string, more = ''): void {
    const document = this.store.document();
    if (document === null) return;
    const by = this.placeFor(clip.part, at);
    const here = this.store.network()?.siteId ?? '';
    const { ops, nodes, pipes } = pasteOps(document, clip, by, here, this.siteSettings.tagPatterns(here));
    const words = `${counted(nodes.length, pipes.length)} ${word}`;
    if (!this.store.edit(words, ops)) {
      this.state.say(`Nothing ${word}. ${this.store.lastRefusal().join(' ')}`);
      return;
    }
    this.state.select(...nodes, ...pipes);
    this.state.focusOn(nodes[0] ?? null);
    const [first] = nodes;
    const node = first === undefined ? undefined : this.store.document()?.nodes.get(first)?.value;
    this.state.say(`${words}${node === undefined ? '' : `, from ${nameOf(node)} on`}${more}`);
  }

  private placeFor(part: NetworkDocument, at: Position | null): Position {
    const put = drawnNetwork(part);
    const points = [...put.nodes.values()].map((node) => node.at);
    const [left, top] = [Math.min(...points.map(({ x }) => x)), Math.min(...points.map(({ y }) => y))];
    const wish = at === null ? BESIDE : snapPoint({ x: at.x - left, y: at.y - top });
    return clearOffset(shapeOf(this.scene.settled()), shapeOf(put), wish);
  }
}

function shapeOf({ nodes, pipes }: ReturnType<typeof drawnNetwork>) {
  return {
    nodes: [...nodes.values()].map(({ at }) => at),
    lines: [...pipes.values()].map(({ points }) => points),
  };
}

function counted(nodes: number, pipes: number): string {
  const elements = `${String(nodes)} ${nodes === 1 ? 'element' : 'elements'}`;
  return pipes === 0 ? elements : `${elements} and ${String(pipes)} ${pipes === 1 ? 'pipe' : 'pipes'}`;
}
