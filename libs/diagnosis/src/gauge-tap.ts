import type { Gauge, NetworkFile, PipeRun, RoutePiece } from '@riseback/network';

/** Where a gauge's tap stands: at a node, or some way along a pipe from its start. */
export type GaugeTap =
  | { readonly at: 'node'; readonly node: string; readonly elevationM: number }
  | { readonly at: 'pipe'; readonly pipe: PipeRun; readonly distanceM: number; readonly elevationM: number };

/** @returns undefined where the gauge's element is not in the file */
export function gaugeTap(
  { nodes, pipes }: Pick<NetworkFile, 'nodes' | 'pipes'>,
  gauge: Pick<Gauge, 'node' | 'pipe' | 'distanceM'>,
): GaugeTap | undefined {
  if (gauge.node !== undefined) {
    const node = nodes.find(({ id }) => id === gauge.node);
    return node && { at: 'node', node: node.id, elevationM: node.elevationM };
  }
  const pipe = pipes.find(({ id }) => id === gauge.pipe);
  const from = nodes.find(({ id }) => id === pipe?.from);
  const to = nodes.find(({ id }) => id === pipe?.to);
  if (pipe === undefined || from === undefined || to === undefined) return undefined;
  // what lies beyond the pipe's end (it was shortened since) taps its end
  const distanceM = Math.min(gauge.distanceM ?? 0, pipe.lengthM);
  const pieces = routeOf(pipe, to.elevationM - from.elevationM);
  return { at: 'pipe', pipe, distanceM, elevationM: from.elevationM + riseUpTo(pieces, distanceM) };
}

/** A pipe's pieces from its start; one straight piece where it has no route. */
export function routeOf(pipe: PipeRun, riseM: number): readonly RoutePiece[] {
  return pipe.route ?? [{ lengthM: pipe.lengthM, riseM }];
}

/** The same way with a cut at a distance. */
export function cutAt(pieces: readonly RoutePiece[], distanceM: number): { before: RoutePiece[]; after: RoutePiece[] } {
  const before: RoutePiece[] = [];
  const after: RoutePiece[] = [];
  let startM = 0;
  for (const piece of pieces) {
    const { lengthM, riseM } = piece;
    const share = lengthM === 0 ? 0 : (distanceM - startM) / lengthM;
    if (share >= 1) before.push(piece);
    else if (share <= 0) after.push(piece);
    else {
      before.push({ lengthM: share * lengthM, riseM: share * riseM });
      after.push({ lengthM: (1 - share) * lengthM, riseM: (1 - share) * riseM });
    }
    startM += lengthM;
  }
  return { before, after };
}

function riseUpTo(pieces: readonly RoutePiece[], distanceM: number): number {
  return cutAt(pieces, distanceM).before.reduce((sum, { riseM }) => sum + riseM, 0);
}
