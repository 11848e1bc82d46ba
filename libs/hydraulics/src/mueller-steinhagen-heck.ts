import type { FlashingFlow } from './flash-vapour';
import {
  fittingsGradient,
  liquidOnlyGradient,
  liquidPipeGradient,
  vapourPipeGradient,
  vapourShare,
} from './two-phase-point';

/**
 * Friction gradient by Müller-Steinhagen and Heck, between the whole flow as liquid (A) and as vapour (B).
 *     [A + 2 (B − A) x] (1 − x)^(1/3) + B x³
 * @returns gradient [Pa/m], fittings included; the liquid's for x ≤ 0, the vapour's at x = 1; 0 for a still pipe
 * @throws NonPhysicalInputError for x > 1, and as `darcyGradient` does
 * @remarks A and B with this program's Darcy factor where the paper has Blasius, so rough pipes count.
 * Source: Müller-Steinhagen & Heck, Chem. Eng. Process. 20 (1986) 297-308; see docs/methods/mueller-steinhagen-heck.md.
 */
export function mullerSteinhagenHeckGradient(flow: FlashingFlow): number {
  const x = vapourShare('mullerSteinhagenHeckGradient', flow.quality);
  if (x === 0) return liquidOnlyGradient(flow);
  const A = liquidPipeGradient(flow, flow.massFlowKgS);
  const B = vapourPipeGradient(flow, flow.massFlowKgS);
  return (A + 2 * (B - A) * x) * Math.cbrt(1 - x) + B * x ** 3 + fittingsGradient(flow);
}
