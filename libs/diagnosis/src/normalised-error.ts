/** Agrees, Doubtful, Disagrees: the words for a gauge beside its reading. */
export type AgreementWord = 'agrees' | 'doubtful' | 'disagrees';

/** |E_n| up to which a reading agrees (ISO/IEC 17043), and from which it disagrees. */
export const AGREEMENT_LIMITS = { agrees: 1, disagrees: 1.5 } as const;

/**
 *     E_n = (measured − predicted)/√(U_m² + U_p²)
 * with both uncertainties expanded to about 95 %. Source: ISO/IEC 17043:2010, B.3.1.3; ISO 13528.
 * @returns NaN where neither side has an uncertainty
 */
export function normalisedError(
  measuredPa: number,
  predictedPa: number,
  measuredUncertaintyPa: number,
  predictedUncertaintyPa: number,
): number {
  return (measuredPa - predictedPa) / Math.hypot(measuredUncertaintyPa, predictedUncertaintyPa);
}

/**
 * |E_n| ≤ 1 agrees, by ISO/IEC 17043. That standard calls all else unsatisfactory; between 1 and 1.5 it is called doubtful here, since
 * with k = 2 this is where ISO 13528 gives a warning (2 to 3 standard uncertainties) and from 3 asks for action.
 */
export function agreementWord(normalised: number): AgreementWord {
  const size = Math.abs(normalised);
  if (size <= AGREEMENT_LIMITS.agrees) return 'agrees';
  return size < AGREEMENT_LIMITS.disagrees ? 'doubtful' : 'disagrees';
}
