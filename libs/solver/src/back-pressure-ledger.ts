import type { NetworkFile } from '@riseback/network';
import { handCheckLiftPa } from './hand-check';
import { piecesAgainstFlow } from './pipe-geometry';
import { walkOfTrap, type WalkedResult } from './walk-of-trap';

/** One pipe's line in a trap's account of its back pressure. SI, pressures absolute. */
export interface LedgerEntry {
  readonly pipeId: string;
  readonly tag?: string;
  /** Every rise on the way, falls not deducted. */
  readonly riseM: number;
  readonly fallM: number;
  readonly lengthM: number;
  readonly insideDiameterM: number;
  readonly massFlowKgS: number;
  /** Flash quality where the pipe ends, downstream. */
  readonly quality: number;
  readonly staticPa: number;
  readonly frictionPa: number;
  readonly flashPa: number;
  /** What stands at the pipe's upstream end, this line included. */
  readonly runningPressurePa: number;
  readonly handCheckPa: number;
  readonly handCheckRunningPa: number;
}

/**
 * The account of a trap's back pressure, from the end of its walk back to the trap: it starts at `receiverPressurePa`, and the
 * last line's running pressure is the back pressure.
 * @param file the file that was solved
 * @returns no lines for a trap that the result does not have
 */
export function ledger(file: NetworkFile, result: WalkedResult, trapId: string): LedgerEntry[] {
  const walk = walkOfTrap(file, result, trapId);
  if (walk === undefined) return [];
  let handCheckRunningPa = walk.trap.receiverPressurePa;
  return walk.steps.toReversed().map(({ pipe, result: found, geometry, withArrow }) => {
    const pieces = piecesAgainstFlow(geometry.pieces, withArrow);
    const handCheckPa = handCheckLiftPa(pieces);
    handCheckRunningPa += handCheckPa;
    return {
      pipeId: pipe.id,
      ...(pipe.tag === undefined ? {} : { tag: pipe.tag }),
      riseM: sum(pieces.map(({ riseM }) => Math.max(0, riseM))),
      fallM: sum(pieces.map(({ riseM }) => Math.max(0, -riseM))),
      lengthM: pipe.lengthM,
      insideDiameterM: geometry.insideDiameterM,
      massFlowKgS: found.massFlowKgS,
      quality: found.downstreamQuality,
      staticPa: found.staticPa,
      frictionPa: found.frictionPa,
      flashPa: found.flashPa,
      runningPressurePa: found.upstreamPressurePa,
      handCheckPa,
      handCheckRunningPa,
    };
  });
}

function sum(numbers: readonly number[]): number {
  return numbers.reduce((total, number) => total + number, 0);
}
