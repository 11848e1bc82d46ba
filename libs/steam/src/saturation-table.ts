import { SATURATION_RANGE_PA, saturationFromEquations, type SaturationState } from './saturation-state';
import { requireWithin } from './steam-range-error';

/**
 * Cells of equal width in p^¼, the variable of IAPWS's own boiling line: two square roots cost half of what ln p does. The largest
 * relative error falls with the fourth power of this number; see the sweep in its spec.
 */
const CELLS = 512;
/**
 * Interpolated properties, in the order of columnsAt. The vapour's density is kept as p/ρ, which hardly varies, where ρ itself grows
 * ten-thousandfold over the range.
 */
const COLUMNS = 8;
/** Of a cubic in the share of the cell that is passed, lowest power first; those of all columns together are one run of 256 bytes. */
const COEFFICIENTS = 4;
const CELL_SIZE = COLUMNS * COEFFICIENTS;
/** Step, in cells, of the five-point difference that gives the slopes at the nodes. */
const SLOPE_STEP = 0.03;

const LOWEST_ROOT = fourthRoot(SATURATION_RANGE_PA[0]);
const CELL_WIDTH = (fourthRoot(SATURATION_RANGE_PA[1]) - LOWEST_ROOT) / CELLS;
const CELLS_PER_ROOT = 1 / CELL_WIDTH;

let cells: Float64Array | undefined;

/** A state that its keeper has filled in anew for each pressure. */
export type SaturationRecord = { -readonly [Property in keyof SaturationState]: SaturationState[Property] };

/**
 * Both phases at saturation, from a table in p^¼ that is built once from saturationStateDirect, at the first call. Between its
 * nodes each property is a cubic Hermite polynomial, so values and slopes run on smoothly from cell to cell.
 * @param pressurePa p [Pa absolute]
 * @throws SteamRangeError outside SATURATION_RANGE_PA, and for NaN
 * @remarks Within 1e-7 of the direct equations in every property over the whole range (swept in the spec), more than ten times faster.
 */
export function saturationState(pressurePa: number): SaturationState {
  const record = blankSaturation();
  fillSaturation(record, pressurePa);
  return record;
}

/** A record for {@link fillSaturation}, of no state yet. */
export function blankSaturation(): SaturationRecord {
  return {
    pressurePa: NaN,
    temperatureK: NaN,
    liquidDensityKgM3: NaN,
    vapourDensityKgM3: NaN,
    liquidEnthalpyJKg: NaN,
    vapourEnthalpyJKg: NaN,
    liquidViscosityPaS: NaN,
    vapourViscosityPaS: NaN,
    surfaceTensionNM: NaN,
  };
}

/**
 * {@link saturationState} into a record that the caller keeps, for inner loops that should not make an object at every step.
 * @throws SteamRangeError likewise; the record is then as it was
 */
export function fillSaturation(record: SaturationRecord, pressurePa: number): void {
  requireBoilingPressure(pressurePa);
  const table = (cells ??= buildCells());
  const position = (fourthRoot(pressurePa) - LOWEST_ROOT) * CELLS_PER_ROOT;
  const cell = cellAt(position);
  const t = position - cell;
  const at = cell * CELL_SIZE;
  // offsets spelt out: looked up from constants they cost a tenth of the whole
  record.pressurePa = pressurePa;
  record.temperatureK = cubic(table, at, t);
  record.liquidDensityKgM3 = cubic(table, at + 4, t);
  record.vapourDensityKgM3 = pressurePa / cubic(table, at + 8, t);
  record.liquidEnthalpyJKg = cubic(table, at + 12, t);
  record.vapourEnthalpyJKg = cubic(table, at + 16, t);
  record.liquidViscosityPaS = cubic(table, at + 20, t);
  record.vapourViscosityPaS = cubic(table, at + 24, t);
  record.surfaceTensionNM = cubic(table, at + 28, t);
}

/**
 * Whether {@link saturationState} answers, without looking it up.
 * @throws SteamRangeError where it does not
 */
export function requireBoilingPressure(pressurePa: number): void {
  requireWithin('pressure', pressurePa, SATURATION_RANGE_PA, 'boiling water');
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
  requireBoilingPressure(pressurePa);
  const table = (cells ??= buildCells());
  const root = fourthRoot(pressurePa);
  const position = (root - LOWEST_ROOT) * CELLS_PER_ROOT;
  const cell = cellAt(position);
  const t = position - cell;
  const at = cell * CELL_SIZE;
  // d(p^¼)/dp turns a slope per cell into one per Pa
  const perPa = (CELLS_PER_ROOT * root) / (4 * pressurePa);
  const slope = (column: number): number => perPa * cubicSlope(table, at + column * COEFFICIENTS, t);
  const pressureByDensity = cubic(table, at + 2 * COEFFICIENTS, t);
  return {
    temperatureKPerPa: slope(0),
    liquidDensityKgM3PerPa: slope(1),
    vapourDensityKgM3PerPa: (1 - (pressurePa / pressureByDensity) * slope(2)) / pressureByDensity,
    liquidEnthalpyJKgPerPa: slope(3),
    vapourEnthalpyJKgPerPa: slope(4),
  };
}

function fourthRoot(pressurePa: number): number {
  return Math.sqrt(Math.sqrt(pressurePa));
}

/** The upper end of the range belongs to the last cell, and rounding must not fall out of either end. */
function cellAt(position: number): number {
  return Math.max(0, Math.min(Math.floor(position), CELLS - 1));
}

function cubic(table: Float64Array, at: number, t: number): number {
  const upper = (table[at + 2] as number) + t * (table[at + 3] as number);
  return (table[at] as number) + t * ((table[at + 1] as number) + t * upper);
}

/** Per cell. */
function cubicSlope(table: Float64Array, at: number, t: number): number {
  const upper = 2 * (table[at + 2] as number) + t * 3 * (table[at + 3] as number);
  return (table[at + 1] as number) + t * upper;
}

/** Each cell's cubics run from its node to the next with the slopes of both. */
function buildCells(): Float64Array {
  const table = new Float64Array(CELLS * CELL_SIZE);
  let here = nodeAt(0);
  for (let cell = 0; cell < CELLS; cell++) {
    const next = nodeAt(cell + 1);
    for (let column = 0; column < COLUMNS; column++) {
      const [value, slope] = [here.values[column] as number, here.slopes[column] as number];
      const nextSlope = next.slopes[column] as number;
      const rise = (next.values[column] as number) - value;
      const at = cell * CELL_SIZE + column * COEFFICIENTS;
      table.set([value, slope, 3 * rise - 2 * slope - nextSlope, slope + nextSlope - 2 * rise], at);
    }
    here = next;
  }
  return table;
}

/** Values of all columns at a node, and their slopes per cell. */
function nodeAt(node: number): { readonly values: number[]; readonly slopes: number[] } {
  const [before2, before1, values, after1, after2] = [-2, -1, 0, 1, 2].map((steps) =>
    columnsAt(LOWEST_ROOT + (node + steps * SLOPE_STEP) * CELL_WIDTH),
  ) as [number[], number[], number[], number[], number[]];
  const slopes = values.map((_, column) => {
    const of = (row: number[]): number => row[column] as number;
    return (of(before2) - 8 * of(before1) + 8 * of(after1) - of(after2)) / (12 * SLOPE_STEP);
  });
  return { values, slopes };
}

function columnsAt(root: number): number[] {
  const state = saturationFromEquations(root ** 4);
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
