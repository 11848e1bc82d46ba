import { STRATIFIED_SLOPE_LIMIT } from '@riseback/hydraulics';
import type { MethodSection } from '../method-section';
import { printed } from '../printed-number';

const LEVEL_DEG = printed((Math.asin(STRATIFIED_SLOPE_LIMIT) * 180) / Math.PI);

/** Acceleration and choking, the flow patterns, the two bands, and intermittent traps together. */
export const FLOW_SECTIONS: readonly MethodSection[] = [
  {
    id: 'acceleration',
    title: 'Acceleration and choking',
    summary:
      'Flash steam grows as the pressure falls, and it takes pressure to speed it up; at last no lower pressure downstream can speed it further. The outlet then stands at that critical pressure, above the node it discharges into.',
    equations: [
      '−dp/ds = (friction + static)/[1 + G² (dv/dp)_h]',
      '(dv/dp)_h = x v_g′ + (1 − x) v_l′ + (v_g − v_l) x′',
    ],
    symbols: [
      ['v', 'specific volume'],
      ['x′', 'change of the flash share with pressure along the boiling line, at constant enthalpy'],
    ],
    notes: [
      'It chokes where the bracket is 0. By the flash method the vapour alone counts: `1 + (x G)² v_g′`. The jump at a choked outlet is counted as flash.',
    ],
    range: 'Phases in equilibrium: pipes of many bores’ length.',
    limits: ['Short pipes and orifices flash late and pass more.'],
    sources: ['Momentum balance of homogeneous flow; Wallis, One-dimensional Two-phase Flow (1969)'],
    checked: '40 lines marched independently within 3e-6; dry steam chokes within 15 % below the velocity of sound.',
    page: 'acceleration-and-choking',
  },
  {
    id: 'patterns-level',
    title: 'Patterns in level runs',
    summary: `Stratified smooth or wavy, intermittent, annular, or dispersed bubbles, from the level of the stratified balance; within ${LEVEL_DEG}° of level.`,
    equations: ['K² = Re_ls ρ_g j_g²/((ρ_l − ρ_g) g D cos β)'],
    symbols: [['K', 'waves form where it reaches `2/(√ũ (u_g/j_g) √0.01)`']],
    table: {
      head: ['Pattern', 'Where'],
      rows: [
        ['stratified', '`r_A` below 1; wavy above the bound of `K`'],
        ['annular', '`r_A` at 1 or above and the level below half the bore'],
        ['dispersed bubble', 'above that, where turbulence outweighs buoyancy'],
        ['intermittent', 'else'],
      ],
    },
    range: `Slopes up to ${LEVEL_DEG}° either way.`,
    limits: [
      'Boundaries are bands in nature; neighbouring programs differ by a few per cent.',
      'Falls steeper than that are not classified.',
    ],
    sources: ['Taitel & Dukler, AIChE J. 22 (1976) 47-55'],
    checked: 'Another program’s map: 62 points clear of boundaries, all the same.',
    page: 'flow-patterns',
  },
  {
    id: 'patterns-rise',
    title: 'Patterns in rises',
    summary:
      'Bubbly, slug, churn or annular. Slug and churn carry the liquid up in lumps, which shake pipes and gauges.',
    equations: [
      'j_l > (3.33/C0 − 1) j_g − (0.76/C0) (σ g d/ρ_l²)^(1/4)',
      'j_g ≥ √(d g D/ρ_g) (a_m − 0.11)',
      'a_m = 1 − 0.813 {[(C0 − 1) j + 0.35 V]/[j + 0.75 V (d g D³/(ρ_l ν_l²))^(1/18)]}^0.75',
    ],
    symbols: [
      ['d', 'difference of the densities'],
      ['j', 'both superficial velocities together'],
      ['V', '`√(d g D/ρ_l)`'],
      ['a_m', 'void fraction at which slugs break up into churn'],
    ],
    notes: [
      'The first is bubbly flow, the second annular; between them churn with a above `a_m`, slug below, where `a = j_g/(C0 j + 0.35 V)` and `C0 = 1.2 − 0.2 √(ρ_g/ρ_l)`.',
    ],
    range: `Rises steeper than ${LEVEL_DEG}°.`,
    limits: ['Made for upright pipes; used for every steep rise.'],
    sources: ['Mishima & Ishii, Int. J. Heat Mass Transfer 27 (1984) 723-737'],
    checked: 'Seven independent points: pattern, and void fractions to three digits.',
    page: 'flow-patterns',
  },
  {
    id: 'spread',
    title: 'Spread',
    summary:
      'The lowest and the highest back pressure over all friction methods, each with the rule of lift and with two-phase risers by drift flux, and the chosen method itself, which so always lies inside. On one small line the methods differ by up to ten times: a single number would hide that.',
    range:
      'Every solved trap. Each method goes its own way from the receiver up; in loops the flows are solved anew by each.',
    limits: [
      'It holds methods that do not suit the flow; the credible band leaves those out.',
      'A method without a solution is named and left out, and the spread is wider in truth.',
    ],
    sources: ['Definition of this program'],
    checked: 'Every trap of the demo plant against 13 separate solves, to the digit.',
    page: 'spread-and-credible-band',
  },
  {
    id: 'credible',
    title: 'Credible band',
    summary:
      'Pipe by pipe, over the methods that suit how its liquid runs: where it stays stratified, flash vapour and the stratified balance with a smooth and a wavy surface; elsewhere the full-bore methods; on the network’s own static lift. A check that passes by the chosen method and fails within the band becomes a watch. A fail stays a fail.',
    range: 'Every solved trap.',
    limits: [
      'The chosen method need not lie within: where a dry basis is asked for a line that runs full, the band lies above it, and that is the finding.',
      'It is between methods, not around the truth, and no statement of probability: loads, lengths and roughness have doubts of their own.',
      'Whether the static lift is right shows only in the spread.',
    ],
    sources: ['Definition of this program, from the methods above'],
    checked: 'Lines that run full and lines that stay stratified against separate solves, to the digit.',
    page: 'spread-and-credible-band',
  },
  {
    id: 'coincidence-average',
    title: 'All traps at their load',
    summary: 'Every trap gives its load of the case, steadily, intermittent or not.',
    range: 'Many small traps, none of which matters alone.',
    limits: ['A trap that discharges in bursts stands against more than this while it does.'],
    sources: ['Common practice'],
    checked: 'The base of every other figure.',
    page: 'coincidence',
    choice: { key: 'coincidence', value: 'average' },
  },
  {
    id: 'coincidence-ownPeak',
    title: 'Each at its own peak',
    summary:
      'For each intermittent trap its walk is computed with that trap at its load times its peak factor `F`, and all others at their load.',
    equations: ['m′ = m + (F − 1) m_i'],
    range: 'Networks with intermittent traps; where there are loops the whole network is solved for each.',
    limits: [
      'No two peaks ever meet in it.',
      'Capacity is judged at the average load: the sizing factor is what covers the peak.',
    ],
    sources: ['Definition of this program'],
    checked: 'The demo plant and a header with heat loss solved whole, trap by trap, within 1e-9.',
    page: 'coincidence',
    choice: { key: 'coincidence', value: 'ownPeak' },
  },
  {
    id: 'coincidence-probable',
    title: 'Own peak and probable others',
    summary:
      'For each trap its own peak, with its batch, and in every pipe of its walk what the other intermittent traps upstream give together in 95 of 100 moments: each at its peak for one part in `F` of the time and nothing else, independently, but traps of one batch together.',
    equations: ['m′ = m + ("own batch: peak − average") + max(0, Q₉₅("others") − "average of others")'],
    range:
      'Trees; refused in loops. Counted out exactly for up to 16 sources; of more the 16 largest, the rest as normally distributed.',
    limits: [
      'Independence is an assumption: give traps that discharge together one batch name.',
      'Enthalpies are those of the average run; filling and the seconds of a discharge do not count.',
    ],
    sources: ['Definition of this program; Abramowitz & Stegun 7.1.26 for the normal law'],
    checked: 'Five small networks by hand and binomial tables; 400,000 throws of 17 to 60 sources within 1 %.',
    page: 'coincidence',
    choice: { key: 'coincidence', value: 'probable' },
  },
];
