import { NonPhysicalInputError } from '@riseback/numerics';
import { boreAreaM2 } from './darcy-gradient';

/**
 * Share of Napier's flow that a trap's orifice passes: 0.729 fits every cell of the printed leak table within 1 %.
 * Source: US DOE Steam Tip Sheet 1, Inspect and Repair Steam Traps.
 */
export const ORIFICE_DISCHARGE_COEFFICIENT = 0.729;

/** Napier: lb/s = in² psia/70. */
const NAPIER_KG_S_PER_M2_PA = 0.45359237 / (70 * 4.4482216152605);
/** Exponent of the isentropic expansion of saturated steam (Zeuner, 1.035 + 0.1 x at x = 1). */
const EXPANSION_EXPONENT = 1.135;

/** Back over inlet pressure up to which the orifice is choked: (2/(n + 1))^(n/(n − 1)) = 0.577. */
export const CHOKED_PRESSURE_RATIO = (2 / (EXPANSION_EXPONENT + 1)) ** (EXPANSION_EXPONENT / (EXPANSION_EXPONENT - 1));
const CRITICAL_FLUX = expansionFlux(CHOKED_PRESSURE_RATIO);

/**
 * Choked flow of saturated steam through an orifice, by Napier's rule.
 *     W = 0.729 A p/70   (lb/s, in², psia)
 * @param inletPressurePa absolute
 * @throws NonPhysicalInputError for a pressure or a diameter below 0, or NaN
 * Source: Napier's rule, 1869, as handbooks give it (51.43 A p in lb/h); coefficient from {@link ORIFICE_DISCHARGE_COEFFICIENT}.
 */
export function napierOrificeFlowKgS(inletPressurePa: number, orificeDiameterM: number): number {
  if (!(inletPressurePa >= 0 && orificeDiameterM >= 0)) {
    throw new NonPhysicalInputError('napierOrificeFlowKgS', { inletPressurePa, orificeDiameterM });
  }
  return ORIFICE_DISCHARGE_COEFFICIENT * NAPIER_KG_S_PER_M2_PA * boreAreaM2(orificeDiameterM) * inletPressurePa;
}

/**
 * Flow of saturated steam through an orifice against a back pressure: what a trap that has failed open lets through.
 *     choked, p_b/p ≤ 0.577:   Napier
 *     above:                   Napier × G(p_b/p)/G(0.577),   G² ∝ r^(2/n) − r^((n + 1)/n)
 * @param inletPressurePa p, absolute
 * @param backPressurePa p_b, absolute
 * @returns flow [kg/s]; 0 where the back pressure is at or above the inlet's: nothing flows back through a trap here
 * @throws NonPhysicalInputError as {@link napierOrificeFlowKgS}, and for a negative back pressure or NaN
 * @remarks An upper bound in use: the condensate that shares the orifice is not taken off.
 * Source: de Saint-Venant & Wantzel, 1839; exponent by Zeuner; see docs/methods/steam-orifice.md.
 */
export function orificeSteamFlowKgS(inletPressurePa: number, backPressurePa: number, orificeDiameterM: number): number {
  if (!(backPressurePa >= 0)) throw new NonPhysicalInputError('orificeSteamFlowKgS', { backPressurePa });
  const chokedKgS = napierOrificeFlowKgS(inletPressurePa, orificeDiameterM);
  if (backPressurePa >= inletPressurePa) return 0;
  const ratio = backPressurePa / inletPressurePa;
  if (ratio <= CHOKED_PRESSURE_RATIO) return chokedKgS;
  return (chokedKgS * expansionFlux(ratio)) / CRITICAL_FLUX;
}

/** Mass flux of the isentropic nozzle in the unit √(2n/(n − 1) · p/v). */
function expansionFlux(ratio: number): number {
  const root = ratio ** (1 / EXPANSION_EXPONENT);
  return root * Math.sqrt(1 - ratio / root);
}
