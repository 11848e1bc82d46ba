import { inject, Injectable } from '@angular/core';
import type { NodeKind, Position } from '@riseback/network';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE } from '../drawing-state';
import { KIND_WORDS } from '../../shared/element-words';
import { FIELD, GRID, nearestFreePoint, snapPoint } from '@riseback/figures';
import { placeOf } from '../model/navigation';

/** How far from the focused element a new one is put, before it looks for free room. */
const BESIDE = 6 * GRID;

/** Puts a new node somewhere and asks for its fields; it joins the network when they are given. */
@Injectable()
export class NodePlacing {
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  at(kind: NodeKind, place: Position): void {
    this.ask(kind, snapPoint(place));
  }

  /** On the nearest free grid point beside the element with the keyboard. */
  besideFocus(kind: NodeKind): void {
    const network = this.scene.settled();
    const focused = this.scene.tabStop();
    const beside = focused === null ? undefined : placeOf(network, focused);
    const sheet = this.scene.sheet();
    const onSource = focused !== null && isSource(network.nodes.get(focused)?.node.kind);
    const below = isSource(kind) && !onSource;
    const near =
      beside === undefined
        ? { x: sheet.left + 4 * FIELD.width, y: sheet.top + 3 * FIELD.height }
        : { x: beside.x + (below ? 0 : BESIDE), y: beside.y + (below ? BESIDE : 0) };
    const occupied = {
      nodes: [...network.nodes.values()].map(({ at }) => at),
      lines: [...network.pipes.values()].map(({ points }) => points),
    };
    this.ask(kind, nearestFreePoint(near, occupied));
  }

  private ask(kind: NodeKind, at: Position): void {
    this.state.mode.set(IDLE);
    this.state.draft.set({ kind: 'node', what: kind, at });
    this.state.say(`New ${KIND_WORDS[kind]}: give its tag and elevation`);
  }
}

/** Sources hang below a header, side by side, so that their pipes do not run through each other. */
function isSource(kind: NodeKind | undefined): boolean {
  return kind === 'trap' || kind === 'pumpedInlet';
}
