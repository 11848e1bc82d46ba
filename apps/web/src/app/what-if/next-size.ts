import { pipeBore, pipeSizes, type PipeBore } from '@riseback/hydraulics';
import type { PipeRun } from '@riseback/network';

/** For a pipe that is given by its bore: the usual schedule for condensate piping (common practice). */
export const USUAL_SCHEDULE = '80';

/** The sizes that a pipe can be made in, by its own schedule, the smallest first. */
export function sizesFor({ size }: Pick<PipeRun, 'size'>): readonly PipeBore[] {
  const schedule = size?.schedule ?? USUAL_SCHEDULE;
  return pipeSizes().find((one) => one.schedule === schedule)?.sizes ?? [];
}

/**
 * The size so many steps up (or down, below 0) in the pipe's own schedule; for a pipe given by its bore, in the usual one.
 * @returns undefined past the ends of the schedule, and for a size that the catalogue does not have
 */
export function sizeAway(pipe: PipeRun, steps: number): PipeBore | undefined {
  const bore = pipe.size === undefined ? pipe.insideDiameterM : pipeBore(pipe.size)?.insideDiameterM;
  if (bore === undefined) return undefined;
  const wider = sizesFor(pipe).filter(({ insideDiameterM }) => insideDiameterM > bore + SAME_BORE_M);
  const narrower = sizesFor(pipe).filter(({ insideDiameterM }) => insideDiameterM < bore - SAME_BORE_M);
  return steps > 0 ? wider[steps - 1] : narrower.at(steps);
}

/** Two bores nearer than this are one. */
const SAME_BORE_M = 1e-6;
