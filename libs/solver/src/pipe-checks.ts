import type { LimitsInForce } from './check-limits';
import { amount, findingWords, say } from './finding-text';
import type { PipeResult, SolveWarning } from './solve-result';

/** A pipe of the result, with what the checks need beside it. */
export interface PipeUnderCheck {
  readonly result: PipeResult;
  readonly lengthM: number;
  readonly massFluxKgM2S: number;
  readonly checkValve: boolean;
  readonly limits: LimitsInForce;
}

type Check = (at: PipeUnderCheck) => SolveWarning | undefined;

/** Every check at a pipe that carries a flow. */
export const PIPE_CHECKS: readonly Check[] = [reversed, velocity, momentum, gradient];

/** What an engineer should know of a pipe; nothing of one that stands still. */
export function checkPipe(at: PipeUnderCheck): SolveWarning[] {
  if (at.result.massFlowKgS === 0) return [];
  const warnings: SolveWarning[] = [];
  for (const check of PIPE_CHECKS) {
    const warning = check(at);
    if (warning) warnings.push(warning);
  }
  return warnings;
}

const LARGER_BORE = say`Use a larger bore, or take some of the traps to another return.`;

function reversed({ result, checkValve }: PipeUnderCheck): SolveWarning | undefined {
  if (result.massFlowKgS > 0) return undefined;
  const warning = { code: 'reversed', element: result.id, value: result.massFlowKgS };
  if (checkValve) {
    const text = say`The only way to the receiver is against the check valve in this pipe: nothing behind it can drain.`;
    return { ...warning, verdict: 'fail', ...findingWords(text, say`Turn the pipe’s ends round, or the check valve.`) };
  }
  const text = say`The flow runs against the arrow, since that is the only way to the receiver; a check valve or a pitch laid by the arrow would be the wrong way round.`;
  return { ...warning, verdict: 'watch', ...findingWords(text, say`Turn the pipe’s ends round.`) };
}

function velocity({ result, limits }: PipeUnderCheck): SolveWarning | undefined {
  const { watchMS, failMS, liquidMS } = limits.velocity;
  const base = { code: 'velocity', element: result.id };
  const value = Math.abs(result.mixtureVelocityMS);
  if (result.downstreamQuality <= 0) {
    if (value <= liquidMS) return undefined;
    const text = say`Liquid runs at ${amount('velocity', value)}; above ${amount('velocity', liquidMS)} valves that close quickly hammer and bends wear.`;
    return { ...base, verdict: 'watch', value, limit: liquidMS, ...findingWords(text, LARGER_BORE) };
  }
  if (value <= watchMS) return undefined;
  const limit = value > failMS ? failMS : watchMS;
  const text = say`Condensate and flash steam leave at ${amount('velocity', value)}; above ${amount('velocity', limit)} the steam tears the liquid along, which wears bends and hammers.`;
  return { ...base, verdict: value > failMS ? 'fail' : 'watch', value, limit, ...findingWords(text, LARGER_BORE) };
}

function momentum({ result, massFluxKgM2S, limits }: PipeUnderCheck): SolveWarning | undefined {
  const limit = limits.momentum.limitPa;
  const value = massFluxKgM2S * Math.abs(result.mixtureVelocityMS);
  if (value <= limit) return undefined;
  const text = say`The mixture strikes bends and valves with ${amount('momentumFlux', value)} (density times velocity squared); above ${amount('momentumFlux', limit)} it erodes them.`;
  return { code: 'momentum', element: result.id, verdict: 'fail', value, limit, ...findingWords(text, LARGER_BORE) };
}

function gradient({ result, lengthM, limits }: PipeUnderCheck): SolveWarning | undefined {
  const flashing = result.downstreamQuality > 0;
  const limit = flashing ? limits.gradient.flashingPaM : limits.gradient.liquidPaM;
  const value = (result.frictionPa + result.flashPa) / lengthM;
  if (value <= limit) return undefined;
  const text = say`${flashing ? 'Friction and flash steam cost' : 'Friction costs'} ${amount('pressureGradient', value)}, fittings included; above ${amount('pressureGradient', limit)} a return is small for its load, and every trap upstream pays for it.`;
  return { code: 'gradient', element: result.id, verdict: 'watch', value, limit, ...findingWords(text, LARGER_BORE) };
}

/** A vessel whose leaving pipe needs more at its start than the vessel holds. */
export function vesselCannotDrain(vessel: string, pressurePa: number, neededPa: number): SolveWarning | undefined {
  if (neededPa <= pressurePa) return undefined;
  const text = say`The leaving pipe needs ${amount('pressure', neededPa)} at its start, but the vessel holds ${amount('pressure', pressurePa)}: its liquid cannot leave, the vessel fills and sends water out with its vapour.`;
  const remedy = say`Raise the vessel or its pressure, use a larger leaving pipe, or pump its liquid away.`;
  return {
    code: 'vesselCannotDrain',
    element: vessel,
    verdict: 'fail',
    value: neededPa,
    limit: pressurePa,
    ...findingWords(text, remedy),
  };
}
