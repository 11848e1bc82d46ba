import { SATURATION_RANGE_PA } from '@riseback/steam';
import type { MethodSection } from '../method-section';
import { printed } from '../printed-number';

const [LOWEST_PA, HIGHEST_PA] = SATURATION_RANGE_PA;
const BAR_PA = 1e5;

/** Properties of water and steam, and how much of the condensate is steam. */
export const FLUID_SECTIONS: readonly MethodSection[] = [
  {
    id: 'water-and-steam',
    title: 'Properties',
    summary:
      'Every property comes from the international formulations for water and steam; the walk reads them from a table in ln p that is made from those formulations when the program starts.',
    table: {
      head: ['Property', 'Formulation'],
      rows: [
        ['boiling pressure and temperature', 'IAPWS-IF97 region 4'],
        ['liquid: volume, enthalpy', 'IAPWS-IF97 region 1'],
        ['vapour: volume, enthalpy', 'IAPWS-IF97 region 2'],
        ['viscosity', 'IAPWS R12-08, industrial form'],
        ['surface tension', 'IAPWS R1-76(2014)'],
      ],
    },
    range: `Boiling from ${printed(LOWEST_PA / BAR_PA)} to ${printed(HIGHEST_PA / BAR_PA)} bar absolute, liquid from 0 °C, steam to 800 °C. Beyond, the solve stops and names the element and the value: nothing is clamped.`,
    limits: [
      'Pure water: no air, no treatment chemicals, no carry-over.',
      'The critical enhancement of the viscosity is left out; it matters only within a few kelvin of 647 K.',
    ],
    sources: [
      'IAPWS R7-97(2012), Industrial Formulation 1997',
      'IAPWS R12-08, viscosity',
      'IAPWS R1-76(2014), surface tension',
    ],
    checked:
      '73 printed check values, every digit; 257 states of another implementation within 5e-10; table against formulations within 1e-7.',
    page: 'water-and-steam',
  },
  {
    id: 'flash-fraction',
    title: 'Flash share',
    summary:
      'How much of the flow is steam at a place: what the enthalpy has above boiling liquid at the local pressure. It is taken to flash at once and without loss.',
    equations: ['x = (h − h_l(p))/(h_g(p) − h_l(p))'],
    range: 'x at or below 0 is liquid below boiling, above 1 superheated steam; both by their own properties.',
    limits: [
      'Flash in a short pipe lags behind equilibrium, so a little less steam is there than this says.',
      'Speed and height are left out of the energy: together below 0.02 % of the heat of evaporation.',
    ],
    sources: ['First law of steady flow; properties as above'],
    checked:
      'Independent figures from 1.01 to 11 bar within 0.000001; 116 published percentages within 0.25 points but for three misprints and roundings, which the test names.',
    page: 'flash-fraction',
  },
];
