import { inOrder, type NetworkDocument } from '@riseback/network';
import type { ProfilePoint } from '@riseback/solver';
import { nameOf } from './element-words';

/** A gauge whose tap lies on a trap's way, with what is predicted there. SI, absolute pressure. */
export interface GaugeOnWay {
  readonly id: string;
  readonly tag: string;
  /** Of the tap, along the pipes from the trap. */
  readonly distanceM: number;
  readonly tapElevationM: number;
  /** Of the gauge itself. */
  readonly elevationM: number;
  /** At the tap; between two points of the profile on the straight line between them. */
  readonly pressurePa: number;
}

/**
 * The gauges on a way, in its order: those at its nodes, and those that tap its pipes. Retired ones are left out.
 * @param walk pipe ids from the trap down
 */
export function gaugesOnWay(
  document: NetworkDocument,
  trapId: string,
  walk: readonly string[],
  points: readonly ProfilePoint[],
): readonly GaugeOnWay[] {
  const places = placesOf(document, trapId, walk);
  return inOrder(document.gauges)
    .flatMap(([id, { value: gauge }]): GaugeOnWay[] => {
      if (gauge.retired) return [];
      const distanceM =
        gauge.pipe === undefined
          ? places.nodes.get(gauge.node ?? '')
          : places.pipes.get(gauge.pipe)?.(gauge.distanceM ?? 0);
      const at = distanceM === undefined ? undefined : pointAt(points, distanceM);
      if (distanceM === undefined || at === undefined) return [];
      return [{ id, tag: nameOf(gauge), distanceM, ...at, elevationM: gauge.elevationM }];
    })
    .sort((a, b) => a.distanceM - b.distanceM);
}

interface Places {
  readonly nodes: ReadonlyMap<string, number>;
  /** From a distance along a pipe's arrow to one along the way. */
  readonly pipes: ReadonlyMap<string, (distanceM: number) => number>;
}

function placesOf(document: NetworkDocument, trapId: string, walk: readonly string[]): Places {
  const nodes = new Map([[trapId, 0]]);
  const pipes = new Map<string, (distanceM: number) => number>();
  let [at, startM] = [trapId, 0];
  for (const id of walk) {
    const pipe = document.pipes.get(id)?.value;
    if (pipe === undefined) continue;
    const withArrow = pipe.from === at;
    const [beganM, { lengthM }] = [startM, pipe];
    pipes.set(id, (distanceM) => beganM + (withArrow ? distanceM : lengthM - distanceM));
    at = withArrow ? pipe.to : pipe.from;
    startM += lengthM;
    nodes.set(at, startM);
  }
  return { nodes, pipes };
}

function pointAt(
  points: readonly ProfilePoint[],
  distanceM: number,
): Pick<GaugeOnWay, 'tapElevationM' | 'pressurePa'> | undefined {
  const after = points.findIndex((point) => point.distanceM >= distanceM - 1e-9);
  const [from, to] = [points[Math.max(0, after - 1)], points[after]];
  if (from === undefined || to === undefined) return undefined;
  const lengthM = to.distanceM - from.distanceM;
  const share = lengthM === 0 ? 1 : Math.min(1, Math.max(0, (distanceM - from.distanceM) / lengthM));
  return {
    tapElevationM: from.elevationM + share * (to.elevationM - from.elevationM),
    pressurePa: from.pressurePa + share * (to.pressurePa - from.pressurePa),
  };
}
