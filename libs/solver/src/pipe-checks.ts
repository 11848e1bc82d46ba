import { boreAreaM2, DRAINING_QUALITY, type FlowPattern } from '@riseback/hydraulics';
import type { FrictionMethod } from '@riseback/network';
import type { LimitsInForce } from './check-limits';
import { amount, findingWords, say } from './finding-text';
import type { PipeGeometry } from './pipe-geometry';
import type { PieceEnd } from './pipe-result';
import type { PipeResult, SolveWarning } from './solve-result';

/** What the checks need of a pipe beside its result. */
export interface PipeUnderCheck {
  readonly geometry: PipeGeometry;
  /** By piece of its route, from the outlet up. */
  readonly ends: readonly PieceEnd[];
  readonly checkValve: boolean;
  readonly friction: FrictionMethod;
  readonly limits: LimitsInForce;
}

const NO_WARNINGS: readonly SolveWarning[] = [];

/** Every check at a pipe that carries a flow: what an engineer should know of it; nothing of one that stands still. */
export function checkPipe(result: PipeResult, at: PipeUnderCheck): readonly SolveWarning[] {
  if (result.massFlowKgS === 0) return NO_WARNINGS;
  // called by name, not from a list: nearly every pipe is sound, and then these calls are all that its checks cost
  let warnings = withFinding(NO_WARNINGS, reversed(result, at));
  warnings = withFinding(warnings, choked(result));
  warnings = withFinding(warnings, velocity(result, at));
  warnings = withFinding(warnings, momentum(result, at));
  warnings = withFinding(warnings, gradient(result, at));
  warnings = withFinding(warnings, slug(result, at));
  warnings = withFinding(warnings, uphillTwoPhase(result, at));
  return withFinding(warnings, dryBasis(result, at));
}

function withFinding(warnings: readonly SolveWarning[], found: SolveWarning | undefined): readonly SolveWarning[] {
  return found === undefined ? warnings : [...warnings, found];
}

const LARGER_BORE = say`Use a larger bore, or take some of the traps to another return.`;

function reversed(result: PipeResult, { checkValve }: PipeUnderCheck): SolveWarning | undefined {
  if (result.massFlowKgS > 0) return undefined;
  const warning = { code: 'reversed', element: result.id, value: result.massFlowKgS };
  if (checkValve) {
    const text = say`The only way to the receiver is against the check valve in this pipe: nothing behind it can drain.`;
    return { ...warning, verdict: 'fail', ...findingWords(text, say`Turn the pipe’s ends round, or the check valve.`) };
  }
  const text = say`The flow runs against the arrow, for that is the way the pressures drive it; a check valve or a pitch laid by the arrow would be the wrong way round.`;
  return { ...warning, verdict: 'watch', ...findingWords(text, say`Turn the pipe’s ends round.`) };
}

function velocity(result: PipeResult, { limits }: PipeUnderCheck): SolveWarning | undefined {
  const { watchMS, failMS, liquidMS } = limits.velocity;
  const [code, element] = ['velocity', result.id];
  const value = Math.abs(result.mixtureVelocityMS);
  if (result.downstreamQuality <= 0) {
    if (value <= liquidMS) return undefined;
    const text = say`Liquid runs at ${amount('velocity', value)}; above ${amount('velocity', liquidMS)} valves that close quickly hammer and bends wear.`;
    return { code, element, verdict: 'watch', value, limit: liquidMS, ...findingWords(text, LARGER_BORE) };
  }
  if (value <= watchMS) return undefined;
  const limit = value > failMS ? failMS : watchMS;
  const text = say`Condensate and flash steam leave at ${amount('velocity', value)}; above ${amount('velocity', limit)} the steam tears the liquid along, which wears bends and hammers.`;
  const verdict = value > failMS ? 'fail' : 'watch';
  return { code, element, verdict, value, limit, ...findingWords(text, LARGER_BORE) };
}

function momentum(result: PipeResult, { geometry, limits }: PipeUnderCheck): SolveWarning | undefined {
  const limit = limits.momentum.limitPa;
  const massFluxKgM2S = Math.abs(result.massFlowKgS) / boreAreaM2(geometry.insideDiameterM);
  const value = massFluxKgM2S * Math.abs(result.mixtureVelocityMS);
  if (value <= limit) return undefined;
  const text = say`The mixture strikes bends and valves with ${amount('momentumFlux', value)} (density times velocity squared); above ${amount('momentumFlux', limit)} it erodes them.`;
  return { code: 'momentum', element: result.id, verdict: 'fail', value, limit, ...findingWords(text, LARGER_BORE) };
}

function gradient(result: PipeResult, { geometry, limits }: PipeUnderCheck): SolveWarning | undefined {
  const flashing = result.downstreamQuality > 0;
  const limit = flashing ? limits.gradient.flashingPaM : limits.gradient.liquidPaM;
  const value = (result.frictionPa + result.flashPa) / geometry.lengthM;
  if (value <= limit) return undefined;
  const text = say`${flashing ? 'Friction and flash steam cost' : 'Friction costs'} ${amount('pressureGradient', value)}, fittings included; above ${amount('pressureGradient', limit)} a return is small for its load, and every trap upstream pays for it.`;
  return { code: 'gradient', element: result.id, verdict: 'watch', value, limit, ...findingWords(text, LARGER_BORE) };
}

function choked({ id, outletPressurePa, downstreamPressurePa }: PipeResult): SolveWarning | undefined {
  if (outletPressurePa === undefined) return undefined;
  const text = say`The flow leaves at its critical velocity: the outlet stands at ${amount('pressure', outletPressurePa)}, ${amount('pressureDifference', outletPressurePa - downstreamPressurePa)} above what it discharges into, and nothing done downstream lowers that.`;
  return {
    code: 'choked',
    element: id,
    verdict: 'fail',
    value: outletPressurePa,
    limit: downstreamPressurePa,
    ...findingWords(text, LARGER_BORE),
  };
}

const SLUGGING: Readonly<Partial<Record<FlowPattern, string>>> = {
  intermittent: 'plugs and slugs fill this run from time to time',
  slug: 'slugs of condensate ride up this rise',
  churn: 'condensate is thrown up this rise and falls back',
};

function slug(result: PipeResult, { ends }: PipeUnderCheck): SolveWarning | undefined {
  for (const { pattern } of ends) {
    const words = pattern === undefined ? undefined : SLUGGING[pattern];
    if (words === undefined) continue;
    const text = say`By its flow pattern ${words}: they strike bends and valves, and the pressure behind every trap upstream swings.`;
    return { code: 'slug', element: result.id, verdict: 'watch', ...findingWords(text, LET_FLASH_GO) };
  }
  return undefined;
}

const LET_FLASH_GO = say`Let the flash steam go in a vessel before this pipe, lay the run to fall, or lift the condensate with a pump.`;

function uphillTwoPhase(result: PipeResult, { ends }: PipeUnderCheck): SolveWarning | undefined {
  let value = 0;
  for (const end of ends) if (isFlashingRise(end)) value += end.riseM;
  if (value === 0) return undefined;
  const text = say`Condensate rises ${amount('length', value)} together with its flash steam: what the rise costs is the least certain part of the result, and at low load the steam slips past and lets the condensate fall back.`;
  return { code: 'uphillTwoPhase', element: result.id, verdict: 'watch', value, ...findingWords(text, LET_FLASH_GO) };
}

const ANOTHER_METHOD = say`Look at the trap’s credible band, or compute the network by a full-bore method or by flow pattern.`;

/** Where the basis of dry, pitched returns is asked for more than it was made for. */
function dryBasis(result: PipeResult, { ends, friction }: PipeUnderCheck): SolveWarning | undefined {
  if (friction !== 'flashVapour') return undefined;
  const code = 'dryBasis';
  const rise = ends.find(isFlashingRise);
  if (rise !== undefined) {
    const text = say`The dry-return basis lets condensate drain along the bottom, but here it rises with ${amount('fraction', rise.quality)} of flash steam: friction may be several times what is told.`;
    return {
      code,
      element: result.id,
      verdict: 'watch',
      value: rise.quality,
      limit: DRAINING_QUALITY,
      ...findingWords(text, ANOTHER_METHOD),
    };
  }
  const torn = ends.find(isTorn);
  if (torn?.pattern === undefined) return undefined;
  const text = say`The dry-return basis lets condensate drain along the bottom, but by its flow pattern (${PATTERN_WORDS[torn.pattern]}) the steam carries it along here: friction may be several times what is told.`;
  return { code, element: result.id, verdict: 'watch', ...findingWords(text, ANOTHER_METHOD) };
}

function isFlashingRise({ riseM, quality }: PieceEnd): boolean {
  return riseM > 0 && quality > DRAINING_QUALITY;
}

function isTorn({ quality, pattern }: PieceEnd): boolean {
  return quality > DRAINING_QUALITY && pattern !== undefined && FILLS_BORE[pattern];
}

const PATTERN_WORDS: Readonly<Record<FlowPattern, string>> = {
  liquid: 'liquid',
  vapour: 'vapour',
  stratifiedSmooth: 'stratified, smooth',
  stratifiedWavy: 'stratified, wavy',
  intermittent: 'intermittent',
  annular: 'annular',
  dispersedBubble: 'dispersed bubbles',
  bubbly: 'bubbly',
  slug: 'slug',
  churn: 'churn',
};

/** Patterns in which liquid does not run along the bottom. A single phase has the bore to itself by any method. */
const FILLS_BORE: Readonly<Record<FlowPattern, boolean>> = {
  liquid: false,
  vapour: false,
  stratifiedSmooth: false,
  stratifiedWavy: false,
  intermittent: true,
  annular: true,
  dispersedBubble: true,
  bubbly: true,
  slug: true,
  churn: true,
};

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
