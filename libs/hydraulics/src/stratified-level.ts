import { findRootBracketed } from '@riseback/numerics';
import { FULLEST_LOGIT, logitOfLevel, sectionAtLogit } from './level-section';
import { lnForceRatio, type StratifiedForces } from './stratified-forces';

/** A film thinner than this share of the bore is taken at it: it changes the gradient by less than 1e-6 there. */
export const THINNEST_FILM_LEVEL = 1e-5;
const THINNEST_FILM = logitOfLevel(THINNEST_FILM_LEVEL);
/**
 * Up to this level the pull on the liquid falls steadily with depth in level and falling runs, so a change of sign below it is the lowest
 * root. Above it, near the depth at which a channel carries most, the balance may turn back and have three roots.
 */
export const STEADY_UP_TO_LEVEL = 0.88;
const STEADY_UP_TO = logitOfLevel(STEADY_UP_TO_LEVEL);
/** Search step in the logit where there may be several roots. */
const SEARCH_STEP = 0.2;
const LOGIT_TOLERANCE = 1e-9;
/** Secant steps need four to six; the rest is left to the bracketed search. */
const MOST_SECANT_STEPS = 12;
/**
 * The logit at Lockhart and Martinelli's X in level pipes, −0.2 + 0.42 ln X, within 0.3 from X = 0.01 to 100 (fitted to the seven levels
 * of docs/methods/by-pattern.md). Its slope is that of the balance, ln X² over the logit.
 */
const LOGIT_AT_ONE = -0.2;
const LOGIT_PER_LN_X = 0.42;
const BALANCE_PER_LOGIT = -2 / LOGIT_PER_LN_X;
/** Darcy factor of both phases, for the start alone. */
const START_FRICTION = 0.025;

/** Lowest logit at which the forces balance, within the levels solved for; undefined for a full pipe. */
export function lowestLevel(forces: StratifiedForces): number | undefined {
  const { fallSlope } = forces.flow;
  const balance = (logit: number): number => lnForceRatio(forces, sectionAtLogit(logit));
  if (fallSlope >= 0) {
    const near = secantRoot(balance, startLogit(forces));
    if (near !== undefined) return near;
  }
  if (balance(THINNEST_FILM) <= 0) return THINNEST_FILM;
  let from = THINNEST_FILM;
  if (fallSlope >= 0) {
    if (balance(STEADY_UP_TO) <= 0) return root(THINNEST_FILM, STEADY_UP_TO);
    from = STEADY_UP_TO;
  }
  while (from < FULLEST_LOGIT) {
    const to = Math.min(FULLEST_LOGIT, from + SEARCH_STEP);
    if (balance(to) <= 0) return root(from, to);
    from = to;
  }
  return undefined;

  function root(low: number, high: number): number {
    return findRootBracketed(balance, low, high, { xTolerance: LOGIT_TOLERANCE, where: 'the stratified level' });
  }
}

/** Near the root, from the pull of liquid and vapour as if each had the bore to itself; a fall helps the vapour. */
function startLogit({ flow, liquidSpeedMS, vapourSpeedMS, weightPaM }: StratifiedForces): number {
  const { saturation, insideDiameterM, fallSlope } = flow;
  const perHead = START_FRICTION / (2 * insideDiameterM);
  const liquidPaM = perHead * saturation.liquidDensityKgM3 * liquidSpeedMS * liquidSpeedMS;
  const vapourPaM = perHead * saturation.vapourDensityKgM3 * vapourSpeedMS * vapourSpeedMS;
  return LOGIT_AT_ONE + (LOGIT_PER_LN_X / 2) * Math.log(liquidPaM / (vapourPaM + weightPaM * fallSlope));
}

/**
 * The root by secant steps while they stay where the balance falls steadily and shrink; it is then the only one there.
 * @returns undefined where they do not
 */
function secantRoot(balance: (logit: number) => number, start: number): number | undefined {
  let logit = start;
  let slope = BALANCE_PER_LOGIT;
  let [logitBefore, balanceBefore] = [NaN, NaN];
  for (let taken = 0; taken < MOST_SECANT_STEPS; taken++) {
    if (!(logit > THINNEST_FILM && logit < STEADY_UP_TO)) return undefined;
    const here = balance(logit);
    if (here === 0) return logit;
    if (taken > 0) slope = (here - balanceBefore) / (logit - logitBefore);
    if (!(slope < 0)) return undefined;
    [logitBefore, balanceBefore] = [logit, here];
    const step = -here / slope;
    logit += step;
    if (Math.abs(step) < LOGIT_TOLERANCE / 2) return logit;
  }
  return undefined;
}
