import { NonPhysicalInputError } from '@riseback/numerics';

/** How a fitting's loss coefficient is found: as a length in bores times f_T, by size where the print does so, or fixed. */
export type FittingLoss =
  | { readonly kind: 'equivalentLength'; readonly diameters: number }
  | {
      readonly kind: 'equivalentLengthBySize';
      readonly steps: readonly { upToNominalInches: number; diameters: number }[];
    }
  | { readonly kind: 'fixed'; readonly lossCoefficient: number };

export interface FittingData {
  /** For choosers and reports. */
  readonly name: string;
  readonly loss: FittingLoss;
  readonly source: string;
}

const PRINTED = 'Crane TP-410, appendix A, L/D; confirmed in a published table of K built on it';
const RECALLED = 'Crane TP-410, appendix A, L/D; as commonly quoted, the print not seen';

/**
 * Loss data of fittings and valves, fully open. Lengths are in bores of the pipe the fitting stands in.
 * Source: Crane, Technical Paper 410, appendix A; each entry says whether the figure was seen in print.
 */
export const FITTINGS = {
  elbow90: { name: 'Elbow 90°, standard', loss: diameters(30), source: PRINTED },
  elbow90LongRadius: {
    name: 'Elbow 90°, long radius (1.5 D)',
    loss: diameters(14),
    source: 'Crane TP-410, appendix A, bend of r/d = 1.5; confirmed in an engineering discussion that quotes it',
  },
  elbow45: { name: 'Elbow 45°', loss: diameters(16), source: PRINTED },
  mitre90: { name: 'Mitre bend 90°', loss: diameters(60), source: RECALLED },
  returnBend180: { name: 'Close return bend 180°', loss: diameters(50), source: PRINTED },
  teeRun: { name: 'Tee, flow through run', loss: diameters(20), source: PRINTED },
  teeBranch: { name: 'Tee, flow through branch', loss: diameters(60), source: PRINTED },
  gateValve: { name: 'Gate valve', loss: diameters(8), source: PRINTED },
  globeValve: { name: 'Globe valve', loss: diameters(340), source: PRINTED },
  angleValve: { name: 'Angle valve', loss: diameters(150), source: PRINTED },
  ballValve: { name: 'Ball valve, full bore', loss: diameters(3), source: PRINTED },
  plugValve: { name: 'Plug valve, straightway', loss: diameters(18), source: PRINTED },
  butterflyValve: {
    name: 'Butterfly valve',
    loss: {
      kind: 'equivalentLengthBySize',
      steps: [
        { upToNominalInches: 8, diameters: 45 },
        { upToNominalInches: 14, diameters: 35 },
        { upToNominalInches: Infinity, diameters: 25 },
      ],
    },
    source: `${PRINTED}; below 2 in the print gives none, and 45 is used`,
  },
  swingCheckValve: { name: 'Swing check valve', loss: diameters(100), source: RECALLED },
  liftCheckValve: { name: 'Lift check valve', loss: diameters(600), source: RECALLED },
  entrance: {
    name: 'Entrance, sharp-edged',
    loss: { kind: 'fixed', lossCoefficient: 0.5 },
    source: 'Crane TP-410, appendix A; as commonly quoted, the print not seen',
  },
  exit: {
    name: 'Exit',
    loss: { kind: 'fixed', lossCoefficient: 1 },
    source: 'Crane TP-410, appendix A; the whole velocity head is lost (Borda-Carnot)',
  },
} as const satisfies Record<string, FittingData>;

export type FittingName = keyof typeof FITTINGS;

/**
 * Fully turbulent friction factor f_T of clean commercial steel by nominal size, with the schedule 40 bore that stands
 * for the size. Printed to three decimals and within 5 % of the fully rough formula.
 * Source: Crane TP-410, appendix A (25th-printing generation), confirmed through a published table of K built on it.
 */
export const TURBULENT_FRICTION_BY_SIZE = [
  { nominalInches: 0.5, schedule40BoreM: 0.01576, frictionFactor: 0.027 },
  { nominalInches: 0.75, schedule40BoreM: 0.02096, frictionFactor: 0.025 },
  { nominalInches: 1, schedule40BoreM: 0.02664, frictionFactor: 0.023 },
  { nominalInches: 1.25, schedule40BoreM: 0.03508, frictionFactor: 0.022 },
  { nominalInches: 1.5, schedule40BoreM: 0.04094, frictionFactor: 0.021 },
  { nominalInches: 2, schedule40BoreM: 0.05248, frictionFactor: 0.019 },
  { nominalInches: 2.5, schedule40BoreM: 0.06268, frictionFactor: 0.018 },
  { nominalInches: 3, schedule40BoreM: 0.07792, frictionFactor: 0.018 },
  { nominalInches: 4, schedule40BoreM: 0.10226, frictionFactor: 0.017 },
  { nominalInches: 5, schedule40BoreM: 0.1282, frictionFactor: 0.016 },
  { nominalInches: 6, schedule40BoreM: 0.15408, frictionFactor: 0.015 },
  { nominalInches: 8, schedule40BoreM: 0.20274, frictionFactor: 0.014 },
  { nominalInches: 10, schedule40BoreM: 0.25446, frictionFactor: 0.014 },
  { nominalInches: 12, schedule40BoreM: 0.30318, frictionFactor: 0.013 },
  { nominalInches: 14, schedule40BoreM: 0.33334, frictionFactor: 0.013 },
  { nominalInches: 16, schedule40BoreM: 0.381, frictionFactor: 0.013 },
  { nominalInches: 18, schedule40BoreM: 0.42846, frictionFactor: 0.012 },
  { nominalInches: 20, schedule40BoreM: 0.47782, frictionFactor: 0.012 },
  { nominalInches: 24, schedule40BoreM: 0.57504, frictionFactor: 0.012 },
] as const;

type SizedFriction = (typeof TURBULENT_FRICTION_BY_SIZE)[number];

/**
 * Loss coefficient of one fitting on the velocity head of its pipe.
 *     K = (L/D) f_T,   f_T by the nominal size whose schedule 40 bore is nearest in ratio;   or a fixed K
 * @param kind key of {@link FITTINGS}
 * @param insideDiameterM bore of the pipe [m], > 0. Below 1/2 in and above 24 in the end of the printed table is used.
 * @returns K [–] in Δp = K ρv²/2
 * @throws NonPhysicalInputError for a bore that is not a positive number
 * @remarks Going by the nominal size, as the print does, means that schedule 80 and EN pipes of a size have the same K as
 *   schedule 40. The actual roughness does not enter: K belongs to the fitting, not to the pipe (docs/methods/fittings.md).
 * Source: Crane, Technical Paper 410, appendix A.
 */
export function fittingLossCoefficient(kind: FittingName, insideDiameterM: number): number {
  const loss: FittingLoss = FITTINGS[kind].loss;
  if (loss.kind === 'fixed') return loss.lossCoefficient;
  const size = nearestNominalSize(insideDiameterM);
  if (loss.kind === 'equivalentLength') return loss.diameters * size.frictionFactor;
  const step = loss.steps.find(({ upToNominalInches }) => size.nominalInches <= upToNominalInches);
  if (step === undefined) throw new Error(`No equivalent length of ${kind} at ${String(size.nominalInches)} in`);
  return step.diameters * size.frictionFactor;
}

/**
 * Fully turbulent friction factor f_T of Crane's table for a bore [m].
 * @throws NonPhysicalInputError for a bore that is not a positive number
 */
export function turbulentFrictionFactorCrane(insideDiameterM: number): number {
  return nearestNominalSize(insideDiameterM).frictionFactor;
}

function nearestNominalSize(insideDiameterM: number): SizedFriction {
  if (!(insideDiameterM > 0 && insideDiameterM < Infinity)) {
    throw new NonPhysicalInputError('fittingLossCoefficient', { insideDiameterM });
  }
  let nearest: SizedFriction = TURBULENT_FRICTION_BY_SIZE[0];
  for (const size of TURBULENT_FRICTION_BY_SIZE) {
    const isNearer = insideDiameterM ** 2 > nearest.schedule40BoreM * size.schedule40BoreM;
    if (isNearer) nearest = size;
  }
  return nearest;
}

function diameters(count: number): FittingLoss {
  return { kind: 'equivalentLength', diameters: count };
}
