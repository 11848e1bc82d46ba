import { ChangeDetectionStrategy, Component, computed, inject, signal, viewChild } from '@angular/core';
import { MatDivider } from '@angular/material/divider';
import { MatMenu, MatMenuContent, MatMenuItem, MatMenuTrigger } from '@angular/material/menu';
import type { NodeKind, Position } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { KIND_WORDS } from '../../shared/element-words';
import { DrawingClipboard } from '../drawing-clipboard';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { shownBends } from '../model/drawn-network';
import { gaugeIdOf } from '../model/gauge-keys';
import { NodeArranging } from '../node-arranging';
import { DeletePrompt } from '../sheet/delete-prompt';
import { ElementMoving } from '../sheet/element-moving';
import { GaugePlacing } from '../sheet/gauge-placing';
import { GaugeSliding } from '../sheet/gauge-sliding';
import { NodePlacing } from '../sheet/node-placing';
import { PipeDrawing } from '../sheet/pipe-drawing';
import type { Target } from '../sheet/sheet-pointer';
import { ArrangeMenu } from './arrange-menu';

const PLACED_KINDS: readonly NodeKind[] = ['trap', 'junction', 'receiver', 'flashVessel', 'pumpedInlet'];

/** What can be done with what was pointed at: by the right button, a long press, or the menu key. */
@Component({
  selector: 'app-sheet-menu',
  imports: [ArrangeMenu, MatDivider, MatMenu, MatMenuContent, MatMenuItem, MatMenuTrigger],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './sheet-menu.html',
  styles: `
    .anchor {
      position: absolute;
      width: 1px;
      height: 1px;
      padding: 0;
      border: 0;
      background: none;
      pointer-events: none;
    }
    button[mat-menu-item] {
      min-height: 30px;
    }
    @media (pointer: coarse) {
      button[mat-menu-item] {
        min-height: 44px;
      }
    }
    kbd {
      float: right;
      margin: 3px 0 0 24px;
      color: var(--rb-ink-3);
      font:
        400 11px/14px Inter,
        sans-serif;
    }
  `,
})
export class SheetMenu {
  protected readonly store = inject(NetworkStore);
  protected readonly arranging = inject(NodeArranging);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly clipboard = inject(DrawingClipboard);
  private readonly deletePrompt = inject(DeletePrompt);
  private readonly moving = inject(ElementMoving);
  private readonly pipes = inject(PipeDrawing);
  private readonly placing = inject(NodePlacing);
  protected readonly gauges = inject(GaugePlacing);
  private readonly sliding = inject(GaugeSliding);

  private readonly trigger = viewChild.required(MatMenuTrigger);

  protected readonly tools = PLACED_KINDS.map((kind) => ({ kind, words: KIND_WORDS[kind] }));
  /** On the screen, in the sheet's own pixels. */
  protected readonly at = signal<Position>({ x: 0, y: 0 });
  protected readonly target = signal<Target>({ id: null, bend: -1 });
  /** On the paper; null when a key asked, which points nowhere. */
  private readonly pointedPlace = signal<Position | null>(null);
  /** The command took the keyboard elsewhere. */
  private keyboardTaken = false;

  protected readonly kind = computed((): 'node' | 'pipe' | 'gauge' | 'sheet' => {
    const { id } = this.target();
    if (id === null || !this.scene.has(id)) return 'sheet';
    if (this.state.selection().size < 2 && gaugeIdOf(id) !== undefined) return 'gauge';
    // several things are handled as elements are, whichever of them was pointed at
    return this.scene.settled().nodes.has(id) || this.state.selection().size > 1 ? 'node' : 'pipe';
  });
  protected readonly title = computed(() => {
    const { id } = this.target();
    const { size } = this.state.selection();
    if (id === null) return 'Sheet';
    return size > 1 ? `${String(size)} selected elements` : this.scene.tagOf(id);
  });
  protected readonly mayLeave = computed(() => {
    const { id } = this.target();
    const node = id === null ? undefined : this.scene.settled().nodes.get(id)?.node;
    return this.state.selection().size === 1 && node !== undefined && node.kind !== 'receiver';
  });
  protected readonly onlyOne = computed(() => this.state.selection().size < 2);
  protected readonly moveWords = computed(() => {
    const { id } = this.target();
    const pipe = id === null ? undefined : this.scene.settled().pipes.get(id);
    return pipe !== undefined && shownBends(pipe).length > 0 ? 'Move a bend by arrows' : 'Move aside by arrows';
  });

  /** @param place on the paper, for what is placed or pasted there */
  open(at: Position, target: Target, place: Position | null): void {
    const { id } = target;
    if (id !== null && !this.state.selection().has(id)) this.state.select(id);
    if (id !== null) this.state.focusId.set(id);
    this.at.set(at);
    this.target.set(target);
    this.pointedPlace.set(place);
    this.keyboardTaken = false;
    this.trigger().openMenu();
  }

  protected closed(): void {
    if (!this.keyboardTaken && !this.state.asking()) this.state.focusOn(this.state.focusId());
  }

  protected openFields(): void {
    this.keyboardTaken = true;
    const { id } = this.target();
    if (id !== null) this.state.select(id);
    this.state.openFields();
  }

  protected startPipe(): void {
    this.pipes.start(this.target().id);
  }

  protected move(): void {
    const { id } = this.target();
    if (id !== null) this.moving.start(id);
  }

  protected slide(): void {
    const { id } = this.target();
    if (id !== null) this.sliding.start(id);
  }

  /** Where the pipe was pointed at, or half-way along it. */
  protected placeGauge(): void {
    this.keyboardTaken = true;
    const { id } = this.target();
    if (id !== null) this.gauges.on(id, this.pointedPlace());
  }

  protected addBend(): void {
    const { id } = this.target();
    if (id !== null) this.moving.startBend(id, this.pointedPlace());
  }

  protected removeBend(): void {
    const { id, bend } = this.target();
    if (id !== null) this.moving.removeBend(id, bend);
  }

  protected straighten(): void {
    const { id } = this.target();
    if (id !== null) this.moving.straighten(id);
  }

  protected cut(): void {
    void this.clipboard.cut(this.state.selection());
  }

  protected copy(): void {
    void this.clipboard.copy(this.state.selection());
  }

  protected paste(): void {
    void this.clipboard.paste(this.pointedPlace());
  }

  protected duplicate(): void {
    this.clipboard.duplicate(this.state.selection());
  }

  protected remove(): void {
    this.keyboardTaken = true;
    void this.deletePrompt.ask(this.state.selection());
  }

  protected place(kind: NodeKind): void {
    this.keyboardTaken = true;
    const place = this.pointedPlace();
    if (place === null) this.placing.besideFocus(kind);
    else this.placing.at(kind, place);
  }

  protected selectAll(): void {
    const { nodes, pipes } = this.scene.settled();
    this.state.selectAll([...nodes.keys(), ...pipes.keys()]);
  }

  protected fit(): void {
    this.state.zoomAsked.set({ factor: null });
  }

  protected findTag(): void {
    this.keyboardTaken = true;
    this.state.tagAsked.update((count) => count + 1);
  }

  protected listKeys(): void {
    this.keyboardTaken = true;
    this.state.keysAsked.update((count) => count + 1);
  }
}
