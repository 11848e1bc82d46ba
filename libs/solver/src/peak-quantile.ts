import { findRootBracketed } from '@riseback/numerics';

/** Sources that discharge together: nothing, or all of them at their peak. */
export interface PeakGroup {
  readonly peakKgS: number;
  /** Share of the time at the peak. */
  readonly probability: number;
}

/** The flow that is not exceeded this share of the time. */
export const PROBABLE_SHARE = 0.95;
/** So many of the largest groups are counted out; what the others give together is taken as normally distributed. */
export const COUNTED_GROUPS = 16;

/** Cells over the range of the counted groups where the others' normal spread is laid over them. */
const CELLS = 512;
/** How far a sum of probabilities may be off by rounding. */
const ROUNDING = 1e-12;

/**
 * Flow of independent groups together that is not exceeded 95 % of the time.
 *     smallest s with P(Σ X_i ≤ s) ≥ 0.95,   X_i = peak_i with probability p_i, else 0
 * @param groups largest peak first
 * @returns [kg/s]; exact for up to 16 groups, else the 16 largest counted in 512 cells with the normal distribution of the rest laid
 *   over them, within 0.2 % of their sum
 */
export function probableFlowKgS(groups: readonly PeakGroup[]): number {
  if (groups.length <= COUNTED_GROUPS) return exactQuantile(groups);
  const counted = groups.slice(0, COUNTED_GROUPS);
  let [mean, variance] = [0, 0];
  for (const { peakKgS, probability } of groups.slice(COUNTED_GROUPS)) {
    mean += probability * peakKgS;
    variance += probability * (1 - probability) * peakKgS * peakKgS;
  }
  if (variance === 0) return mean + exactQuantile(counted);
  const deviation = Math.sqrt(variance);
  const range = counted.reduce((sum, { peakKgS }) => sum + peakKgS, 0);
  const weights = weightsInCells(counted, range);
  const width = range / CELLS;
  const below = (flowKgS: number): number => {
    let share = 0;
    for (let cell = 0; cell <= CELLS; cell++) {
      const weight = weights[cell] as number;
      if (weight > 0) share += weight * normalShare((flowKgS - mean - cell * width) / deviation);
    }
    return share - PROBABLE_SHARE;
  };
  return findRootBracketed(below, mean - 9 * deviation, mean + range + 9 * deviation, {
    xTolerance: 1e-6 * (mean + range),
    where: 'the probable flow',
  });
}

/** Both halves of the groups are counted out and sorted; then the share below a flow takes one pass over each. */
function exactQuantile(groups: readonly PeakGroup[]): number {
  const half = Math.ceil(groups.length / 2);
  const first = allSums(groups.slice(0, half));
  const second = allSums(groups.slice(half));
  const reaches = (flowKgS: number): boolean => {
    let share = 0;
    let shareOfSecond = 0;
    let next = 0;
    for (let i = first.length - 1; i >= 0; i--) {
      const { flowKgS: own, probability } = first[i] as Sum;
      while (next < second.length && (second[next] as Sum).flowKgS <= flowKgS - own) {
        shareOfSecond += (second[next] as Sum).probability;
        next++;
      }
      share += probability * shareOfSecond;
    }
    return share >= PROBABLE_SHARE - ROUNDING;
  };
  let low = 0;
  let high = groups.reduce((sum, { peakKgS }) => sum + peakKgS, 0) * (1 + ROUNDING);
  if (reaches(low)) return low;
  while (high - low > ROUNDING * high) {
    const middle = (low + high) / 2;
    if (reaches(middle)) high = middle;
    else low = middle;
  }
  return high;
}

interface Sum {
  readonly flowKgS: number;
  readonly probability: number;
}

function allSums(groups: readonly PeakGroup[]): Sum[] {
  let sums: Sum[] = [{ flowKgS: 0, probability: 1 }];
  for (const { peakKgS, probability } of groups) {
    const at = sums.map((sum) => ({ flowKgS: sum.flowKgS + peakKgS, probability: sum.probability * probability }));
    const not = sums.map((sum) => ({ flowKgS: sum.flowKgS, probability: sum.probability * (1 - probability) }));
    sums = [...not, ...at];
  }
  return sums.sort((a, b) => a.flowKgS - b.flowKgS);
}

/** The distribution of the groups' sum in cells, each sum shared between its two neighbours so that the mean stays. */
function weightsInCells(groups: readonly PeakGroup[], range: number): Float64Array {
  let weights = new Float64Array(CELLS + 1);
  weights[0] = 1;
  for (const { peakKgS, probability } of groups) {
    const next = weights.map((weight) => weight * (1 - probability));
    const shift = (peakKgS / range) * CELLS;
    const whole = Math.floor(shift);
    const rest = shift - whole;
    for (let cell = 0; cell <= CELLS; cell++) {
      const weight = (weights[cell] as number) * probability;
      if (weight === 0) continue;
      addTo(next, cell + whole, weight * (1 - rest));
      addTo(next, cell + whole + 1, weight * rest);
    }
    weights = next;
  }
  return weights;
}

function addTo(weights: Float64Array, cell: number, weight: number): void {
  const at = Math.min(cell, CELLS);
  weights[at] = (weights[at] as number) + weight;
}

/**
 * Share of a normal distribution below z, within 1.5e-7.
 * Source: Abramowitz & Stegun, Handbook of Mathematical Functions, 7.1.26.
 */
function normalShare(z: number): number {
  const x = Math.abs(z) / Math.SQRT2;
  const t = 1 / (1 + 0.3275911 * x);
  const polynomial = t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  const upper = (polynomial * Math.exp(-x * x)) / 2;
  return z > 0 ? 1 - upper : upper;
}
