import { line } from 'd3-shape';
import { PAPER_CORE_FROM, type PressureClass, type PressureRamp } from './pressure-ramp';

/** A stretch of the pressure line in one colour class, and whether its core is the paper's colour. */
export interface Wash {
  readonly pressureClass: PressureClass;
  readonly path: string;
  readonly paperCore: boolean;
}

export interface Shown {
  readonly distance: number;
  readonly pressure: number;
}

/** Cuts the pressure line where it crosses a limit of the ramp, so that a riser changes colour along its height. */
export function washesOf(
  shown: readonly Shown[],
  ramp: PressureRamp,
  x: (distance: number) => number,
  y: (pressure: number) => number,
): readonly Wash[] {
  const inner = ramp.limits.slice(1, -1);
  const classOf = (pressure: number): PressureClass => {
    const index = inner.filter((limit) => pressure >= limit).length;
    return ([1, 2, 3, 4, 5, 6, 7] as const)[index] ?? 7;
  };
  const runs: { pressureClass: PressureClass; points: Shown[] }[] = [];
  const add = (from: Shown, to: Shown) => {
    const pressureClass = classOf((from.pressure + to.pressure) / 2);
    const last = runs.at(-1);
    if (last?.pressureClass === pressureClass) last.points.push(to);
    else runs.push({ pressureClass, points: [from, to] });
  };
  shown.forEach((to, i) => {
    const from = shown[i - 1];
    if (from === undefined) return;
    let at = from;
    for (const limit of crossed(from.pressure, to.pressure, inner)) {
      const share = (limit - from.pressure) / (to.pressure - from.pressure);
      const cut = { distance: from.distance + share * (to.distance - from.distance), pressure: limit };
      add(at, cut);
      at = cut;
    }
    add(at, to);
  });
  const draw = line<Shown>(
    ({ distance }) => x(distance),
    ({ pressure }) => y(pressure),
  );
  return runs.map(({ pressureClass, points }) => ({
    pressureClass,
    path: draw(points) ?? '',
    paperCore: pressureClass >= PAPER_CORE_FROM,
  }));
}

/** A crossing nearer to an end than this is the end itself, but for the rounding of a conversion. */
const HAIR = 1e-6;

/** The limits strictly between two pressures, in the order in which they are met. */
function crossed(from: number, to: number, limits: readonly number[]): number[] {
  const between = limits.filter((limit) => limit > Math.min(from, to) + HAIR && limit < Math.max(from, to) - HAIR);
  return from < to ? between : between.reverse();
}
