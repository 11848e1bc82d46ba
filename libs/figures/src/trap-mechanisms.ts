import type { TrapType } from '@riseback/network';

/** What is drawn inside a trap's circle, on a grid of 24 about its middle, stroke 1.5. */
export const TRAP_MECHANISMS: Readonly<Record<TrapType, readonly string[]>> = {
  // a ball on its lever
  floatThermostatic: ['M-5.6 0.4a2.8 2.8 0 1 0 5.6 0a2.8 2.8 0 1 0 -5.6 0', 'M-0.4 -1 5.4 -4.6', 'M3.8 -6.4 6.4 -2.6'],
  // an upturned bucket on its stem
  invertedBucket: ['M-3.8 3V-4.2H3.8V3', 'M0 -4.2V-8'],
  // bellows
  thermostatic: ['M0 -8V-6.2L-3.4 -4.8 3.4 -2.6 -3.4 -0.4 3.4 1.8 0 3.2V4.4'],
  // a disc over its seat
  thermodynamic: ['M-5.2 -3.6H5.2', 'M-5.6 0.4H-2V3.6', 'M5.6 0.4H2V3.6', 'M0 -0.6V-3.6'],
  // a plate with its bore
  orifice: ['M0 -8.4V-2.4', 'M0 1.2V4.6', 'M-6.2 -0.6H-3', 'M3 -0.6H6.2'],
};

/** A trap whose type is not given: only what every trap does. */
export const UNKNOWN_MECHANISM: readonly string[] = ['M0 -6V2', 'M-2.6 -0.6 0 2 2.6 -0.6'];
