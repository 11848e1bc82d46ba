import { inject, Injectable } from '@angular/core';
import type { Position } from '@riseback/network';
import { distanceToPiece, pieces } from '../../shared/geometry';
import { GRID, snap } from '@riseback/figures';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { shiftGrip } from '../model/displacement';
import type { DrawnPipe } from '../model/drawn-network';
import { nearestWithin, type PipeGrip } from '../model/pipe-shape';

/** A pipe in the hand: which part of it, and the point that follows the pointer. */
export interface PipeHold {
  readonly drawn: DrawnPipe;
  readonly grip: PipeGrip;
  readonly at: Position;
}

/** Dragging a pipe's bends and straight pieces. In the drawing page's `providers`. */
@Injectable()
export class PipeGrabbing {
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  /** The bend that was pressed, or the piece of the pipe nearest to the press. */
  take(id: string, bend: number, press: Position): PipeHold | null {
    const drawn = this.scene.settled().pipes.get(id);
    if (drawn === undefined) return null;
    const corner = bend < 0 ? undefined : drawn.points[bend + 1];
    if (corner !== undefined) return { drawn, grip: { kind: 'corner', index: bend }, at: corner };
    const [nearest] = pieces(drawn.points)
      .map((piece, index) => ({ piece, index, off: distanceToPiece(press, piece) }))
      .sort((a, b) => a.off - b.off);
    if (nearest === undefined) return null;
    return { drawn, grip: { kind: 'piece', index: nearest.index, split: null }, at: nearest.piece[0] };
  }

  /** Moves it; what comes nearly into line with another part of the pipe comes into line, so that a bend can be dragged away again. */
  drag({ drawn, grip, at }: PipeHold, by: Position): void {
    const own = grip.kind === 'corner' ? [grip.index + 1] : [grip.index, grip.index + 1];
    const others = [...drawn.points.filter((_, i) => !own.includes(i)), at];
    const land = (value: number, lines: readonly number[]) => nearestWithin(value, lines, GRID / 2) ?? snap(value);
    const x = land(
      at.x + by.x,
      others.map((point) => point.x),
    );
    const y = land(
      at.y + by.y,
      others.map((point) => point.y),
    );
    this.state.displaced.set(shiftGrip(drawn, grip, x - at.x, y - at.y));
  }
}
