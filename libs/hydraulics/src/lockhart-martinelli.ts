import type { FlashingFlow } from './flash-vapour';
import {
  fittingsGradient,
  liquidOnlyGradient,
  liquidPipeGradient,
  massFluxOf,
  vapourPipeGradient,
  vapourShare,
} from './two-phase-point';

/** Chisholm's C where both phases alone would be turbulent, and so on; liquid named first. */
const LN_C_TURBULENT_TURBULENT = Math.log(20);
const LN_C_LAMINAR_TURBULENT = Math.log(12);
const LN_C_TURBULENT_LAMINAR = Math.log(10);
const LN_C_LAMINAR_LAMINAR = Math.log(5);
/** Between these Reynolds numbers of a phase alone, ln C is linear in it, so that no flow meets a step. */
const LAMINAR_UP_TO_RE = 2000;
const TURBULENT_FROM_RE = 4000;

/**
 * Friction gradient by Lockhart and Martinelli in Chisholm's form.
 *     φ_l² = 1 + C/X + 1/X²,   X² = g_l/g_g:   g = g_l + C √(g_l g_g) + g_g
 * with g_l, g_g the Darcy-Weisbach gradients of each phase alone in the bore.
 * @returns gradient [Pa/m], fittings included; the liquid's for x ≤ 0, the vapour's at x = 1; 0 for a still pipe
 * @throws NonPhysicalInputError for x > 1, and as `darcyGradient` does
 * Source: Lockhart & Martinelli, Chem. Eng. Prog. 45 (1949) 39-48; Chisholm, Int. J. Heat Mass Transfer 10 (1967) 1767-1778;
 *   the bridge in C is this program's; see docs/methods/lockhart-martinelli.md.
 */
export function lockhartMartinelliGradient(flow: FlashingFlow): number {
  const x = vapourShare('lockhartMartinelliGradient', flow.quality);
  if (x === 0) return liquidOnlyGradient(flow);
  const { liquidViscosityPaS, vapourViscosityPaS } = flow.saturation;
  const liquid = liquidPipeGradient(flow, (1 - x) * flow.massFlowKgS);
  const vapour = vapourPipeGradient(flow, x * flow.massFlowKgS);
  const allRe = massFluxOf(flow) * flow.insideDiameterM;
  const C = chisholmC(((1 - x) * allRe) / liquidViscosityPaS, (x * allRe) / vapourViscosityPaS);
  // the root of each by itself: their product would lose the smallest gradients
  return liquid + C * Math.sqrt(liquid) * Math.sqrt(vapour) + vapour + fittingsGradient(flow);
}

/** Chisholm's C by the Reynolds number of each phase alone [–]: 20, 12, 10 or 5, and between. */
export function chisholmC(liquidRe: number, vapourRe: number): number {
  const liquid = turbulentShare(liquidRe);
  const vapour = turbulentShare(vapourRe);
  const laminarVapour = LN_C_LAMINAR_LAMINAR + liquid * (LN_C_TURBULENT_LAMINAR - LN_C_LAMINAR_LAMINAR);
  const turbulentVapour = LN_C_LAMINAR_TURBULENT + liquid * (LN_C_TURBULENT_TURBULENT - LN_C_LAMINAR_TURBULENT);
  return Math.exp(laminarVapour + vapour * (turbulentVapour - laminarVapour));
}

function turbulentShare(Re: number): number {
  return Math.min(1, Math.max(0, (Re - LAMINAR_UP_TO_RE) / (TURBULENT_FROM_RE - LAMINAR_UP_TO_RE)));
}
