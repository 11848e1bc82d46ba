import { fillPowers, propertiesFromGibbs, type GibbsDerivatives, type PhaseProperties } from './gibbs-properties';
import { requireWithin } from './steam-range-error';

/** Where the equation of region 2 is used: vapour. At high pressure the printed range also ends at the border to region 3. */
export const REGION2_RANGE = { pressurePa: [1, 100e6], temperatureK: [273.15, 1073.15] } as const;

/**
 * Water vapour at a pressure and a temperature.
 *     γ(π, τ) = γ° + γʳ,   γ° = ln π + Σ nᵢ° τ^Jᵢ°,   γʳ = Σ nᵢ π^Iᵢ (τ − 0.5)^Jᵢ,   π = p / 1 MPa,   τ = 540 K / T
 * @param pressurePa p [Pa absolute]
 * @param temperatureK T [K]; a little below saturation it still answers, for the subcooled vapour the equation also describes
 * @throws SteamRangeError outside REGION2_RANGE, and for NaN
 * Source: IAPWS R7-97(2012), section 6.1, equations 15 to 17, Tables 10 and 11; reproduces Table 15 to its nine digits.
 */
export function region2(pressurePa: number, temperatureK: number): PhaseProperties {
  requireWithin('pressure', pressurePa, REGION2_RANGE.pressurePa, 'steam');
  requireWithin('temperature', temperatureK, REGION2_RANGE.temperatureK, 'steam');
  return region2Unchecked(pressurePa, temperatureK);
}

/** For iterations inside this library, which may step a hair across an end of the range on their way. */
export function region2Unchecked(pressurePa: number, temperatureK: number): PhaseProperties {
  evaluateGibbs(pressurePa, temperatureK);
  return propertiesFromGibbs(gibbs, pressurePa, temperatureK);
}

// Jᵢ°, nᵢ° of Table 10
const IDEAL_TERMS: readonly (readonly [number, number])[] = [
  [0, -0.96927686500217e1],
  [1, 0.10086655968018e2],
  [-5, -0.5608791128302e-2],
  [-4, 0.71452738081455e-1],
  [-3, -0.40710498223928],
  [-2, 0.14240819171444e1],
  [-1, -0.4383951131945e1],
  [2, -0.28408632460772],
  [3, 0.21268463753307e-1],
];
// Iᵢ, Jᵢ, nᵢ of Table 11
const RESIDUAL_TERMS: readonly (readonly [number, number, number])[] = [
  [1, 0, -0.17731742473213e-2],
  [1, 1, -0.17834862292358e-1],
  [1, 2, -0.45996013696365e-1],
  [1, 3, -0.57581259083432e-1],
  [1, 6, -0.5032527872793e-1],
  [2, 1, -0.33032641670203e-4],
  [2, 2, -0.18948987516315e-3],
  [2, 4, -0.39392777243355e-2],
  [2, 7, -0.43797295650573e-1],
  [2, 36, -0.26674547914087e-4],
  [3, 0, 0.20481737692309e-7],
  [3, 1, 0.43870667284435e-6],
  [3, 3, -0.3227767723857e-4],
  [3, 6, -0.15033924542148e-2],
  [3, 35, -0.40668253562649e-1],
  [4, 1, -0.78847309559367e-9],
  [4, 2, 0.12790717852285e-7],
  [4, 3, 0.48225372718507e-6],
  [5, 7, 0.22922076337661e-5],
  [6, 3, -0.16714766451061e-10],
  [6, 16, -0.21171472321355e-2],
  [6, 35, -0.23895741934104e2],
  [7, 0, -0.5905956432427e-17],
  [7, 11, -0.12621808899101e-5],
  [7, 25, -0.38946842435739e-1],
  [8, 8, 0.11256211360459e-10],
  [8, 36, -0.82311340897998e1],
  [9, 13, 0.19809712802088e-7],
  [10, 4, 0.10406965210174e-18],
  [10, 10, -0.10234747095929e-12],
  [10, 14, -0.10018179379511e-8],
  [16, 29, -0.80882908646985e-10],
  [16, 50, 0.10693031879409],
  [18, 57, -0.33662250574171],
  [20, 20, 0.89185845355421e-24],
  [20, 35, 0.30629316876232e-12],
  [20, 48, -0.42002467698208e-5],
  [21, 21, -0.59056029685639e-25],
  [22, 53, 0.37826947613457e-5],
  [23, 39, -0.12768608934681e-14],
  [24, 26, 0.73087610595061e-28],
  [24, 40, 0.55414715350778e-16],
  [24, 58, -0.9436970724121e-6],
];
const J_IDEAL = Float64Array.from(IDEAL_TERMS, ([exponent]) => exponent);
const N_IDEAL = Float64Array.from(IDEAL_TERMS, ([, coefficient]) => coefficient);
const I = Float64Array.from(RESIDUAL_TERMS, ([exponent]) => exponent);
const J = Float64Array.from(RESIDUAL_TERMS, ([, exponent]) => exponent);
const N = Float64Array.from(RESIDUAL_TERMS, ([, , coefficient]) => coefficient);
const HIGHEST_I = 24;
const HIGHEST_J = 58;

// Scratch, written and read within one call: repeated multiplication costs a tenth of 95 calls of Math.pow.
const piPowers = new Float64Array(HIGHEST_I + 1);
const bPowers = new Float64Array(HIGHEST_J + 1);
const tauPowers = new Float64Array(4);
const tauInversePowers = new Float64Array(6);
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
  const pi = pressurePa / 1e6;
  const tau = 540 / temperatureK;
  const b = tau - 0.5;
  fillPowers(piPowers, pi, HIGHEST_I);
  fillPowers(bPowers, b, HIGHEST_J);
  fillPowers(tauPowers, tau, 3);
  fillPowers(tauInversePowers, 1 / tau, 5);

  let ideal = Math.log(pi);
  let idealByTau = 0;
  let idealByTauTau = 0;
  for (let term = 0; term < N_IDEAL.length; term++) {
    const j = J_IDEAL[term] as number;
    const value = (N_IDEAL[term] as number) * ((j >= 0 ? tauPowers[j] : tauInversePowers[-j]) as number);
    ideal += value;
    idealByTau += j * value;
    idealByTauTau += j * (j - 1) * value;
  }

  let residual = 0;
  let byPi = 0;
  let byPiPi = 0;
  let byB = 0;
  let byBB = 0;
  let byPiB = 0;
  for (let term = 0; term < N.length; term++) {
    const i = I[term] as number;
    const j = J[term] as number;
    const value = (N[term] as number) * (piPowers[i] as number) * (bPowers[j] as number);
    residual += value;
    byPi += i * value;
    byPiPi += i * (i - 1) * value;
    byB += j * value;
    byBB += j * (j - 1) * value;
    byPiB += i * j * value;
  }

  gibbs.pi = pi;
  gibbs.tau = tau;
  gibbs.gamma = ideal + residual;
  // each derivative lowers a power by one; τ − 0.5 reaches 0 only at 1080 K, beyond the range
  gibbs.gammaPi = (1 + byPi) / pi;
  gibbs.gammaPiPi = (byPiPi - 1) / (pi * pi);
  gibbs.gammaTau = idealByTau / tau + byB / b;
  gibbs.gammaTauTau = idealByTauTau / (tau * tau) + byBB / (b * b);
  gibbs.gammaPiTau = byPiB / (pi * b);
}
