import { niceTicks } from '@riseback/figures';
import { type DisplayUnits, toDisplay } from '@riseback/units';
import { type ComparedQuantity, type EffectRow, kindOf } from './effect-rows';

/** Width of an axis, px, and the room that a mark takes at its ends. */
export const AXIS_WIDTH = 200;
const MARGIN = 6;
/** Between the middles of the open circle and the tip of the arrow at least, so that both are seen. */
const LEAST_PX = 8;
const HEAD_PX = 5;
const CIRCLE_PX = 4;

export interface EffectAxis {
  readonly ticks: readonly { readonly x: number; readonly label: string }[];
  /** Where an SI value stands, px. */
  readonly at: (si: number) => number;
}

/** One axis for all rows: it begins where the quantity does, at the atmosphere or at nothing. */
export function effectAxis(
  rows: readonly Pick<EffectRow, 'beforeSi' | 'afterSi'>[],
  quantity: ComparedQuantity,
  units: DisplayUnits,
): EffectAxis {
  const shown = (si: number) => toDisplay(si, kindOf(quantity), units);
  const values = rows.flatMap(({ beforeSi, afterSi }) => [beforeSi, afterSi]).filter((si) => si !== undefined);
  const ticks = niceTicks(Math.min(0, ...values.map(shown)), Math.max(0, ...values.map(shown)), 5);
  const [first = 0, last = 1] = [ticks[0], ticks.at(-1)];
  const x = (value: number) => MARGIN + ((value - first) / (last - first)) * (AXIS_WIDTH - 2 * MARGIN);
  return {
    ticks: ticks.map((value) => ({ x: x(value), label: String(value).replace('-', '−') })),
    at: (si) => x(shown(si)),
  };
}

export interface EffectMark {
  /** Middle of the open circle: where it was. */
  readonly circle: number | undefined;
  /** From the circle to the arrow head; '' where nothing moved. */
  readonly shaft: string;
  /** The head: where it is. */
  readonly head: string;
}

/** Open circle was, arrow head is. What only one of the two has, has only its own mark. */
export function effectMark(
  { beforeSi, afterSi }: Pick<EffectRow, 'beforeSi' | 'afterSi'>,
  axis: EffectAxis,
): EffectMark {
  if (beforeSi === undefined || afterSi === undefined) {
    const tip = afterSi === undefined ? undefined : axis.at(afterSi);
    return {
      circle: beforeSi === undefined ? undefined : axis.at(beforeSi),
      shaft: '',
      head: tip === undefined ? '' : `M${at(tip)} 10 ${at(tip - HEAD_PX)} 3 ${at(tip + HEAD_PX)} 3Z`,
    };
  }
  const circle = axis.at(beforeSi);
  const way = Math.sign(axis.at(afterSi) - circle);
  if (way === 0) return { circle, shaft: '', head: '' };
  const tip = circle + way * Math.max(Math.abs(axis.at(afterSi) - circle), LEAST_PX);
  const back = tip - way * HEAD_PX;
  return {
    circle,
    shaft: `M${at(circle + way * CIRCLE_PX)} 8H${at(back)}`,
    head: `M${at(tip)} 8 ${at(back)} 4 ${at(back)} 12Z`,
  };
}

function at(x: number): string {
  return x.toFixed(1);
}
