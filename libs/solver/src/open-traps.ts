import { CHOKED_PRESSURE_RATIO, napierOrificeFlowKgS, orificeSteamFlowKgS } from '@riseback/hydraulics';
import { findRootBracketed, NoConvergenceError } from '@riseback/numerics';
import { requireBoilingPressure } from '@riseback/steam';
import { atElement, ElementFailure } from './element-failure';
import { amount, findingWords, say } from './finding-text';
import { networkState, type NetworkState, type PreparedNetwork } from './network-state';
import type { OperatingNode, OperatingTrap } from './operating-case';
import type { MarchOptions } from './pipe-march';
import type { SolveWarning } from './solve-result';

/** Steam is found to this share of what the orifice passes choked. */
const STEAM_TOLERANCE = 1e-7;
/** Rounds over the open traps of a network before it is given up. */
const MAXIMUM_ROUNDS = 50;

interface OpenTrap {
  readonly index: number;
  readonly trap: OperatingTrap;
  readonly orificeM: number;
  readonly chokedKgS: number;
}

/**
 * Solves a network whose open traps blow live steam into the return, on top of their load, each against the very back pressure that
 * the steam makes.
 *     m_i = orifice(p_in, p_back,i(m))      choked below 0.577 of the inlet, where the back pressure does not matter
 * Choked traps need one solve. The others are found one at a time, by a bracketed root between nothing and their choked flow: more
 * steam raises the back pressure, which lowers the steam, so there is one; and in rounds, until none moves.
 * @param inCase nodes in the case, without their steam
 * @returns the nodes with their steam, and the state they make
 * @throws ElementFailure where the network has no solution even without the steam, or the rounds do not settle
 */
export function stateWithOpenTraps(
  prepared: PreparedNetwork,
  inCase: readonly OperatingNode[],
  march: MarchOptions,
): { readonly nodes: readonly OperatingNode[]; readonly state: NetworkState } {
  const open = openTraps(inCase);
  if (open.length === 0) return { nodes: inCase, state: networkState(prepared, inCase, march) };
  const nodes = [...inCase];
  const blow = ({ index, trap }: OpenTrap, liveSteamKgS: number): void => {
    nodes[index] = { ...trap, liveSteamKgS };
  };
  for (const one of open) blow(one, one.chokedKgS);
  let state = attempt();
  for (let round = 1; !open.every((one) => isSettled(one)); round++) {
    if (round > MAXIMUM_ROUNDS) throw unsettled(open);
    let moved = 0;
    for (const one of open) {
      const before = steamAt(one.index);
      if (!isSettled(one)) settle(one);
      moved = Math.max(moved, Math.abs(steamAt(one.index) - before) / one.chokedKgS);
      state = attempt();
    }
    // close to the inlet's pressure the steam turns on a hair: there the march's own tolerance is felt in the residual
    if (moved <= 10 * STEAM_TOLERANCE) break;
  }
  // the last attempt may have had no solution, for a reason of its own: told with its place
  return { nodes, state: state ?? networkState(prepared, nodes, march) };

  /** The state with the steam as it stands; undefined where so much steam has no solution. */
  function attempt(): NetworkState | undefined {
    try {
      return networkState(prepared, nodes, march);
    } catch (error) {
      if (error instanceof ElementFailure) return undefined;
      throw error;
    }
  }

  /** What the orifice would pass against what the present steam makes, less that steam, over the choked flow. */
  function surplus({ index, trap, orificeM, chokedKgS }: OpenTrap): number {
    const present = steamAt(index);
    // no solution stands for a back pressure beyond any inlet
    const passes =
      state === undefined
        ? 0
        : orificeSteamFlowKgS(trap.inletPressurePa, state.walk.pressurePa[index] as number, orificeM);
    return (passes - present) / chokedKgS;
  }

  function isSettled(one: OpenTrap): boolean {
    if (state === undefined) return steamAt(one.index) === 0;
    return Math.abs(surplus(one)) <= 10 * STEAM_TOLERANCE;
  }

  function settle(one: OpenTrap): void {
    const { chokedKgS } = one;
    const surplusOf = (steamKgS: number): number => {
      blow(one, steamKgS);
      state = attempt();
      return surplus(one);
    };
    if (surplusOf(0) <= STEAM_TOLERANCE) return;
    const root = findRootBracketed(surplusOf, 0, chokedKgS, {
      xTolerance: STEAM_TOLERANCE * chokedKgS,
      fTolerance: STEAM_TOLERANCE,
      where: 'the steam of an open trap',
    });
    blow(one, root);
  }

  function steamAt(index: number): number {
    const node = nodes[index];
    return node?.kind === 'trap' ? (node.liveSteamKgS ?? 0) : 0;
  }

  function unsettled(traps: readonly OpenTrap[]): unknown {
    const worst = traps.find((one) => !isSettled(one)) ?? (traps[0] as OpenTrap);
    const residual = state === undefined ? 1 : surplus(worst);
    return atElement(
      'node',
      worst.trap.node,
      worst.index,
      new NoConvergenceError('the steam of the traps that failed open', MAXIMUM_ROUNDS, residual),
    );
  }
}

/** @throws ElementFailure where an inlet lies outside the steam properties */
function openTraps(nodes: readonly OperatingNode[]): OpenTrap[] {
  const open: OpenTrap[] = [];
  nodes.forEach((trap, index) => {
    if (trap.kind !== 'trap' || trap.openOrificeM === undefined) return;
    const { openOrificeM: orificeM, inletPressurePa, node } = trap;
    try {
      requireBoilingPressure(inletPressurePa);
    } catch (error) {
      throw atElement('node', node, index, error);
    }
    open.push({ index, trap, orificeM, chokedKgS: napierOrificeFlowKgS(inletPressurePa, orificeM) });
  });
  return open;
}

/** What a trap that has failed open does to its return; nothing of any other. */
export function failedOpen(
  { node, inletPressurePa, liveSteamKgS }: OperatingTrap,
  backPressurePa: number,
): SolveWarning | undefined {
  if (liveSteamKgS === undefined) return undefined;
  const isChoked = backPressurePa <= CHOKED_PRESSURE_RATIO * inletPressurePa;
  const text = say`The trap has failed open in this case and blows ${amount('massFlow', liveSteamKgS)} of live steam into the return on top of its load${isChoked ? '' : ', held back by what stands behind it'}: it raises the back pressure of every trap on the same way and its heat is lost.`;
  const remedy = say`Shut the trap off and mend it; the line and whatever vents it are hot, and scald.`;
  return { code: 'failedOpen', element: node.id, verdict: 'watch', value: liveSteamKgS, ...findingWords(text, remedy) };
}
