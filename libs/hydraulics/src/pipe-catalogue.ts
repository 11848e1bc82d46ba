import { NOMINAL_SIZES, PIPE_CATALOGUE, type NominalSize, type PipeStandard } from './pipe-dimensions';

/** How the network file names a pipe: a nominal size in inches and a schedule. */
export interface PipeSizeName {
  readonly nps: string;
  readonly schedule: string;
}

export interface PipeBore {
  readonly standard: string;
  readonly schedule: string;
  readonly nps: string;
  readonly dn: number;
  readonly outsideDiameterM: number;
  readonly wallM: number;
  /** Outside diameter less two nominal walls; the mill's tolerance is not deducted. */
  readonly insideDiameterM: number;
}

export interface PipeSchedule {
  readonly standard: string;
  readonly schedule: string;
  /** In order of size. */
  readonly sizes: readonly PipeBore[];
}

const SCHEDULES: readonly PipeSchedule[] = PIPE_CATALOGUE.flatMap(schedulesOf);
/** By schedule, then by size: one key of both would have to be put together anew for each pipe. */
const BORES = new Map<string, ReadonlyMap<string, PipeBore>>(
  SCHEDULES.map(({ schedule, sizes }) => [schedule, new Map(sizes.map((bore) => [bore.nps, bore]))]),
);

/**
 * The dimensions of a pipe by its size's name, or undefined when no standard in the catalogue makes it. Names are
 * matched exactly: "1-1/2", never "1.5" or "1 1/2", so that a file names a pipe in one way only.
 * @example pipeBore({ nps: '1', schedule: '80' })?.insideDiameterM // 0.0243
 */
export function pipeBore(size: PipeSizeName): PipeBore | undefined {
  return BORES.get(size.schedule)?.get(size.nps);
}

/** All sizes for choosers, grouped by standard and schedule. */
export function pipeSizes(): readonly PipeSchedule[] {
  return SCHEDULES;
}

function schedulesOf({ standard, outsideDiameterMm, wallMm }: PipeStandard): PipeSchedule[] {
  // Object.keys would put '1' and '2' before '1/8': integer-like keys always come first
  const sizesInOrder = Object.entries(NOMINAL_SIZES).sort(([, dnA], [, dnB]) => dnA - dnB) as [NominalSize, number][];
  return Object.entries(wallMm).map(([schedule, walls]) => ({
    standard,
    schedule,
    sizes: sizesInOrder.flatMap(([nps, dn]) => {
      const outside = outsideDiameterMm[nps];
      const wall = walls[nps];
      if (outside === undefined || wall === undefined) return [];
      return [
        {
          standard,
          schedule,
          nps,
          dn,
          outsideDiameterM: metres(outside),
          wallM: metres(wall),
          insideDiameterM: metres(outside - 2 * wall),
        },
      ];
    }),
  }));
}

/** Millimetres to metres, rounded to the micrometre so that 33.4 − 2 × 4.55 is 0.0243 and not 0.024299999999999995. */
function metres(millimetres: number): number {
  return Math.round(millimetres * 1000) / 1e6;
}
