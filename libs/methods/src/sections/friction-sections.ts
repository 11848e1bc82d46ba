import {
  COLEBROOK_RANGE,
  DRAINING_QUALITY,
  FITTINGS,
  type FittingData,
  LAMINAR_LIMIT_RE,
  LEAST_PITCH,
  TURBULENT_LIMIT_RE,
} from '@riseback/hydraulics';
import type { MethodSection } from '../method-section';
import { printed } from '../printed-number';

const [LEAST_RE, MOST_RE] = COLEBROOK_RANGE.Re;
const [, ROUGHEST] = COLEBROOK_RANGE.relativeRoughness;
const BELOW_LINE = 'For liquid (x at or below 0) it is the full liquid line, for x = 1 the vapour alone.';

function fittingRows(): string[][] {
  return Object.values<FittingData>(FITTINGS).map(({ name, loss, source }) => [name, lossWords(loss), source]);
}

function lossWords(loss: FittingData['loss']): string {
  switch (loss.kind) {
    case 'fixed':
      return `K ${printed(loss.lossCoefficient)}`;
    case 'equivalentLength':
      return `L/D ${printed(loss.diameters)}`;
    case 'equivalentLengthBySize':
      return `L/D ${loss.steps
        .map(({ upToNominalInches, diameters }) =>
          Number.isFinite(upToNominalInches)
            ? `${printed(diameters)} to ${printed(upToNominalInches)} in`
            : `${printed(diameters)} above`,
        )
        .join(', ')}`;
  }
}

/** Friction of one phase, of fittings, and of liquid and steam together by each of the methods. */
export const FRICTION_SECTIONS: readonly MethodSection[] = [
  {
    id: 'single-phase-friction',
    title: 'Liquid or steam alone',
    summary: 'Darcy and Weisbach, with the factor for smooth and rough pipes and every flow from laminar up.',
    equations: ['−dp/ds = (f/D + K/L) ρv²/2', '1/√f = −2 log₁₀[ k/3.7 + 2.51/(Re √f) ]'],
    symbols: [['k', 'roughness over bore, `ε/D`']],
    table: {
      head: ['Re', 'Darcy factor f'],
      rows: [
        [`to ${printed(LAMINAR_LIMIT_RE)}`, '64/Re'],
        [`${printed(LAMINAR_LIMIT_RE)} to ${printed(TURBULENT_LIMIT_RE)}`, 'ln f linear in Re'],
        [`from ${printed(TURBULENT_LIMIT_RE)}`, 'Colebrook-White'],
      ],
    },
    range: `Re ${printed(LEAST_RE)} to ${printed(MOST_RE)} and k up to ${printed(ROUGHEST)}, Moody’s chart.`,
    limits: [
      'Between laminar and turbulent no law is exact; the bridge is this program’s own and narrow, because the handbook’s table of dry returns follows Colebrook-White there.',
      'Roughness grows with corrosion and scale; the default is new commercial steel.',
    ],
    sources: ['Colebrook, J. Inst. Civ. Eng. 11 (1939) 133-156', 'Hagen-Poiseuille for 64/Re'],
    checked: '299 values to nine digits within 5e-9; printed examples within 0.4 %.',
    page: 'liquid-friction',
  },
  {
    id: 'fittings',
    title: 'Fittings',
    summary:
      'A loss coefficient of so many bores of straight pipe times the factor of fully turbulent flow at that size; entrance and exit are fixed.',
    equations: ['Δp = K ρv²/2', 'K = (L/D) f_T'],
    table: { head: ['Fitting', 'Loss', 'Source'], rows: fittingRows() },
    notes: [
      'Liquid and steam together, by the full-bore methods: K on the velocity head of the mixture without slip, `K G²/(2 ρ_l) · [1 + x (ρ_l/ρ_g − 1)]`.',
    ],
    range: 'Printed for 1/2 to 24 in; valves fully open and full bore.',
    limits: [
      'A tee by L/D takes no account of how the flow divides.',
      'A reduced seat costs more: give its own loss coefficient.',
    ],
    sources: ['Crane, Technical Paper 410, appendix A'],
    checked: 'f_T at 17 sizes and K of 44 fittings, exact.',
    page: 'fittings',
  },
  {
    id: 'friction-flashVapour',
    title: 'Flash vapour',
    summary:
      'The flash steam has the bore to itself; the liquid drains under it by the pitch of the line and needs pressure only for what the pitch does not give. It is the handbook’s basis of dry pitched returns.',
    equations: ['flash = (f_g/D + K/L) (x G)²/(2 ρ_g)', 'friction = w L(m) + (1 − w) max(0, L((1 − x) m) − ρ_l g i)'],
    symbols: [
      ['L(m)', 'gradient of m as saturated liquid alone, fittings included'],
      [
        'w',
        `share that still runs full: \`(1 − x/${printed(DRAINING_QUALITY)})²\` for x from 0 to ${printed(DRAINING_QUALITY)}, above that 0`,
      ],
      ['i', `fall per length, at least 1:${printed(1 / LEAST_PITCH)} in level and falling runs, 0 in rises`],
    ],
    range: 'Level and falling lines that stay stratified.',
    limits: [
      'In rises with flash steam, and in flows that would not stay stratified, full-bore correlations give several times as much: 7 to 16 times at the table’s own flows. The check “dry basis” names such pipes.',
      'There is no acceleration term; the steam chokes by its own velocity.',
    ],
    sources: ['ASHRAE Handbook, Fundamentals, pipe sizing: table of dry-closed returns'],
    checked: 'The table’s 103 cells in flow: 2.4 % at worst, 0.74 % rms.',
    page: 'flash-vapour',
    choice: { key: 'friction', value: 'flashVapour' },
  },
  {
    id: 'friction-homogeneous',
    title: 'Homogeneous',
    summary: 'Liquid and flash steam mixed evenly and moving at one velocity, as if they were one fluid.',
    equations: ['−dp/ds = (f/D + K/L) G²/(2 ρ_h)', '1/ρ_h = x/ρ_g + (1 − x)/ρ_l', '1/μ = x/μ_g + (1 − x)/μ_l'],
    symbols: [
      ['ρ_h', 'density of the mixture without slip'],
      ['f', 'factor at `Re = G D/μ`'],
    ],
    range: `Full bore, bubbles or mist, high mass flux. ${BELOW_LINE}`,
    limits: [
      'In a pitched return it takes the liquid along at the steam’s velocity and gives many times what such a line needs.',
    ],
    sources: ['McAdams, Woods & Heroman, Trans. ASME 64 (1942) 193-200'],
    checked: '200 independent values within 4e-9; 40 lines marched independently within 3e-6.',
    page: 'homogeneous',
    choice: { key: 'friction', value: 'homogeneous' },
  },
  {
    id: 'friction-lockhartMartinelli',
    title: 'Lockhart and Martinelli',
    summary: 'Each phase as if it had the bore to itself, and what they cost each other.',
    equations: ['φ_l² = 1 + C/X + 1/X²', 'X² = g_l/g_g', '−dp/ds = φ_l² g_l = g_l + C √(g_l g_g) + g_g'],
    symbols: [
      ['g_l', 'gradient of the liquid’s part alone'],
      ['g_g', 'gradient of the steam’s part alone'],
    ],
    table: {
      head: ['Liquid alone', 'Steam alone', 'C'],
      rows: [
        ['turbulent', 'turbulent', '20'],
        ['laminar', 'turbulent', '12'],
        ['turbulent', 'laminar', '10'],
        ['laminar', 'laminar', '5'],
      ],
    },
    range: `Full bore, small level pipes, 1.5 to 26 mm in the paper. ${BELOW_LINE}`,
    limits: [
      'Mass flux counts only through the friction factors.',
      'Between Re 2,000 and 4,000 ln C is linear in Re: this program’s own bridge.',
    ],
    sources: [
      'Lockhart & Martinelli, Chem. Eng. Prog. 45 (1949) 39-48',
      'Chisholm, Int. J. Heat Mass Transfer 10 (1967) 1767-1778',
    ],
    checked: '186 independent values clear of the transition within 5e-9.',
    page: 'lockhart-martinelli',
    choice: { key: 'friction', value: 'lockhartMartinelli' },
  },
  {
    id: 'friction-friedel',
    title: 'Friedel',
    summary: 'A multiplier on the whole flow as liquid, fitted to some 25,000 measurements.',
    equations: [
      'φ_lo² = E + 3.24 F H/(Fr^0.0454 We^0.035)',
      'E = (1 − x)² + x² (ρ_l f_go)/(ρ_g f_lo)',
      'F = x^0.78 (1 − x)^0.224',
      'H = (ρ_l/ρ_g)^0.91 (μ_g/μ_l)^0.19 (1 − μ_g/μ_l)^0.7',
      'Fr = G²/(g D ρ_h²)',
      'We = G² D/(σ ρ_h)',
    ],
    symbols: [
      ['f_lo', 'factor of the whole flow as liquid'],
      ['f_go', 'factor of the whole flow as steam'],
    ],
    range: `Full bore, level and upward. ${BELOW_LINE}`,
    limits: ['Text-books round two exponents, to 0.24 and 0.045; the ones here are the original’s.'],
    sources: ['Friedel, European Two-Phase Flow Group Meeting, Ispra (1979), paper E2'],
    checked: '200 independent values within 4e-9; a text-book example within 1e-5.',
    page: 'friedel',
    choice: { key: 'friction', value: 'friedel' },
  },
  {
    id: 'friction-mullerSteinhagenHeck',
    title: 'Müller-Steinhagen and Heck',
    summary: 'A curve between the whole flow as liquid and the whole flow as steam: the shortest of the good fits.',
    equations: ['−dp/ds = [A + 2 (B − A) x] (1 − x)^(1/3) + B x³'],
    symbols: [
      ['A', 'gradient of the whole flow as liquid'],
      ['B', 'gradient of the whole flow as steam'],
    ],
    range: `Full bore, level and upright pipes of 4 to 392 mm. ${BELOW_LINE}`,
    limits: ['The factor is this program’s, where the paper has one for smooth pipes, so that roughness counts.'],
    sources: ['Müller-Steinhagen & Heck, Chem. Eng. Process. 20 (1986) 297-308'],
    checked: '200 independent values within 4e-9; 40 lines marched independently within 2e-6.',
    page: 'mueller-steinhagen-heck',
    choice: { key: 'friction', value: 'mullerSteinhagenHeck' },
  },
  {
    id: 'friction-byPattern',
    title: 'By flow pattern',
    summary:
      'Where a level or falling line would stay stratified, the balance of forces on its liquid and its steam; elsewhere Müller-Steinhagen and Heck; and a smooth blend between them.',
    equations: [
      'τ_l S_l/A_l − τ_g S_g/A_g − τ_i S_i (1/A_l + 1/A_g) − (ρ_l − ρ_g) g sin β = 0',
      'g_s = (τ_g S_g + τ_i S_i)/A_g + (K/L) ρ_g j_g²/2',
      'r_A = [ρ_g j_g²/((ρ_l − ρ_g) g D cos β)] (u_g/j_g)² r/((A_g/D²)(1 − h)²)',
      'w = S(ln(2 r_A)/ln 4)',
      'ln g = (1 − w) ln g_s + w ln g_MSH',
    ],
    symbols: [
      ['h', 'level of the liquid over the bore, the lowest that balances'],
      ['A_k, S_k', 'cross-section and wetted wall of each phase; `S_i` the surface between them'],
      ['τ_k', 'shear of each phase at its wall, `f_k ρ_k u_k²/8`, and of the steam on the surface'],
      ['r_A', 'how far the flow is from leaving stratified flow: it leaves at 1'],
      ['S(t)', '`3 t² − 2 t³` between 0 and 1'],
    ],
    range: 'Falls up to 10° as stratified; rises, steeper falls and liquid by the full-bore figure.',
    limits: [
      'The blend runs over `r_A` from 0.5 to 2 and is this program’s own.',
      'In wet steep falls the gradient rises quickly over a third more load, though without a jump.',
      'Waves on the liquid are shown only in the credible band.',
    ],
    sources: ['Taitel & Dukler, AIChE J. 22 (1976) 47-55', 'Andritsos & Hanratty, AIChE J. 33 (1987) 444-454'],
    checked: 'Twelve independent points to their printed digits; the paper’s levels to four digits.',
    page: 'by-pattern',
    choice: { key: 'friction', value: 'byPattern' },
  },
];
