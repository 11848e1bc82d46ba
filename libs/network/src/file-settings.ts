import * as z from 'zod';

/** What a network file says of the network as a whole: its site, the method and the limits of the checks. */
export const STATIC_LIFT_BASES = ['rule', 'liquidFull', 'twoPhase'] as const;
export const FRICTION_METHODS = [
  'flashVapour',
  'homogeneous',
  'lockhartMartinelli',
  'friedel',
  'mullerSteinhagenHeck',
  'byPattern',
] as const;
export const VOID_FRACTIONS = ['homogeneous', 'zivi', 'chisholm', 'rouhaniAxelsson'] as const;
export const COINCIDENCES = ['average', 'ownPeak', 'probable'] as const;

/** Half a psi per foot of rise, in Pa/m (common practice). */
export const DEFAULT_LIFT_RULE_PA_M = 11_310.297;

export const SiteConditions = z.strictObject({
  atmosphericPressurePa: z.number().min(30_000).max(120_000).default(101_325),
  ambientTemperatureK: z.number().min(213.15).max(343.15).default(293.15),
});

export const Method = z.strictObject({
  staticLift: z.enum(STATIC_LIFT_BASES).default('rule'),
  liftRulePaM: z.number().min(0).max(20_000).default(DEFAULT_LIFT_RULE_PA_M),
  dropCredit: z.number().min(0).max(1).default(0),
  friction: z.enum(FRICTION_METHODS).default('flashVapour'),
  voidFraction: z.enum(VOID_FRACTIONS).default('rouhaniAxelsson'),
  coincidence: z.enum(COINCIDENCES).default('average'),
  acceleration: z.boolean().default(true),
});

const limit = z.number().positive().max(1e9);
/** Limits of checks by the check's code; a key left out keeps the default (libs/solver names its value and source). */
export const Limits = z.strictObject({
  backPressureFraction: z
    .strictObject({
      watchFraction: limit.max(1),
      failFraction: limit.max(1),
      minimumInletGaugePa: z.number().min(0).max(2.5e7),
    })
    .partial()
    .optional(),
  velocity: z.strictObject({ watchMS: limit, failMS: limit, liquidMS: limit }).partial().optional(),
  momentum: z.strictObject({ limitPa: limit }).partial().optional(),
  gradient: z.strictObject({ flashingPaM: limit, liquidPaM: limit }).partial().optional(),
  thermalShock: z.strictObject({ limitK: limit }).partial().optional(),
  stall: z
    .strictObject({ watchMargin: z.number().min(0).max(1) })
    .partial()
    .optional(),
});

export type SiteConditions = z.infer<typeof SiteConditions>;
export type Method = z.infer<typeof Method>;
export type Limits = z.infer<typeof Limits>;
export type FrictionMethod = (typeof FRICTION_METHODS)[number];
