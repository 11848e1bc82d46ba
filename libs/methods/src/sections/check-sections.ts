import type { MethodSection } from '../method-section';

type Check = Pick<MethodSection, 'summary' | 'range' | 'limits'> & {
  readonly code: string;
  readonly sources?: readonly string[];
  readonly equations?: readonly string[];
  readonly symbols?: readonly (readonly [string, string])[];
  readonly page?: string;
};

/** What each check judges; its limits and their sources come from the solver’s own table and are shown with it. */
const AT_TRAPS: readonly Check[] = [
  {
    code: 'differential',
    summary: 'Inlet less back pressure. At or below nothing the trap cannot drain at all and its condensate backs up.',
    range: 'Every trap.',
    limits: ['A differential above nothing is no promise of enough capacity.'],
    sources: ['Definition'],
  },
  {
    code: 'capacity',
    summary:
      'What the trap model passes at that differential, against the sizing factor times the load of the case. Between the model’s points capacity is linear in the root of the differential, below the first it falls with the root to nothing, above the last it stays.',
    range: 'Traps with a model that has capacities; never also on the peak.',
    limits: [
      'Published capacities are for cold or for boiling condensate as the maker says; the table is taken as given.',
    ],
    sources: [
      'Flow through an orifice goes with the root of the differential',
      'Usual sizing factors: common practice',
    ],
  },
  {
    code: 'backPressureFraction',
    summary:
      'Gauge back pressure over gauge inlet pressure. A thermodynamic trap stays open above a certain share, and wants a least inlet pressure.',
    range: 'Thermodynamic traps by the limits below; other types by their model’s own limit.',
    limits: ['An inlet at or below the atmosphere fails, whatever the share.'],
  },
  {
    code: 'orificeRating',
    summary:
      'The greatest differential at which the trap’s mechanism still opens, against the setting of the safety valve less the atmosphere.',
    range: 'Traps with a model that gives it and a safety valve’s setting.',
    limits: ['A back pressure that always stands could be deducted, and is not: the return may be cold and empty.'],
    sources: ['ISO 6552, maximum differential pressure'],
  },
  {
    code: 'bodyRating',
    summary:
      'The body’s pressure and temperature rating against the setting of the safety valve and its boiling temperature.',
    range: 'Traps with a model that gives a rating and a safety valve’s setting.',
    limits: ['Pressure and temperature are judged each by itself, not on a joint curve.'],
    sources: ['Definition of a rating; pressure-equipment law governs'],
  },
  {
    code: 'stall',
    summary:
      'The share of load at which the steam space of a modulated exchanger falls to the back pressure. Below it nothing drives the condensate out: the exchanger floods, hammers and corrodes.',
    equations: ['φ_stall = (T_b − T_2)/(T_s − T_2)', 'φ_stall = LMTD(T_b)/LMTD(T_s)'],
    symbols: [['T_b', 'boiling temperature at the back pressure']],
    range:
      'Traps of modulating service; the first is for varying inlet, the second for varying flow. 0 where `T_b` is not above `T_2`.',
    limits: [
      'Constant coefficient of heat transfer, no subcooling in the exchanger.',
      'The back pressure is that of the case; it does not fall along the curve with this trap’s load.',
    ],
    sources: ['As for the steam space behind a control valve, above'],
    page: 'stall',
  },
];

const AT_PIPES: readonly Check[] = [
  {
    code: 'velocity',
    summary:
      'Velocity of the mixture at the downstream end, where it is greatest: erosion and noise. Liquid lines have a limit of their own.',
    range: 'Pipes that carry a flow.',
    limits: ['The mixture’s velocity is without slip; the liquid itself is slower.'],
  },
  {
    code: 'momentum',
    summary: 'Density times velocity squared of the mixture: what wears elbows.',
    equations: ['ρ_m v_m² = G v_m'],
    range: 'Pipes that carry a flow.',
    limits: ['The constant behind the limit is for clean fluids without solids.'],
  },
  {
    code: 'gradient',
    summary: 'Friction and flash over the length, fittings included: how hard the line is worked.',
    range: 'Pipes that carry a flow.',
    limits: ['A short pipe with many fittings may exceed it without harm.'],
  },
  {
    code: 'slug',
    summary:
      'The pattern at the downstream end is intermittent in a level run, or slug or churn in a rise: lumps of liquid thrown by the steam.',
    range: 'Where a map answers.',
    limits: ['Maps have broad boundaries.'],
    sources: ['Taitel & Dukler (1976); Mishima & Ishii (1984)'],
    page: 'flow-patterns',
  },
  {
    code: 'choked',
    summary:
      'The outlet stands at its critical pressure above the node: whatever happens downstream, no more passes without more pressure upstream.',
    range: 'Every pipe that carries flash steam.',
    limits: ['Equilibrium is assumed; a short pipe passes more.'],
    sources: ['As for choking, above'],
    page: 'acceleration-and-choking',
  },
  {
    code: 'dryBasis',
    summary:
      'The flash method is stretched here: flash steam in a rise, or a flow that would not stay stratified. Full-bore methods then give several times as much.',
    range: 'Networks that use flash vapour for friction.',
    limits: ['It says that the basis is left, not by how much: the bands do.'],
    sources: ['As for flash vapour and by flow pattern, above'],
    page: 'flash-vapour',
  },
  {
    code: 'uphillTwoPhase',
    summary:
      'Liquid and flash steam are to rise together. Below enough steam the liquid falls back, gathers and goes up in slugs.',
    range: 'Rises with flash steam.',
    limits: ['It names the place; the pattern says what it is like there.'],
    sources: ['Common practice: drain by gravity, or pump'],
  },
  {
    code: 'thermalShock',
    summary: 'Streams meet that differ in temperature: flash steam collapses in the colder one, which hammers.',
    range: 'Junctions of streams before they mix, a flashing trap into a full cold main included.',
    limits: ['The limit is this program’s own: how hard it hammers depends on the place.'],
    sources: ['This program’s own limit'],
  },
  {
    code: 'reversed',
    summary: 'The flow runs against the drawing’s arrow; where a check valve holds against it, it cannot run at all.',
    range: 'Every pipe.',
    limits: ['In a tree a wrong arrow is the usual cause; in a loop it may be the truth.'],
    sources: ['Definition'],
  },
  {
    code: 'checkValveShut',
    summary:
      'A check valve is held shut by the higher pressure beyond it: its pipe carries nothing, and what comes to it goes another way.',
    range: 'Pipes with a check valve where there is another way down.',
    limits: ['A valve that leaks or chatters is not thought of.'],
    sources: ['Definition'],
    page: 'loops',
  },
  {
    code: 'vesselCannotDrain',
    summary:
      'A flash vessel’s outlet needs more pressure at its start than the vessel holds: its liquid cannot leave, and goes out with the steam.',
    range: 'Every flash vessel.',
    limits: ['The level in the vessel is not counted as head.'],
    sources: ['Definition'],
  },
];

export const TRAP_CHECK_SECTIONS = AT_TRAPS.map(section);
export const PIPE_CHECK_SECTIONS = AT_PIPES.map(section);

/** Its fragment is `check-` and the code, which is how findings and limits point at it. */
function section({ code, page = 'checks', sources = [], ...check }: Check): MethodSection & { readonly code: string } {
  return {
    ...check,
    id: `check-${code}`,
    code,
    title: '',
    sources,
    checked: 'Specs beside the code of the checks.',
    page,
  };
}
