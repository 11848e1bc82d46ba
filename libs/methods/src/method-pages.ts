import { checkName } from '@riseback/contracts';
import type { MethodGroup, MethodSection } from './method-section';
import { AGREEMENT_SECTIONS } from './sections/agreement-sections';
import { PIPE_CHECK_SECTIONS, TRAP_CHECK_SECTIONS } from './sections/check-sections';
import { FLOW_SECTIONS } from './sections/flow-sections';
import { FLUID_SECTIONS } from './sections/fluid-sections';
import { FRICTION_SECTIONS } from './sections/friction-sections';
import { LIFT_SECTIONS } from './sections/lift-sections';
import { NETWORK_SECTIONS } from './sections/network-sections';

/** Letters that all sections share, [symbol, meaning]. */
export const SYMBOLS: readonly (readonly [string, string])[] = [
  ['p', 'pressure, absolute'],
  ['h', 'enthalpy per mass'],
  ['x', 'flash share of the mass flow'],
  ['m', 'mass flow'],
  ['G', 'mass flow over cross-section'],
  ['D', 'bore'],
  ['ε', 'roughness'],
  ['L', 'length'],
  ['K', 'loss coefficient of fittings'],
  ['f', 'Darcy’s friction factor'],
  ['ρ', 'density'],
  ['μ', 'viscosity'],
  ['σ', 'surface tension'],
  ['α', 'share of the bore that steam fills'],
  ['β', 'angle of the fall'],
  ['j', 'flow of one phase over the whole bore'],
  ['u', 'velocity of one phase in its own part'],
  ['s', 'way along the pipe'],
];
/** What stands below a letter. */
export const SUBSCRIPTS: readonly (readonly [string, string])[] = [
  ['l', 'saturated liquid'],
  ['g', 'saturated steam'],
  ['lo', 'the whole flow as liquid'],
  ['go', 'the whole flow as steam'],
  ['h', 'the mixture without slip; at constant enthalpy'],
];

const named = (sections: readonly (MethodSection & { readonly code: string })[]): MethodSection[] =>
  sections.map((section) => ({ ...section, title: checkName(section.code) }));

/** Everything that the program computes, in the order in which it does. */
export const METHOD_GROUPS: readonly MethodGroup[] = [
  { id: 'fluid', title: 'Water and steam', sections: FLUID_SECTIONS },
  { id: 'network', title: 'The walk', sections: NETWORK_SECTIONS },
  { id: 'friction', title: 'Friction', sections: FRICTION_SECTIONS },
  { id: 'lift', title: 'Lift', sections: LIFT_SECTIONS },
  { id: 'flow', title: 'Choking, patterns, bands, coincidence', sections: FLOW_SECTIONS },
  { id: 'checks-traps', title: 'Checks at traps', sections: named(TRAP_CHECK_SECTIONS) },
  { id: 'checks-pipes', title: 'Checks at pipes and vessels', sections: named(PIPE_CHECK_SECTIONS) },
  { id: 'gauges', title: 'Gauges', sections: AGREEMENT_SECTIONS },
];

export const METHOD_SECTIONS: readonly MethodSection[] = METHOD_GROUPS.flatMap(({ sections }) => sections);
