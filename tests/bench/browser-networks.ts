import { headers } from './bench-networks';

const GRID = 40;
const HALLS_IN_A_ROW = 4;
const TRAPS_IN_A_HALL = 20;

interface Node {
  readonly id: string;
  readonly kind: string;
}

/** Halls of a plant laid out on the sheet: along each header twenty traps, the halls side by side. As many pipes as nodes, but one. */
export function laidOut(name: string, pipeCount: number): object {
  const file = headers(name, pipeCount) as { readonly nodes: readonly Node[] };
  return { ...file, nodes: file.nodes.map((node) => ({ ...node, position: placeOf(node) })) };
}

function placeOf({ id, kind }: Node): { readonly x: number; readonly y: number } {
  if (kind === 'receiver') return { x: -4 * GRID, y: 0 };
  const index = Number(id.slice(1));
  const hall = Math.floor(index / TRAPS_IN_A_HALL);
  const x = 2 * GRID * ((index % TRAPS_IN_A_HALL) + (hall % HALLS_IN_A_ROW) * (TRAPS_IN_A_HALL + 2));
  const y = 6 * GRID * Math.floor(hall / HALLS_IN_A_ROW);
  const side = index % 2 === 0 ? -2 : 2;
  return kind === 'trap' ? { x, y: y + side * GRID } : { x, y };
}
