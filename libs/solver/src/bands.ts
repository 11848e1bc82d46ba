import { crediblyIn, inletPressureBy, type Contender, type Contenders } from './contenders';
import type { PipeFlow } from './flow-and-energy';
import type { PipeGeometry } from './pipe-geometry';
import type { PieceEnd } from './pipe-result';
import type { Band } from './solve-result';

/** One pipe as the bands walk it. */
export interface BandStep {
  readonly geometry: PipeGeometry;
  readonly flow: PipeFlow;
  readonly withArrow: boolean;
  readonly ends: readonly PieceEnd[];
}

/** By contender of the spread; undefined from where it has no solution. */
export type SpreadPressures = readonly (number | undefined)[];

/** The credible band at a node, on the way up. */
export interface CrediblePressures {
  readonly lowPa: number;
  readonly highPa: number;
  /** Credible methods that had no solution on the way. */
  readonly unsolved: ReadonlySet<string>;
}

const NONE: ReadonlySet<string> = new Set();

export function spreadAtEnd({ spread }: Contenders, pressurePa: number): SpreadPressures {
  return spread.map(() => pressurePa);
}

export function credibleAtEnd(pressurePa: number): CrediblePressures {
  return { lowPa: pressurePa, highPa: pressurePa, unsolved: NONE };
}

/** At a pipe's inlet from what stands at its outlet: each method goes its own way from the receiver up. */
export function spreadUpPipe({ spread }: Contenders, step: BandStep, below: SpreadPressures): SpreadPressures {
  return spread.map((contender, i) => {
    const outletPa = below[i];
    return outletPa === undefined ? undefined : inletBy(contender, step, outletPa);
  });
}

/**
 * At a pipe's inlet, of the methods credible in it the lowest from the lowest and the highest from the highest: every choice of a
 * method for each pipe lies within.
 * @param chosenRisePa what the chosen method found for this pipe: it stands in where no credible method has a solution
 */
export function credibleUpPipe(
  contenders: Contenders,
  step: BandStep,
  below: CrediblePressures,
  chosenRisePa: number,
): CrediblePressures {
  let [lowPa, highPa] = [Infinity, -Infinity];
  let unsolved = below.unsolved;
  for (const contender of crediblyIn(contenders, step.ends)) {
    const fromLowPa = inletBy(contender, step, below.lowPa);
    const fromHighPa = below.highPa === below.lowPa ? fromLowPa : inletBy(contender, step, below.highPa);
    if (fromLowPa === undefined || fromHighPa === undefined) unsolved = new Set([...unsolved, contender.name]);
    lowPa = Math.min(lowPa, fromLowPa ?? Infinity);
    highPa = Math.max(highPa, fromHighPa ?? -Infinity);
  }
  if (lowPa === Infinity) lowPa = below.lowPa + chosenRisePa;
  if (highPa === -Infinity) highPa = below.highPa + chosenRisePa;
  return { lowPa, highPa, unsolved };
}

function inletBy(contender: Contender, { geometry, flow, withArrow }: BandStep, outletPa: number): number | undefined {
  return inletPressureBy(contender, geometry, flow, withArrow, outletPa);
}

/** Both bands of a trap. */
export interface TrapBands {
  readonly spread: Band;
  readonly credible: Band;
}

/** As they are told. The spread always holds the chosen method's own result. */
export function bandsOfTrap(
  contenders: Contenders,
  spreadPa: SpreadPressures,
  { lowPa, highPa, unsolved }: CrediblePressures,
  chosenPa: number,
): TrapBands {
  const found = spreadPa.filter((pressurePa) => pressurePa !== undefined);
  const lost = contenders.spread.filter((_, i) => spreadPa[i] === undefined).map(({ name }) => name);
  return {
    spread: band(Math.min(chosenPa, ...found), Math.max(chosenPa, ...found), lost),
    credible: band(lowPa, highPa, [...unsolved]),
  };
}

function band(lowPa: number, highPa: number, withoutSolution: readonly string[]): Band {
  return withoutSolution.length === 0 ? { lowPa, highPa } : { lowPa, highPa, withoutSolution };
}
