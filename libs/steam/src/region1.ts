import { fillPowers, propertiesFromGibbs, type GibbsDerivatives, type PhaseProperties } from './gibbs-properties';
import { requireWithin } from './steam-range-error';

/** Where the equation of region 1 is printed to hold: liquid water. */
export const REGION1_RANGE = { pressurePa: [1, 100e6], temperatureK: [273.15, 623.15] } as const;

/**
 * Liquid water at a pressure and a temperature.
 *     γ(π, τ) = Σ nᵢ (7.1 − π)^Iᵢ (τ − 1.222)^Jᵢ,   π = p / 16.53 MPa,   τ = 1386 K / T
 * @param pressurePa p [Pa absolute]
 * @param temperatureK T [K]; above boiling it still answers, for the slightly superheated liquid the equation also describes
 * @throws SteamRangeError outside REGION1_RANGE, and for NaN
 * Source: IAPWS R7-97(2012), section 5.1, equation 7 and Table 2; reproduces Table 5 to its nine digits.
 */
export function region1(pressurePa: number, temperatureK: number): PhaseProperties {
  requireWithin('pressure', pressurePa, REGION1_RANGE.pressurePa, 'liquid water');
  requireWithin('temperature', temperatureK, REGION1_RANGE.temperatureK, 'liquid water');
  return region1Unchecked(pressurePa, temperatureK);
}

/** For iterations inside this library, which may step a hair across an end of the range on their way. */
export function region1Unchecked(pressurePa: number, temperatureK: number): PhaseProperties {
  evaluateGibbs(pressurePa, temperatureK);
  return propertiesFromGibbs(gibbs, pressurePa, temperatureK);
}

// Iᵢ, Jᵢ, nᵢ of Table 2
const TERMS: readonly (readonly [number, number, number])[] = [
  [0, -2, 0.14632971213167],
  [0, -1, -0.84548187169114],
  [0, 0, -0.3756360367204e1],
  [0, 1, 0.33855169168385e1],
  [0, 2, -0.95791963387872],
  [0, 3, 0.15772038513228],
  [0, 4, -0.16616417199501e-1],
  [0, 5, 0.81214629983568e-3],
  [1, -9, 0.28319080123804e-3],
  [1, -7, -0.60706301565874e-3],
  [1, -1, -0.18990068218419e-1],
  [1, 0, -0.32529748770505e-1],
  [1, 1, -0.21841717175414e-1],
  [1, 3, -0.5283835796993e-4],
  [2, -3, -0.47184321073267e-3],
  [2, 0, -0.30001780793026e-3],
  [2, 1, 0.47661393906987e-4],
  [2, 3, -0.44141845330846e-5],
  [2, 17, -0.72694996297594e-15],
  [3, -4, -0.31679644845054e-4],
  [3, 0, -0.28270797985312e-5],
  [3, 6, -0.85205128120103e-9],
  [4, -5, -0.22425281908e-5],
  [4, -2, -0.65171222895601e-6],
  [4, 10, -0.14341729937924e-12],
  [5, -8, -0.40516996860117e-6],
  [8, -11, -0.12734301741641e-8],
  [8, -6, -0.17424871230634e-9],
  [21, -29, -0.68762131295531e-18],
  [23, -31, 0.14478307828521e-19],
  [29, -38, 0.26335781662795e-22],
  [30, -39, -0.11947622640071e-22],
  [31, -40, 0.18228094581404e-23],
  [32, -41, -0.93537087292458e-25],
];
const I = Float64Array.from(TERMS, ([exponent]) => exponent);
const J = Float64Array.from(TERMS, ([, exponent]) => exponent);
const N = Float64Array.from(TERMS, ([, , coefficient]) => coefficient);
const HIGHEST_I = 32;
const HIGHEST_J = 17;
const LOWEST_J = -41;

// Scratch, written and read within one call: repeated multiplication costs a tenth of 68 calls of Math.pow.
const aPowers = new Float64Array(HIGHEST_I + 1);
const bPowers = new Float64Array(HIGHEST_J + 1);
const bInversePowers = new Float64Array(-LOWEST_J + 1);
const gibbs: GibbsDerivatives = {
  pi: 0,
  tau: 0,
  gamma: 0,
  gammaPi: 0,
  gammaPiPi: 0,
  gammaTau: 0,
  gammaTauTau: 0,
  gammaPiTau: 0,
};

function evaluateGibbs(pressurePa: number, temperatureK: number): void {
  const pi = pressurePa / 16.53e6;
  const tau = 1386 / temperatureK;
  const a = 7.1 - pi;
  const b = tau - 1.222;
  fillPowers(aPowers, a, HIGHEST_I);
  fillPowers(bPowers, b, HIGHEST_J);
  fillPowers(bInversePowers, 1 / b, -LOWEST_J);
  let gamma = 0;
  let byA = 0;
  let byAA = 0;
  let byB = 0;
  let byBB = 0;
  let byAB = 0;
  for (let term = 0; term < N.length; term++) {
    const i = I[term] as number;
    const j = J[term] as number;
    const value = (N[term] as number) * (aPowers[i] as number) * ((j >= 0 ? bPowers[j] : bInversePowers[-j]) as number);
    gamma += value;
    byA += i * value;
    byAA += i * (i - 1) * value;
    byB += j * value;
    byBB += j * (j - 1) * value;
    byAB += i * j * value;
  }
  gibbs.pi = pi;
  gibbs.tau = tau;
  gibbs.gamma = gamma;
  // each derivative lowers a power by one; a and b stay well above zero throughout region 1. d a = −d π
  gibbs.gammaPi = -byA / a;
  gibbs.gammaPiPi = byAA / (a * a);
  gibbs.gammaTau = byB / b;
  gibbs.gammaTauTau = byBB / (b * b);
  gibbs.gammaPiTau = -byAB / (a * b);
}
