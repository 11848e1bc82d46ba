import type { MethodSection } from '../method-section';

/** Readings of gauges against what is predicted. */
export const AGREEMENT_SECTIONS: readonly MethodSection[] = [
  {
    id: 'gauge-reading',
    title: 'From a dial to the pipe',
    summary:
      'What the dial shows, the atmosphere, and the cold water that stands in the line to the gauge where its leg is filled. The tap’s height follows the route of its pipe.',
    equations: ['p_tap = p_read + p_atm + ρ g (z_gauge − z_tap)'],
    range: 'Legs that are full, or have none; water of 1 to 80 °C.',
    limits: [
      'A leg that is half full shows neither.',
      'Within a pipe the prediction is marched to the tap; where no trap’s way leads through, it lies between the pipe’s ends.',
    ],
    sources: ['Hydrostatics; density by IAPWS-IF97'],
    checked: '3 m of cold water by hand; a tap at either end of a pipe, and on a pipe drawn the other way.',
    page: 'agreement',
  },
  {
    id: 'gauge-agreement',
    title: 'Agreement',
    summary:
      'The difference over both uncertainties together. A reading is as good as its gauge: accuracy, resolution, height of the leg. A prediction is as good as its loads, its held pressures and the credible band on the side measured. Up to 1 it agrees, to 1.5 it is doubtful, beyond it disagrees.',
    equations: ['u² = Σ u_i²', 'E_n = (p_measured − p_predicted)/√(U_m² + U_p²)'],
    symbols: [
      ['u', 'standard uncertainty; of a limit, the limit over √3'],
      ['U', 'expanded to about 95 %'],
    ],
    range: 'Steady readings of a round taken together in one case.',
    limits: [
      'Disagreement says that something is otherwise than drawn, not what.',
      'Doubtful is this program’s word: ISO/IEC 17043 knows 1 alone.',
      'On the change since a baseline round what model and gauge always have wrong cancels; how much of a gauge’s error remains is this program’s estimate.',
    ],
    sources: ['JCGM 100:2008 (GUM)', 'EA-4/02 S9, S10', 'ISO/IEC 17043', 'ISO 13528'],
    checked: 'Two worked budgets of EA-4/02 and printed scores of NIST, to their digits.',
    page: 'agreement',
  },
  {
    id: 'gauge-choice',
    title: 'What a gauge can decide',
    summary:
      'A gauge should work in the middle half of its scale, and be read to less than what it is to decide: what the nearest trap upstream has left before its back-pressure limit, or how far the methods are apart at its tap.',
    range: 'Gauges with a range and an accuracy.',
    limits: ['Grades and working range are from memory of the standards.'],
    sources: ['ASME B40.100', 'EN 837-1', 'EN 837-2'],
    checked: 'Every limit from both sides.',
    page: 'agreement',
  },
];
