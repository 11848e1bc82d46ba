import type { NetworkDocument, PipeRun, RoutePiece } from '@riseback/network';
import type { TriedValue } from './trial';

/**
 * What must go along when a node is set higher or lower: the pieces of a route add up to the pipe's rise, so the steepest piece of
 * each adjoining route takes the difference, and grows where it would be shorter than its rise; with it the pipe. A pipe without a
 * route grows where it would be shorter than its rise.
 */
export function routesAfterRaising(
  document: NetworkDocument,
  elevations: ReadonlyMap<string, number>,
): readonly TriedValue[] {
  const elevationM = (id: string): number => elevations.get(id) ?? document.nodes.get(id)?.value.elevationM ?? 0;
  return [...document.pipes.values()].flatMap(({ value: pipe }) => {
    if (!elevations.has(pipe.from) && !elevations.has(pipe.to)) return [];
    return fitted(pipe, elevationM(pipe.to) - elevationM(pipe.from));
  });
}

function fitted(pipe: PipeRun, riseM: number): TriedValue[] {
  const { id, lengthM, route } = pipe;
  const set = (key: string, to: unknown): TriedValue => ({ in: 'pipes', id, key, to });
  if (route === undefined) return Math.abs(riseM) > lengthM ? [set('lengthM', Math.abs(riseM))] : [];
  const differenceM = riseM - sum(route.map((piece) => piece.riseM));
  if (Math.abs(differenceM) < NOTHING_M) return [];
  const steepest = route.reduce(
    (best, { riseM: rise }, i) => (Math.abs(rise) > Math.abs(route[best]?.riseM ?? 0) ? i : best),
    0,
  );
  const pieces = route.map((piece, i): RoutePiece => {
    if (i !== steepest) return piece;
    const rise = piece.riseM + differenceM;
    // a riser goes on as a riser; what was longer than its rise keeps what it had beside it
    const beside = piece.lengthM - Math.abs(piece.riseM);
    return {
      lengthM: beside < NOTHING_M ? Math.max(Math.abs(rise), NOTHING_M) : Math.max(piece.lengthM, Math.abs(rise)),
      riseM: rise,
    };
  });
  const length = lengthM + sum(pieces.map((piece) => piece.lengthM)) - sum(route.map((piece) => piece.lengthM));
  return [set('route', pieces), ...(length === lengthM ? [] : [set('lengthM', length)])];
}

/** Less than a tape measure tells. */
const NOTHING_M = 1e-4;

function sum(numbers: readonly number[]): number {
  return numbers.reduce((total, number) => total + number, 0);
}
