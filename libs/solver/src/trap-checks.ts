import type { Trap, TrapModel } from '@riseback/network';
import { SATURATION_LINE_RANGE, saturationTemperatureK } from '@riseback/steam';
import type { LimitsInForce } from './check-limits';
import { amount, findingWords, say } from './finding-text';
import type { OperatingTrap } from './operating-case';
import { stallFraction } from './stall';
import type { FindingWords, TrapCheck, UnmadeCheck } from './solve-result';
import { trapCapacityKgS } from './trap-capacity';

/** A trap in one case, with the return it was found to stand against. */
export interface TrapUnderCheck {
  readonly trap: Trap;
  readonly model: TrapModel | undefined;
  readonly inletPressurePa: number;
  readonly backPressurePa: number;
  readonly loadKgS: number;
  /** Of a modulating trap that follows its load. */
  readonly modulation?: OperatingTrap['modulation'] | undefined;
  readonly atmosphericPressurePa: number;
  readonly limits: LimitsInForce;
}

/** undefined for a trap that the check has nothing to do with. */
type Check = (at: TrapUnderCheck) => TrapCheck | UnmadeCheck | undefined;

/** Every check at a trap by its code, in the order in which they are told. A new check is a function here and a part of docs/methods/checks.md. */
export const TRAP_CHECKS = {
  differential,
  capacity,
  backPressureFraction,
  orificeRating,
  bodyRating,
  stall,
} as const satisfies Record<string, Check>;

const CHECKS = Object.values<Check>(TRAP_CHECKS);

/** Makes each check that the trap's data allow, and says why the others are not made. */
export function checkTrap(at: TrapUnderCheck): { checks: TrapCheck[]; notChecked: UnmadeCheck[] } {
  const checks: TrapCheck[] = [];
  const notChecked: UnmadeCheck[] = [];
  for (const check of CHECKS) {
    const outcome = check(at);
    if (outcome === undefined) continue;
    if ('verdict' in outcome) checks.push(outcome);
    else notChecked.push(outcome);
  }
  return { checks, notChecked };
}

const LESS_BEHIND_OR_PUMP = say`Lower what stands behind the trap (less lift, a larger bore on its walk, another return), or lift its condensate with a pump.`;
const LESS_BEHIND_OR_TYPE = say`Lower what stands behind the trap, or use a type that works against it (a float or inverted bucket trap).`;
const RATED_BODY = say`Fit a body rated for the safety valve’s setting. Until then keep the trap shut off and marked: a body above its rating can burst.`;

// Most checks pass, and value and limit stand beside the words: words without numbers are made once.
const DIFFERENTIAL_PASSES = findingWords(say`The inlet stands above the return, which drives the condensate out.`);
const FRACTION_PASSES = findingWords(say`The share of the inlet’s gauge pressure behind the trap is within its limit.`);
const CAPACITY_PASSES = findingWords(
  say`The model passes at this differential what the load needs with its sizing factor.`,
);
const STALL_PASSES = findingWords(say`The steam space stays above the return at this load, with room to spare.`);
const DRAIN_AT_STALL = say`Drain it by gravity into a vented receiver, or with a pump trap; or lower what stands behind its trap.`;
const SEAT_PASSES = findingWords(say`The seat opens against all that the safety valve lets come to it.`);
const BODY_PASSES = findingWords(say`The body is rated for the safety valve’s setting.`);
const BODY_PASSES_BY_PRESSURE = findingWords(
  say`The body’s pressure rating covers the safety valve’s setting; its temperature rating is not known.`,
);
const BODY_PASSES_BY_TEMPERATURE = findingWords(
  say`The body’s temperature rating covers steam at the safety valve’s setting; its pressure rating is not known.`,
);

/** What a trap shut off in this case says in place of its checks. */
export function isolatedUnchecked({ service }: Trap): readonly UnmadeCheck[] {
  return service.kind === 'modulating' ? ISOLATED_UNCHECKED : ISOLATED_UNCHECKED.filter(({ code }) => code !== 'stall');
}

const ISOLATED_UNCHECKED: readonly UnmadeCheck[] = Object.keys(TRAP_CHECKS).map((code) => ({
  code,
  reason: 'The trap is isolated in this case.',
}));

function differential({ inletPressurePa, backPressurePa }: TrapUnderCheck): TrapCheck {
  const value = inletPressurePa - backPressurePa;
  if (value > 0) {
    return passes('differential', value, 0, DIFFERENTIAL_PASSES);
  }
  const text = say`The return stands at ${amount('pressure', backPressurePa)} against ${amount('pressure', inletPressurePa)} at the inlet: nothing drives the condensate out, and it backs up into the steam space, where it costs heat and can hammer.`;
  return { code: 'differential', verdict: 'fail', value, limit: 0, ...findingWords(text, LESS_BEHIND_OR_PUMP) };
}

function capacity({ trap, model, inletPressurePa, backPressurePa, loadKgS }: TrapUnderCheck): TrapCheck | UnmadeCheck {
  const code = 'capacity';
  const points = model?.capacity;
  if (model === undefined) return { code, reason: 'The trap has no model, so its capacity is not known.' };
  if (points === undefined || points.length === 0) return { code, reason: 'The trap’s model gives no capacities.' };
  const differentialPa = inletPressurePa - backPressurePa;
  if (differentialPa <= 0) return { code, reason: 'There is no differential at which to judge a capacity.' };
  const value = trapCapacityKgS(points, differentialPa);
  const limit = trap.sizingFactor * loadKgS;
  if (isAtLeast(value, limit)) {
    return passes(code, value, limit, CAPACITY_PASSES);
  }
  const text = say`At ${amount('pressureDifference', differentialPa)} across it the model passes ${amount('massFlow', value)}, but ${amount('factor', trap.sizingFactor)} times its load needs ${amount('massFlow', limit)}: at start-up and at peaks condensate backs up.`;
  const remedy = say`Choose a model or seat that passes ${amount('massFlow', limit)} at this differential, or lower what stands behind the trap.`;
  return { code, verdict: 'fail', value, limit, ...findingWords(text, remedy) };
}

function backPressureFraction(at: TrapUnderCheck): TrapCheck | UnmadeCheck {
  const code = 'backPressureFraction';
  const { trap, model, atmosphericPressurePa, limits } = at;
  const ofType = trap.trapType === 'thermodynamic' ? limits.backPressureFraction : undefined;
  const failAbove = model?.maximumBackPressureFraction ?? ofType?.failFraction;
  if (failAbove === undefined) {
    const reason =
      trap.trapType === undefined
        ? 'The trap’s type is not given.'
        : 'No limit is known for this type of trap, and its model gives none.';
    return { code, reason };
  }
  const inletGaugePa = at.inletPressurePa - atmosphericPressurePa;
  const backGaugePa = at.backPressurePa - atmosphericPressurePa;
  if (inletGaugePa <= 0) {
    const text = say`The inlet stands at ${amount('pressure', at.inletPressurePa)}, not above the atmosphere: no share of it can be left for the return.`;
    return { code, verdict: 'fail', limit: failAbove, ...findingWords(text, LESS_BEHIND_OR_TYPE) };
  }
  const value = backGaugePa / inletGaugePa;
  const watchAbove = Math.min(ofType?.watchFraction ?? failAbove, failAbove);
  const leastInletPa = ofType?.minimumInletGaugePa ?? 0;
  if (value > failAbove) {
    const text = say`${amount('fraction', value)} of the inlet’s gauge pressure stands behind the trap; above ${amount('fraction', failAbove)} it no longer closes and blows steam into the return.`;
    return { code, verdict: 'fail', value, limit: failAbove, ...findingWords(text, LESS_BEHIND_OR_TYPE) };
  }
  if (value > watchAbove) {
    const text = say`${amount('fraction', value)} of the inlet’s gauge pressure stands behind the trap; above ${amount('fraction', watchAbove)} a trap of this type closes late and wears.`;
    return { code, verdict: 'watch', value, limit: watchAbove, ...findingWords(text, LESS_BEHIND_OR_TYPE) };
  }
  if (inletGaugePa < leastInletPa) {
    const text = say`The inlet has ${amount('pressureDifference', inletGaugePa)} above the atmosphere; below ${amount('pressureDifference', leastInletPa)} a trap of this type may not close.`;
    return {
      code,
      verdict: 'watch',
      value,
      limit: watchAbove,
      ...findingWords(text, say`Use a float or inverted bucket trap at so low a pressure.`),
    };
  }
  return passes(code, value, watchAbove, FRACTION_PASSES);
}

function orificeRating({ trap, model, atmosphericPressurePa }: TrapUnderCheck): TrapCheck | UnmadeCheck {
  const code = 'orificeRating';
  const limit = model?.maximumDifferentialPa;
  if (limit === undefined)
    return { code, reason: 'No maximum differential is known: the trap has no model, or its model gives none.' };
  if (trap.maximumPressurePa === undefined)
    return { code, reason: 'The setting of the safety valve before the trap is not given.' };
  const value = trap.maximumPressurePa - atmosphericPressurePa;
  if (isAtLeast(limit, value)) {
    return passes(code, value, limit, SEAT_PASSES);
  }
  const text = say`Up to the safety valve’s setting ${amount('pressureDifference', value)} can stand across the seat, which is rated for ${amount('pressureDifference', limit)}: above that the trap stays shut and floods.`;
  const remedy = say`Choose a smaller seat or a model rated for ${amount('pressureDifference', value)}.`;
  return { code, verdict: 'fail', value, limit, ...findingWords(text, remedy) };
}

function bodyRating({ trap, model }: TrapUnderCheck): TrapCheck | UnmadeCheck {
  const code = 'bodyRating';
  const { bodyPressurePa, bodyTemperatureK } = model ?? {};
  if (bodyPressurePa === undefined && bodyTemperatureK === undefined) {
    return { code, reason: 'No body rating is known: the trap has no model, or its model gives none.' };
  }
  const pressurePa = trap.maximumPressurePa;
  if (pressurePa === undefined)
    return { code, reason: 'The setting of the safety valve before the trap is not given.' };
  if (bodyPressurePa !== undefined && !isAtLeast(bodyPressurePa, pressurePa)) {
    const text = say`Up to the safety valve’s setting ${amount('pressure', pressurePa)} can stand in the body, which is rated for ${amount('pressure', bodyPressurePa)}.`;
    return { code, verdict: 'fail', value: pressurePa, limit: bodyPressurePa, ...findingWords(text, RATED_BODY) };
  }
  // a setting above the critical pressure is judged by pressure alone: nothing boils there
  const boils = pressurePa <= SATURATION_LINE_RANGE.pressurePa[1] && pressurePa >= SATURATION_LINE_RANGE.pressurePa[0];
  const temperatureK = boils ? saturationTemperatureK(pressurePa) : undefined;
  if (temperatureK !== undefined && bodyTemperatureK !== undefined && !isAtLeast(bodyTemperatureK, temperatureK)) {
    const text = say`Steam at the safety valve’s setting is ${amount('temperature', temperatureK)} hot; the body is rated for ${amount('temperature', bodyTemperatureK)}.`;
    return { code, verdict: 'fail', value: temperatureK, limit: bodyTemperatureK, ...findingWords(text, RATED_BODY) };
  }
  if (bodyPressurePa === undefined) return { code, verdict: 'pass', ...BODY_PASSES_BY_TEMPERATURE };
  const words = bodyTemperatureK === undefined ? BODY_PASSES_BY_PRESSURE : BODY_PASSES;
  return passes(code, pressurePa, bodyPressurePa, words);
}

/** Of a modulated exchanger: at what load its steam space falls to the back pressure. */
function stall({ trap, modulation, backPressurePa, limits }: TrapUnderCheck): TrapCheck | UnmadeCheck | undefined {
  const code = 'stall';
  if (trap.service.kind === 'constant') return undefined;
  if (modulation === undefined)
    return { code, reason: 'The exchanger is drawn without a load, so it has no part load.' };
  const { fullLoadPressurePa, loadFraction: limit } = modulation;
  const [lowestPa, highestPa] = SATURATION_LINE_RANGE.pressurePa;
  // where the case gives the inlet itself, nothing has asked for the steam at full load yet
  if (!(fullLoadPressurePa >= lowestPa && fullLoadPressurePa <= highestPa))
    return { code, reason: 'The inlet’s pressure at full load lies outside the steam properties.' };
  const value = stallFraction(trap.service, fullLoadPressurePa, backPressurePa);
  if (value === undefined)
    return {
      code,
      reason: 'The steam is not hotter than what leaves the exchanger, or that is colder than what enters it.',
    };
  if (value > limit) {
    const text = say`The exchanger stalls below ${amount('fraction', value)} of its load and runs at ${amount('fraction', limit)}: its steam falls to the return’s pressure, condensate backs up into it, and its outlet swings, hammers and corrodes.`;
    return { code, verdict: 'fail', value, limit, ...findingWords(text, DRAIN_AT_STALL) };
  }
  if (value > limit - limits.stall.watchMargin) {
    const text = say`The exchanger stalls below ${amount('fraction', value)} of its load and runs at ${amount('fraction', limit)}: a little less load and condensate backs up into it.`;
    return { code, verdict: 'watch', value, limit, ...findingWords(text, DRAIN_AT_STALL) };
  }
  return passes(code, value, limit, STALL_PASSES);
}

function passes(code: string, value: number, limit: number, { message, text }: FindingWords): TrapCheck {
  return { code, verdict: 'pass', value, limit, message, text };
}

/** A rating that just meets what is asked for passes: 600 lb/h and 3 × 200 lb/h differ in the last digits of a conversion. */
function isAtLeast(rating: number, asked: number): boolean {
  return rating >= asked * (1 - 1e-6);
}
