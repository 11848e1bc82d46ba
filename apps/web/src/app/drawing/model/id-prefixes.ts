import type { NodeKind } from '@riseback/network';

/** Prefixes of new ids, by kind. */
export const ID_PREFIXES: Readonly<Record<NodeKind | 'pipe' | 'gauge' | 'trapModel', string>> = {
  trap: 'T',
  junction: 'J',
  receiver: 'R',
  flashVessel: 'V',
  pumpedInlet: 'P',
  pipe: 'L',
  gauge: 'G',
  trapModel: 'M',
};
