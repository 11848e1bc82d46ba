import { ChangeDetectionStrategy, Component, computed, effect, inject, untracked, viewChild } from '@angular/core';
import { MatMenu, MatMenuItem, MatMenuTrigger } from '@angular/material/menu';
import type { NodeKind } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { DrawingCommands } from './drawing-commands';
import { DrawingScene } from './drawing-scene';
import { DrawingState, IDLE } from './drawing-state';
import { ArrangeMenu } from './menus/arrange-menu';
import { NodeArranging } from './node-arranging';
import { PlanStore } from './plan/plan-store';
import { GaugePlacing } from './sheet/gauge-placing';
import { NodePlacing } from './sheet/node-placing';
import { PipeDrawing } from './sheet/pipe-drawing';
import { ElementIcon } from './symbols/element-icon';

const TOOLS: readonly { readonly kind: NodeKind; readonly words: string; readonly letter: string }[] = [
  { kind: 'trap', words: 'Trap', letter: 'T' },
  { kind: 'junction', words: 'Junction', letter: 'J' },
  { kind: 'receiver', words: 'Receiver', letter: 'R' },
  { kind: 'flashVessel', words: 'Flash vessel', letter: 'V' },
  { kind: 'pumpedInlet', words: 'Pumped inlet', letter: 'U' },
];

/** Under the sheet: what can be placed, with its key; undo and redo; zoom. */
@Component({
  selector: 'app-drawing-tray',
  imports: [ArrangeMenu, ElementIcon, MatMenu, MatMenuItem, MatMenuTrigger],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './drawing-tray.html',
  styleUrl: './drawing-tray.scss',
})
export class DrawingTray {
  protected readonly store = inject(NetworkStore);
  protected readonly state = inject(DrawingState);
  protected readonly commands = inject(DrawingCommands);
  protected readonly plan = inject(PlanStore);
  private readonly scene = inject(DrawingScene);
  protected readonly arranging = inject(NodeArranging);
  private readonly pipes = inject(PipeDrawing);
  private readonly placing = inject(NodePlacing);
  protected readonly gauges = inject(GaugePlacing);

  private readonly menuTrigger = viewChild<MatMenuTrigger>('placeTrigger');

  protected readonly tools = TOOLS;
  protected readonly view = viewOf(inject(DrawingState));
  protected readonly zoomWords = computed(() => `${String(Math.round(this.state.zoom() * 100))} %`);
  protected readonly chosenTool = computed(() => {
    const mode = this.state.mode();
    if (mode.kind === 'placing') return mode.what;
    if (mode.kind === 'tapping') return 'gauge';
    return mode.kind === 'piping' ? 'pipe' : null;
  });

  constructor() {
    effect(() => {
      if (this.state.menuAsked() > 0) untracked(() => this.menuTrigger()?.openMenu());
    });
  }

  /** With the mouse the sheet is clicked next; with the keyboard the element goes beside the focus. */
  protected choose(kind: NodeKind, event: MouseEvent): void {
    // a button pressed by a key reports no clicks
    if (event.detail === 0) {
      this.placing.besideFocus(kind);
      return;
    }
    const mode = this.state.mode();
    const again = mode.kind === 'placing' && mode.what === kind;
    this.state.mode.set(again ? IDLE : { kind: 'placing', what: kind });
    if (!again) this.state.say('Click on the sheet where it stands');
  }

  protected besideFocus(kind: NodeKind): void {
    this.placing.besideFocus(kind);
  }

  protected choosePipe(event: MouseEvent): void {
    if (this.state.mode().kind === 'piping') {
      this.state.mode.set(IDLE);
      return;
    }
    const focused = this.scene.tabStop();
    const byKey = event.detail === 0;
    this.pipes.start(byKey && focused !== null && this.scene.settled().nodes.has(focused) ? focused : null);
    if (byKey) this.state.focusOn(focused);
  }

  protected chooseGauge(event: MouseEvent): void {
    if (event.detail === 0) this.gauges.onFocus();
    else this.gauges.awaitClick();
  }

  /** Its panel is the network's own, which is there while nothing is selected. */
  protected openPlan(): void {
    this.state.select();
    this.plan.panelAsked.update((count) => count + 1);
  }

  protected afterMenu(): void {
    if (!this.state.asking()) this.state.focusOn(this.state.focusId());
  }
}

function viewOf(state: DrawingState) {
  return {
    zoomBy: (factor: number) => {
      state.zoomAsked.set({ factor });
    },
    fit: () => {
      state.zoomAsked.set({ factor: null });
    },
  };
}
