import type { Limits } from '@riseback/network';
import type { FindingQuantity } from './solve-result';

/** A default limit in SI, with where it comes from; screens and docs show both. */
export interface CheckLimit {
  readonly value: number;
  readonly quantity: FindingQuantity;
  readonly source: string;
}

/** Every limit of the checks made here, by the check's code and the key under `limits` of the network file. */
export const CHECK_LIMITS = {
  backPressureFraction: {
    watchFraction: { value: 0.5, quantity: 'fraction', source: 'UFGS-15559A, impact-operated traps' },
    failFraction: { value: 0.8, quantity: 'fraction', source: 'common practice for thermodynamic traps' },
    minimumInletGaugePa: {
      value: 68_947.57,
      quantity: 'pressureDifference',
      source: 'UFGS-15559A: 10 psig at least for impact-operated traps',
    },
  },
  velocity: {
    watchMS: { value: 25, quantity: 'velocity', source: 'Energy Management Handbook: 5,000 ft/min in returns' },
    failMS: { value: 35.56, quantity: 'velocity', source: 'ASHRAE Handbook, Fundamentals, pipe sizing: 7,000 ft/min' },
    liquidMS: { value: 2.1, quantity: 'velocity', source: 'common practice for liquid returns' },
  },
  momentum: {
    limitPa: { value: 14_881.64, quantity: 'momentumFlux', source: 'API RP 14E with c = 100: 10,000 lb/(ft s²)' },
  },
  gradient: {
    flashingPaM: {
      value: 226.206,
      quantity: 'pressureGradient',
      source: 'ASHRAE Handbook, Fundamentals, pipe sizing: 1 psi per 100 ft',
    },
    liquidPaM: { value: 140, quantity: 'pressureGradient', source: 'common practice for liquid returns' },
  },
  thermalShock: {
    limitK: { value: 30, quantity: 'temperatureDifference', source: 'this program’s own' },
  },
  stall: {
    watchMargin: { value: 0.15, quantity: 'fraction', source: 'this program’s own' },
  },
} as const satisfies Record<string, Record<string, CheckLimit>>;

/** The limits in force: the site's own where it set one, else the default. */
export type LimitsInForce = {
  readonly [Code in keyof typeof CHECK_LIMITS]: { readonly [Key in keyof (typeof CHECK_LIMITS)[Code]]: number };
};

export function limitsInForce(limits: Limits): LimitsInForce {
  return {
    backPressureFraction: inForce(CHECK_LIMITS.backPressureFraction, limits.backPressureFraction),
    velocity: inForce(CHECK_LIMITS.velocity, limits.velocity),
    momentum: inForce(CHECK_LIMITS.momentum, limits.momentum),
    gradient: inForce(CHECK_LIMITS.gradient, limits.gradient),
    thermalShock: inForce(CHECK_LIMITS.thermalShock, limits.thermalShock),
    stall: inForce(CHECK_LIMITS.stall, limits.stall),
  };
}

function inForce<Key extends string>(
  defaults: Readonly<Record<Key, CheckLimit>>,
  own: { readonly [K in Key]?: number | undefined } = {},
): Record<Key, number> {
  const keys = Object.keys(defaults) as Key[];
  return Object.fromEntries(keys.map((key) => [key, own[key] ?? defaults[key].value])) as Record<Key, number>;
}
