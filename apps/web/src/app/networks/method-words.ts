import type { FrictionMethod, Method } from '@riseback/network';

/** What screens call the methods; docs/methods/ explains them. */
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
