/** Specific gas constant of water [J/(kg K)], IAPWS R7-97(2012), equation 1. */
export const GAS_CONSTANT_WATER = 461.526;

/** Properties of one phase at a pressure and a temperature. Enthalpy, entropy and energy are zero for liquid at the triple point. */
export interface PhaseProperties {
  readonly specificVolumeM3Kg: number;
  readonly densityKgM3: number;
  readonly enthalpyJKg: number;
  readonly internalEnergyJKg: number;
  readonly entropyJKgK: number;
  /** At constant pressure. */
  readonly specificHeatJKgK: number;
  readonly speedOfSoundMS: number;
}

/** Dimensionless Gibbs energy γ(π, τ) = g/(RT) and its derivatives, as the release names them. */
export interface GibbsDerivatives {
  pi: number;
  tau: number;
  gamma: number;
  gammaPi: number;
  gammaPiPi: number;
  gammaTau: number;
  gammaTauTau: number;
  gammaPiTau: number;
}

/**
 * Properties from the Gibbs energy and its derivatives. Regions 1 and 2 share these relations: with γ = γ° + γʳ the forms printed
 * for region 2 are the same ones.
 * Source: IAPWS R7-97(2012), Tables 3 and 12.
 */
export function propertiesFromGibbs(g: GibbsDerivatives, pressurePa: number, temperatureK: number): PhaseProperties {
  const { pi, tau, gamma, gammaPi, gammaPiPi, gammaTau, gammaTauTau, gammaPiTau } = g;
  const RT = GAS_CONSTANT_WATER * temperatureK;
  const specificVolumeM3Kg = (RT * pi * gammaPi) / pressurePa;
  const cross = gammaPi - tau * gammaPiTau;
  const soundSquared = (RT * gammaPi * gammaPi) / ((cross * cross) / (tau * tau * gammaTauTau) - gammaPiPi);
  return {
    specificVolumeM3Kg,
    densityKgM3: 1 / specificVolumeM3Kg,
    enthalpyJKg: RT * tau * gammaTau,
    internalEnergyJKg: RT * (tau * gammaTau - pi * gammaPi),
    entropyJKgK: GAS_CONSTANT_WATER * (tau * gammaTau - gamma),
    specificHeatJKgK: -GAS_CONSTANT_WATER * tau * tau * gammaTauTau,
    speedOfSoundMS: Math.sqrt(soundSquared),
  };
}

/** Fills powers[i] = base^i for i = 0 … highest. */
export function fillPowers(powers: Float64Array, base: number, highest: number): void {
  let power = 1;
  powers[0] = 1;
  for (let i = 1; i <= highest; i++) {
    power *= base;
    powers[i] = power;
  }
}
