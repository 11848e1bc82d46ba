import type { PlanPlacement } from '@riseback/contracts';
import type { Position } from '@riseback/network';
import { distance } from '../../shared/geometry';

interface Size {
  readonly widthPx: number;
  readonly heightPx: number;
}
type Where = Pick<PlanPlacement, 'x' | 'y' | 'unitsPerPixel'>;

/** How wide a first plan lies on a sheet that holds nothing yet, units. */
const FIRST_WIDTH = 1_200;
/** It reaches so much beyond what is drawn. */
const BEYOND = 1.15;

/** Under all that is drawn, in the middle of it; on an empty sheet at its origin. */
export function firstPlace({ widthPx, heightPx }: Size, drawn: readonly Position[]): Where {
  if (drawn.length === 0) return { x: 0, y: 0, unitsPerPixel: FIRST_WIDTH / widthPx };
  const [xs, ys] = [drawn.map(({ x }) => x), drawn.map(({ y }) => y)];
  const [left, right, top, bottom] = [Math.min(...xs), Math.max(...xs), Math.min(...ys), Math.max(...ys)];
  const wanted = Math.max((right - left) / widthPx, (bottom - top) / heightPx) * BEYOND;
  const unitsPerPixel = wanted > 0 ? wanted : FIRST_WIDTH / widthPx;
  return {
    x: Math.round((left + right) / 2 - (widthPx * unitsPerPixel) / 2),
    y: Math.round((top + bottom) / 2 - (heightPx * unitsPerPixel) / 2),
    unitsPerPixel,
  };
}

/** Another image lies where the one before lay, as wide as that. */
export function samePlace({ widthPx }: Size, before: Where & Size): Where {
  return { x: before.x, y: before.y, unitsPerPixel: (before.unitsPerPixel * before.widthPx) / widthPx };
}

/**
 * The plan with another width. What it shows keeps its true size, so that a unit of the drawing then stands for more or fewer metres.
 * @param width of the whole image, units
 */
export function resized(plan: PlanPlacement & Size, width: number): Partial<PlanPlacement> {
  const unitsPerPixel = width / plan.widthPx;
  const { metresPerUnit } = plan;
  return {
    unitsPerPixel,
    ...(metresPerUnit === undefined ? {} : { metresPerUnit: (metresPerUnit * plan.unitsPerPixel) / unitsPerPixel }),
  };
}

/** Metres that a unit stands for when two points of the sheet are so far apart in the plant; undefined where that says nothing. */
export function scaleOf(from: Position, to: Position, metres: number): number | undefined {
  const units = distance(from, to);
  return units > 0 && metres > 0 ? metres / units : undefined;
}

export interface ScaleBar {
  /** On the screen, px. */
  readonly width: number;
  readonly metres: number;
}

/** A bar of a round length that is 60 to 150 px wide. @param metresPerStep 1 for metres, 0.3048 for feet */
export function scaleBar(metresPerUnit: number, zoom: number, metresPerStep: number): ScaleBar | null {
  const stepsPerPx = metresPerUnit / zoom / metresPerStep;
  const most = 150 * stepsPerPx;
  const power = 10 ** Math.floor(Math.log10(most));
  const steps = [5, 2, 1].map((digit) => digit * power).find((length) => length <= most);
  return steps === undefined || !Number.isFinite(steps)
    ? null
    : { width: steps / stepsPerPx, metres: steps * metresPerStep };
}
