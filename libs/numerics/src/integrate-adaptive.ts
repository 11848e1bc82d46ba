import { NoConvergenceError, NonPhysicalInputError } from './errors';

/**
 * Slope dy/ds at (s, y). When `parts` are asked for, the function also writes the slope of each part into them; parts are
 * integrated with the weights of y itself, so parts that add up to the slope everywhere add up to the change of y exactly.
 */
export type Derivative = (s: number, y: number, parts: Float64Array) => number;

export interface IntegrationOptions {
  /** Estimated error allowed in each step, in the unit of y. The error at the end is at most about steps × this. */
  readonly absoluteTolerance: number;
  /** Accepted and rejected steps together. */
  readonly maximumSteps: number;
  /** How many parts the derivative writes; none by default. */
  readonly partCount?: number;
  /** Arrays for the parts and a record for the result, for callers that integrate again and again; made anew by default. */
  readonly workspace?: IntegrationWorkspace;
  /** First step to try, in the unit of s, sign not regarded; by default the whole way. */
  readonly initialStep?: number;
  /** Called after each accepted step, the last of which is at `endS` to the bit. */
  readonly onStep?: (s: number, y: number) => void;
  /** Named in the errors. */
  readonly where?: string;
}

/** The parts' slopes at each stage, and the result. One integration at a time may use it, and the next overwrites its result. */
export interface IntegrationWorkspace {
  readonly stages: readonly Float64Array[];
  readonly result: { -readonly [Key in keyof IntegrationResult]: IntegrationResult[Key] };
}

export function integrationWorkspace(partCount: number): IntegrationWorkspace {
  return {
    stages: Array.from({ length: STAGES }, () => new Float64Array(partCount)),
    result: { y: NaN, steps: 0, rejectedSteps: 0, parts: new Float64Array(partCount) },
  };
}

export interface IntegrationResult {
  readonly y: number;
  /** Accepted steps. */
  readonly steps: number;
  /** Steps tried and taken back because their error estimate was too great. */
  readonly rejectedSteps: number;
  /** Integral of each part from start to end. */
  readonly parts: Float64Array;
}

/** Below this share of the whole way a step cannot shrink: the slope jumps or blows up there. */
const SMALLEST_STEP_SHARE = 1e-12;

/**
 * Integrates dy/ds = f(s, y) from start to endS by the explicit Runge-Kutta pair of Dormand and Prince: fifth order, with an
 * embedded fourth-order result whose difference steers the step.
 *
 * The error is held for each step, not for each unit of length: at a jump of the slope (where the physics changes its regime)
 * a bound in proportion to the step could never be met, while this one only makes a few short steps.
 *
 * @param derivative slope f(s, y); a trial step may ask for it a little off the solution. NaN or ∞ there shortens the step
 * @param start s and y to begin with
 * @param endS may lie on either side of the start; it is reached exactly
 * @throws NonPhysicalInputError for a start, end or option that is not a finite number, or a tolerance ≤ 0
 * @throws NoConvergenceError when the slope at the start is not finite, when no step is short enough for it to be, or when
 *   maximumSteps is spent; its residual is the way still to go, in the unit of s
 * Source: Dormand & Prince, J. Comput. Appl. Math. 6 (1980) 19–26, doi:10.1016/0771-050X(80)90013-3, the RK5(4)7M pair.
 */
export function integrateAdaptive(
  derivative: Derivative,
  start: { readonly s: number; readonly y: number },
  endS: number,
  options: IntegrationOptions,
): IntegrationResult {
  const { absoluteTolerance, maximumSteps, partCount = 0, initialStep = Infinity, onStep } = options;
  const where = options.where ?? 'integrateAdaptive';
  let { s, y } = start;
  if (!(
    Number.isFinite(s) &&
    Number.isFinite(y) &&
    Number.isFinite(endS) &&
    absoluteTolerance > 0 &&
    initialStep > 0
  )) {
    throw new NonPhysicalInputError(where, { startS: s, startY: y, endS, absoluteTolerance, initialStep });
  }
  const { stages, result } = options.workspace ?? integrationWorkspace(partCount);
  const { parts: totals } = result;
  // not fill(): for three numbers its call costs as much as a stage
  for (let part = 0; part < totals.length; part++) totals[part] = 0;
  if (s === endS) return ended(result, y, 0, 0);

  const whole = endS - s;
  const direction = Math.sign(whole);
  const { 0: parts1, 1: parts2, 2: parts3, 3: parts4, 4: parts5, 5: parts6, 6: parts7 } = stages as StageParts;
  let k1 = derivative(s, y, parts1);
  if (!Number.isFinite(k1)) throw new NoConvergenceError(where, 0, whole);
  let step = direction * Math.min(initialStep, Math.abs(whole));
  let steps = 0;
  let rejectedSteps = 0;
  while (steps + rejectedSteps < maximumSteps) {
    const left = endS - s;
    // stretched a little rather than leave a sliver of a step behind
    const last = Math.abs(step) * 1.01 >= Math.abs(left);
    const h = last ? left : step;

    const k2 = derivative(s + h * C2, y + h * (A21 * k1), parts2);
    const k3 = derivative(s + h * C3, y + h * (A31 * k1 + A32 * k2), parts3);
    const k4 = derivative(s + h * C4, y + h * (A41 * k1 + A42 * k2 + A43 * k3), parts4);
    const k5 = derivative(s + h * C5, y + h * (A51 * k1 + A52 * k2 + A53 * k3 + A54 * k4), parts5);
    const nextS = last ? endS : s + h;
    const k6 = derivative(nextS, y + h * (A61 * k1 + A62 * k2 + A63 * k3 + A64 * k4 + A65 * k5), parts6);
    const nextY = y + h * (B1 * k1 + B3 * k3 + B4 * k4 + B5 * k5 + B6 * k6);
    const k7 = derivative(nextS, nextY, parts7);
    const error = Math.abs(h * (E1 * k1 + E3 * k3 + E4 * k4 + E5 * k5 + E6 * k6 + E7 * k7)) / absoluteTolerance;

    if (error <= 1) {
      for (let part = 0; part < partCount; part++) {
        const weighted =
          B1 * (parts1[part] as number) +
          B3 * (parts3[part] as number) +
          B4 * (parts4[part] as number) +
          B5 * (parts5[part] as number) +
          B6 * (parts6[part] as number);
        totals[part] = (totals[part] as number) + h * weighted;
      }
      s = nextS;
      y = nextY;
      steps++;
      onStep?.(s, y);
      if (last) return ended(result, y, steps, rejectedSteps);
      // the last stage is the first of the next step; its parts move along with it
      k1 = k7;
      for (let part = 0; part < partCount; part++) parts1[part] = parts7[part] as number;
    } else {
      rejectedSteps++;
      if (Math.abs(h) < SMALLEST_STEP_SHARE * Math.abs(whole)) break;
    }
    step = h * stepFactor(error);
  }
  throw new NoConvergenceError(where, steps + rejectedSteps, endS - s);
}

function ended(
  result: IntegrationWorkspace['result'],
  y: number,
  steps: number,
  rejectedSteps: number,
): IntegrationResult {
  result.y = y;
  result.steps = steps;
  result.rejectedSteps = rejectedSteps;
  return result;
}

/** How much longer the next step may be: fifth-order rule with a margin, at most fivefold either way. */
function stepFactor(error: number): number {
  if (!Number.isFinite(error)) return 0.2;
  return Math.min(5, Math.max(0.2, 0.9 * error ** -0.2));
}

const STAGES = 7;
type StageParts = readonly [
  Float64Array,
  Float64Array,
  Float64Array,
  Float64Array,
  Float64Array,
  Float64Array,
  Float64Array,
];
const C2 = 1 / 5;
const C3 = 3 / 10;
const C4 = 4 / 5;
const C5 = 8 / 9;
const A21 = 1 / 5;
const A31 = 3 / 40;
const A32 = 9 / 40;
const A41 = 44 / 45;
const A42 = -56 / 15;
const A43 = 32 / 9;
const A51 = 19372 / 6561;
const A52 = -25360 / 2187;
const A53 = 64448 / 6561;
const A54 = -212 / 729;
const A61 = 9017 / 3168;
const A62 = -355 / 33;
const A63 = 46732 / 5247;
const A64 = 49 / 176;
const A65 = -5103 / 18656;
const B1 = 35 / 384;
const B3 = 500 / 1113;
const B4 = 125 / 192;
const B5 = -2187 / 6784;
const B6 = 11 / 84;
// fifth-order less fourth-order weights
const E1 = B1 - 5179 / 57600;
const E3 = B3 - 7571 / 16695;
const E4 = B4 - 393 / 640;
const E5 = B5 + 92097 / 339200;
const E6 = B6 - 187 / 2100;
const E7 = -1 / 40;
