import type { Trap, TrapType } from '@riseback/network';

/** Trade names of trap types, as short as a column needs. */
export const TRAP_TYPE_WORDS: Readonly<Record<TrapType, string>> = {
  invertedBucket: 'Inverted bucket',
  floatThermostatic: 'Float-thermostatic',
  thermostatic: 'Thermostatic',
  thermodynamic: 'Thermodynamic',
  orifice: 'Orifice',
};

export const DISCHARGE_WORDS: Readonly<Record<Trap['discharge'], string>> = {
  intermittent: 'Intermittent',
  continuous: 'Continuous',
};

type ModulatingService = Extract<Trap['service'], { kind: 'modulating' }>;
/** What changes at part load: the steam pressure before the trap, or how much is heated. */
export const CONTROL_WORDS: Readonly<Record<ModulatingService['control'], string>> = {
  varyingInlet: 'Varying inlet',
  varyingFlow: 'Varying flow',
};
