import { requireWithin } from './steam-range-error';

/** Where the equation is used; the release asks for less than 1173.15 K at low pressure and less than 900 °C at any. */
export const VISCOSITY_RANGE = { temperatureK: [273.15, 1173.15], densityKgM3: [0, 1250] } as const;

/**
 * Dynamic viscosity of water or steam, in the industrial form: without the critical enhancement, which matters only within a few
 * kelvin of 647 K.
 *     μ = μ₀(T̄) μ₁(T̄, ρ̄) · 1 µPa s,   T̄ = T/647.096 K,   ρ̄ = ρ/322 kg/m³
 *     μ₀ = 100 √T̄ / Σ Hᵢ/T̄^i,   μ₁ = exp[ ρ̄ Σᵢ (1/T̄ − 1)^i Σⱼ Hᵢⱼ (ρ̄ − 1)^j ]
 * @param temperatureK T [K]
 * @param densityKgM3 ρ [kg/m³]
 * @returns μ [Pa s]
 * @throws SteamRangeError outside VISCOSITY_RANGE, and for NaN
 * Source: IAPWS R12-08, equations 10 to 12, Tables 1 and 2, with μ₂ = 1 (section 3); reproduces Table 4 to its printed digits.
 */
export function viscosityPaS(temperatureK: number, densityKgM3: number): number {
  requireWithin('temperature', temperatureK, VISCOSITY_RANGE.temperatureK, 'water or steam');
  requireWithin('density', densityKgM3, VISCOSITY_RANGE.densityKgM3, 'water or steam');
  return viscosityUnchecked(temperatureK, densityKgM3);
}

/** For states this library has found itself, whose temperature rounding may leave a hair below 0 °C. */
export function viscosityUnchecked(temperatureK: number, densityKgM3: number): number {
  const inverse = 647.096 / temperatureK;
  const density = densityKgM3 / 322;
  const dilute =
    100 / (Math.sqrt(inverse) * (1.67752 + inverse * (2.20462 + inverse * (0.6366564 - inverse * 0.241605))));
  const t = inverse - 1;
  const r = density - 1;
  // one line for each power of t: Σⱼ Hᵢⱼ r^j by Horner's rule
  const h0 = 0.520094 + r * (0.222531 + r * (-0.281378 + r * (0.161913 - r * 0.0325372)));
  const h1 = 0.0850895 + r * (0.999115 + r * (-0.906851 + r * 0.257399));
  const h2 = -1.08374 + r * (1.88797 - r * 0.772479);
  const h3 = -0.289555 + r * (1.26613 + r * (-0.489837 + r * r * (0.0698452 - r * r * 0.00435673)));
  const h4 = r * r * (-0.25704 + r * r * r * 0.00872102);
  const h5 = r * (0.120573 - r * r * r * r * r * 0.000593264);
  const exponent = density * (h0 + t * (h1 + t * (h2 + t * (h3 + t * (h4 + t * h5)))));
  return dilute * Math.exp(exponent) * 1e-6;
}
