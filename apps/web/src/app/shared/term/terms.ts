/** A word of the trade and what it means here. `docs/glossary.md` holds the same words; a test holds one against the other. */
export interface TermText {
  readonly word: string;
  readonly meaning: string;
}

/** What the screens explain where such a word first stands. Plain, without numbers that a case could change. */
export const TERMS = {
  backPressure: {
    word: 'back pressure',
    meaning: 'The pressure that stands against a trap’s outlet: receiver, lift, friction and flash together.',
  },
  inletPressure: {
    word: 'inlet pressure',
    meaning: 'The pressure before the trap: that of the steam space less what the equipment takes.',
  },
  differential: {
    word: 'differential',
    meaning: 'Inlet pressure less back pressure. Nothing else drives condensate through a trap.',
  },
  load: {
    word: 'load',
    meaning: 'The condensate that arrives at the trap, as mass per time.',
  },
  lift: {
    word: 'lift',
    meaning:
      'A stretch in which the pipe climbs in the direction of flow. The column of water in it presses back on the traps below.',
  },
  static: {
    word: 'static',
    meaning: 'Pressure taken by rises, whether anything flows or not. Falls give back only what the method credits.',
  },
  friction: {
    word: 'friction',
    meaning: 'What the pipes and fittings would take if the condensate stayed liquid.',
  },
  flash: {
    word: 'flash',
    meaning:
      'Hot condensate boils where the pressure falls. That flash steam fills the pipe, and this is what it adds to the friction.',
  },
  flashShare: {
    word: 'flash share',
    meaning: 'The part of the flow, by mass, that runs as flash steam.',
  },
  running: {
    word: 'running',
    meaning: 'The pressure reached so far, from the receiver up to this pipe.',
  },
  handCheck: {
    word: 'hand check',
    meaning:
      'The rule of thumb beside the computed walk: receiver pressure plus half a psi for each foot of rise. It leaves out friction and flash.',
  },
  staff: {
    word: 'staff',
    meaning:
      'The picture of one trap: a tube up to the inlet pressure, filled from the foot up to the back pressure. What is empty is the differential; the pointer is the limit.',
  },
  limit: {
    word: 'limit',
    meaning: 'The back pressure above which a check of this trap would fail.',
  },
  spread: {
    word: 'spread',
    meaning: 'From the lowest to the highest back pressure that any method in the program gives.',
  },
  credibleBand: {
    word: 'credible band',
    meaning:
      'The narrower range by the methods that suit the flow in each pipe. A pass that fails within it becomes a watch.',
  },
  stall: {
    word: 'stall',
    meaning:
      'A valve throttles the steam until an exchanger’s pressure is no higher than the back pressure. Condensate then stands in it.',
  },
  sizingFactor: {
    word: 'sizing factor',
    meaning: 'Capacity wanted over average load, for starts and peaks.',
  },
  blowThrough: {
    word: 'blow-through',
    meaning: 'Live steam that passes a trap which has failed open.',
  },
  case: {
    word: 'case',
    meaning: 'One way the plant runs: design, start-up, turndown, something shut off or failed.',
  },
  worstOfAll: {
    word: 'worst of all',
    meaning: 'Each trap in the case that treats it worst: the worst verdict, then the highest back pressure.',
  },
  zone: {
    word: 'zone',
    meaning: 'The field of the drawing sheet, a letter and a number, so that two people look at the same spot.',
  },
} as const satisfies Readonly<Record<string, TermText>>;

export type TermKey = keyof typeof TERMS;
