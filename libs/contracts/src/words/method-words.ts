import type { FrictionMethod, Method } from '@riseback/network';

/** What screens and reports call the methods; the Method view explains them. */
export const FRICTION_WORDS: Readonly<Record<FrictionMethod, string>> = {
  flashVapour: 'Flash vapour (dry returns)',
  homogeneous: 'Homogeneous',
  lockhartMartinelli: 'Lockhart-Martinelli',
  friedel: 'Friedel',
  mullerSteinhagenHeck: 'Müller-Steinhagen-Heck',
  byPattern: 'By flow pattern',
};

export const STATIC_LIFT_WORDS: Readonly<Record<Method['staticLift'], string>> = {
  rule: '½ psi/ft of rise',
  liquidFull: 'liquid-full risers',
  twoPhase: 'two-phase risers',
};

export const VOID_FRACTION_WORDS: Readonly<Record<Method['voidFraction'], string>> = {
  homogeneous: 'No slip (homogeneous)',
  zivi: 'Zivi',
  chisholm: 'Chisholm',
  rouhaniAxelsson: 'Rouhani-Axelsson (drift flux)',
};

export const COINCIDENCE_WORDS: Readonly<Record<Method['coincidence'], string>> = {
  average: 'All at their load',
  ownPeak: 'Each at its own peak',
  probable: 'Own peak and probable others',
};
