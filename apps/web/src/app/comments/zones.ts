import { drawnNetwork, sheetAround, zoneOf } from '@riseback/figures';
import type { NetworkDocument } from '@riseback/network';

/** The drawing sheet's zone of every element: of a pipe, that of its middle. */
export function zonesOf(document: NetworkDocument): ReadonlyMap<string, string> {
  const { nodes, pipes } = drawnNetwork(document);
  const drawn = [...nodes.values(), ...pipes.values()];
  const sheet = sheetAround([
    ...[...nodes.values()].map(({ at }) => at),
    ...[...pipes.values()].flatMap(({ points }) => points),
  ]);
  return new Map(drawn.map(({ id, at }) => [id, zoneOf(at, sheet)]));
}
