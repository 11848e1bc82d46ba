import type { Method } from '@riseback/network';

/** A method that the network chooses among several. */
export type MethodChoice = 'friction' | 'staticLift' | 'voidFraction' | 'coincidence';

/** One plain sentence each, for whoever has to choose. */
export const METHOD_SENTENCES: {
  readonly [Key in MethodChoice]: Readonly<Record<Method[Key], string>>;
} = {
  friction: {
    flashVapour:
      'The flash steam has the bore to itself and the liquid drains by its pitch: the handbook’s basis for dry pitched returns, and mostly the lowest figure.',
    homogeneous:
      'Liquid and flash steam move as one fluid at one velocity: for high flows, and high for pitched returns.',
    lockhartMartinelli:
      'Each phase alone in the bore, and a factor for what they cost each other: from small level pipes.',
    friedel: 'A multiplier on the whole flow as liquid, fitted to many measurements in level pipes and rises.',
    mullerSteinhagenHeck:
      'A curve between the whole flow as liquid and as steam: the plainest of the good full-bore fits.',
    byPattern:
      'Stratified where a level or falling line would stay so, full bore where it would not: choose it where a return may leave the dry basis.',
  },
  staticLift: {
    rule: 'Half a psi for each foot of rise, whatever flows: more than any condensate weighs, as the trade counts.',
    liquidFull: 'A rise carries saturated liquid at its own density: a riser that fills.',
    twoPhase: 'A rise carries the mixture of liquid and flash steam that the void fraction gives.',
  },
  voidFraction: {
    homogeneous:
      'No slip. Unsafe in rises: 0.0004 bar/m where drift flux gives 0.015 and a full riser 0.094. Only to compare with figures made that way.',
    zivi: 'Slip by the cube root of the densities’ ratio, from annular flow.',
    chisholm: 'Slip that grows with the share of flash steam.',
    rouhaniAxelsson:
      'The vapour drifts ahead of the liquid: the only one here that knows the flow, made for vertical pipes.',
  },
  coincidence: {
    average: 'Every trap at its load of the case, steady.',
    ownPeak: 'For each intermittent trap its own peak discharge, with all others at their load.',
    probable:
      'Its own peak, and with it what the other intermittent traps upstream discharge together in 95 of 100 moments; only without loops.',
  },
};
