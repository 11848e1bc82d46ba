import type { Position } from '@riseback/network';

/** What two fingers did since they were last heard of. */
export interface PinchStep {
  /** Half-way between the fingers, before and now. */
  readonly from: Position;
  readonly to: Position;
  readonly factor: number;
}

/** Follows fingers on the sheet; two of them zoom about what lies between them and pan with it. */
export class Pinch {
  private readonly fingers = new Map<number, Position>();

  get count(): number {
    return this.fingers.size;
  }

  down(finger: number, point: Position): void {
    this.fingers.set(finger, point);
  }

  /** The step that a finger's move makes; null while there are not two of them. */
  move(finger: number, point: Position): PinchStep | null {
    if (!this.fingers.has(finger)) return null;
    const before = spanOf(this.fingers);
    this.fingers.set(finger, point);
    const now = spanOf(this.fingers);
    if (before === null || now === null) return null;
    return { from: before.middle, to: now.middle, factor: before.apart > 0 ? now.apart / before.apart : 1 };
  }

  up(finger: number): void {
    this.fingers.delete(finger);
  }
}

function spanOf(fingers: ReadonlyMap<number, Position>): { readonly middle: Position; readonly apart: number } | null {
  const [a, b] = [...fingers.values()];
  if (a === undefined || b === undefined) return null;
  return { middle: { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 }, apart: Math.hypot(b.x - a.x, b.y - a.y) };
}
