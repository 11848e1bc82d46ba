import { SATURATION_RANGE_PA, saturationFromEquations, type SaturationState } from './saturation-state';
import { requireWithin } from './steam-range-error';

/** Cells of equal width in ln p. The largest relative error falls with the fourth power of this number; see the sweep in its spec. */
const CELLS = 160;
/**
 * Interpolated properties, in the order of columnsAt. The vapour's density is kept as p/ρ, which hardly varies, where ρ itself grows
 * ten-thousandfold over the range.
 */
const COLUMNS = 8;
/** Each node keeps its values and then its slopes, so that a cell, two neighbouring nodes, is one run of 256 bytes. */
const NODE_SIZE = 2 * COLUMNS;
/** Step in ln p of the five-point difference that gives the slopes at the nodes. */
const SLOPE_STEP = 2e-3;

const LN_LOW = Math.log(SATURATION_RANGE_PA[0]);
const CELL_WIDTH = (Math.log(SATURATION_RANGE_PA[1]) - LN_LOW) / CELLS;
const CELLS_PER_LN = 1 / CELL_WIDTH;

let nodes: Float64Array | undefined;

/**
 * Both phases at saturation, from a table in ln p that is built once from saturationStateDirect, at the first call. Between its
 * nodes each property is a cubic Hermite polynomial, so values and slopes run on smoothly from cell to cell.
 * @param pressurePa p [Pa absolute]
 * @throws SteamRangeError outside SATURATION_RANGE_PA, and for NaN
 * @remarks Within 1e-7 of the direct equations in every property over the whole range (swept in the spec), more than ten times faster.
 */
export function saturationState(pressurePa: number): SaturationState {
  requireWithin('pressure', pressurePa, SATURATION_RANGE_PA, 'boiling water');
  const table = (nodes ??= buildNodes());
  const position = (Math.log(pressurePa) - LN_LOW) * CELLS_PER_LN;
  const cell = cellAt(position);
  const t = position - cell;
  const at = cell * NODE_SIZE;
  const rise = t * t * (3 - 2 * t);
  const here = t * (1 - t) * (1 - t);
  const next = t * t * (t - 1);
  return {
    pressurePa,
    temperatureK: hermite(table, at, rise, here, next),
    liquidDensityKgM3: hermite(table, at + 1, rise, here, next),
    vapourDensityKgM3: pressurePa / hermite(table, at + 2, rise, here, next),
    liquidEnthalpyJKg: hermite(table, at + 3, rise, here, next),
    vapourEnthalpyJKg: hermite(table, at + 4, rise, here, next),
    liquidViscosityPaS: hermite(table, at + 5, rise, here, next),
    vapourViscosityPaS: hermite(table, at + 6, rise, here, next),
    surfaceTensionNM: hermite(table, at + 7, rise, here, next),
  };
}

/** How the boiling line runs on with pressure: each property's derivative along it, per Pa. */
export interface SaturationSlopes {
  readonly temperatureKPerPa: number;
  readonly liquidDensityKgM3PerPa: number;
  readonly vapourDensityKgM3PerPa: number;
  readonly liquidEnthalpyJKgPerPa: number;
  readonly vapourEnthalpyJKgPerPa: number;
}

/**
 * Derivatives of saturationState along the boiling line: those of its own polynomials, so a march and its derivative agree.
 * @param pressurePa p [Pa absolute]
 * @throws SteamRangeError outside SATURATION_RANGE_PA, and for NaN
 * @remarks Off by less than 1e-4 of what the property typically changes per unit of ln p (swept in the spec).
 */
export function saturationSlopes(pressurePa: number): SaturationSlopes {
  requireWithin('pressure', pressurePa, SATURATION_RANGE_PA, 'boiling water');
  const table = (nodes ??= buildNodes());
  const position = (Math.log(pressurePa) - LN_LOW) * CELLS_PER_LN;
  const cell = cellAt(position);
  const t = position - cell;
  const at = cell * NODE_SIZE;
  const value = (column: number): number =>
    hermite(table, at + column, t * t * (3 - 2 * t), t * (1 - t) * (1 - t), t * t * (t - 1));
  // derivatives of the three weights above; ln p turns a slope per cell into one per Pa
  const perPa = CELLS_PER_LN / pressurePa;
  const slope = (column: number): number =>
    perPa * weighted(table, at + column, 6 * t * (1 - t), (1 - t) * (1 - 3 * t), t * (3 * t - 2));
  const pressureByDensity = value(2);
  return {
    temperatureKPerPa: slope(0),
    liquidDensityKgM3PerPa: slope(1),
    vapourDensityKgM3PerPa: (1 - (pressurePa / pressureByDensity) * slope(2)) / pressureByDensity,
    liquidEnthalpyJKgPerPa: slope(3),
    vapourEnthalpyJKgPerPa: slope(4),
  };
}

/** The upper end of the range belongs to the last cell, and rounding must not fall out of either end. */
function cellAt(position: number): number {
  return Math.max(0, Math.min(Math.floor(position), CELLS - 1));
}

function hermite(table: Float64Array, at: number, rise: number, here: number, next: number): number {
  return (table[at] as number) + weighted(table, at, rise, here, next);
}

/** The sum of the weights by what they weigh: the step to the next node and the slopes at both. */
function weighted(table: Float64Array, at: number, rise: number, here: number, next: number): number {
  return (
    rise * ((table[at + NODE_SIZE] as number) - (table[at] as number)) +
    here * (table[at + COLUMNS] as number) +
    next * (table[at + NODE_SIZE + COLUMNS] as number)
  );
}

function buildNodes(): Float64Array {
  const table = new Float64Array((CELLS + 1) * NODE_SIZE);
  for (let node = 0; node <= CELLS; node++) {
    const lnP = LN_LOW + node * CELL_WIDTH;
    const [before2, before1, here, after1, after2] = [-2, -1, 0, 1, 2].map((steps) =>
      columnsAt(lnP + steps * SLOPE_STEP),
    ) as [number[], number[], number[], number[], number[]];
    for (let column = 0; column < COLUMNS; column++) {
      const of = (row: number[]): number => row[column] as number;
      const slope = (of(before2) - 8 * of(before1) + 8 * of(after1) - of(after2)) / (12 * SLOPE_STEP);
      table[node * NODE_SIZE + column] = of(here);
      // per cell, not per unit of ln p: saves a multiplication in each look-up
      table[node * NODE_SIZE + COLUMNS + column] = slope * CELL_WIDTH;
    }
  }
  return table;
}

function columnsAt(lnP: number): number[] {
  const state = saturationFromEquations(Math.exp(lnP));
  return [
    state.temperatureK,
    state.liquidDensityKgM3,
    state.pressurePa / state.vapourDensityKgM3,
    state.liquidEnthalpyJKg,
    state.vapourEnthalpyJKg,
    state.liquidViscosityPaS,
    state.vapourViscosityPaS,
    state.surfaceTensionNM,
  ];
}
