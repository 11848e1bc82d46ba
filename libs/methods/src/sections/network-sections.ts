import { CHOKED_PRESSURE_RATIO, ORIFICE_DISCHARGE_COEFFICIENT } from '@riseback/hydraulics';
import type { MethodSection } from '../method-section';
import { printed } from '../printed-number';

/** How flow, energy and pressure go through the network, and what a case changes. */
export const NETWORK_SECTIONS: readonly MethodSection[] = [
  {
    id: 'flow-and-energy',
    title: 'Flow and energy',
    summary:
      'Steady state. Flows add up at every node and mix by their enthalpy. A trap gives liquid at the boiling temperature of its inlet, less its subcooling; a pumped inlet liquid at its temperature; a flash vessel passes on its liquid at the pressure it is held at.',
    equations: ['m = Σ m_i', 'h = Σ m_i h_i / m'],
    range: 'Networks of traps, junctions, receivers, flash vessels and pumped inlets.',
    limits: [
      'Steady flow: no filling, no draining, no water hammer. A batch that starts is seen only through its case.',
      'Along a pipe only the given heat loss takes enthalpy away, evenly, and never below liquid at the temperature of the air.',
      'A vessel is held at its pressure whatever flows in.',
    ],
    sources: ['Mass and energy balance'],
    checked: 'Independent walks of trees and of the demo plant; balances closed in random networks.',
    page: 'network-walk',
  },
  {
    id: 'pressure-walk',
    title: 'Pressure along a pipe',
    summary:
      'From every receiver and vessel the pressure is marched upstream, pipe by pipe, to the traps. At each step the local pressure gives the flash share, and that the gradient.',
    equations: ['−dp/ds = (static + friction + flash)/[1 + w G² (dv/dp)_h]'],
    symbols: [['w', 'share of the flow that is sped up: 1 for full-bore methods, 0 for flash vapour']],
    range: 'Any slope and route. Fittings are spread evenly along their pipe.',
    limits: [
      'The place of a fitting within its pipe is not seen: draw a pipe of its own where it matters.',
      'Choking is sought at a pipe’s outlet.',
    ],
    sources: ['Dormand & Prince, J. Comput. Appl. Math. 6 (1980) 19-26, for the order 5 pair with error control'],
    checked:
      'Independent marches of 42 lines and 5 trees within 0.1 %; a tolerance ten times tighter moves no trap of the demo by more than 5 Pa.',
    page: 'network-walk',
  },
  {
    id: 'loops',
    title: 'Loops and several receivers',
    summary:
      'Where pipes close a loop, or one header reaches two receivers, the flows are sought that let the pressures agree at every meeting: Newton’s method on the flow of one pipe for each loop, around the same walk.',
    range:
      'Loops, parallel headers, receivers joined by pipes, check valves. A pipe may turn out to flow against its arrow, which is reported.',
    limits: [
      'What does not close is said to have no solution, with its place; there is never a number in its stead.',
      'The walk shown for a trap in a loop follows the largest outflow.',
    ],
    sources: [
      'Newton’s method on loop flows; Hardy Cross, University of Illinois Bulletin 286 (1936), for the idea of loop corrections',
    ],
    checked: 'Every mesh closed to below 1 Pa; cold liquid against an independent computation of loop corrections.',
    page: 'network-walk',
  },
  {
    id: 'cases',
    title: 'Operating cases',
    summary:
      'A case multiplies the loads and the gauge pressure of the inlets, and may override single elements. An isolated trap gives nothing.',
    range: 'Whatever is overridden stands as it is given; factors work on the rest.',
    limits: ['A case is a steady state, not a sequence of events.'],
    sources: ['Definition of this program'],
    checked: 'Each override and factor by itself.',
    page: 'operating-cases',
  },
  {
    id: 'modulating-inlet',
    title: 'Steam space behind a control valve',
    summary:
      'Behind a control valve the steam space follows the load. Its temperature is the one at which the exchanger gives just the load’s share `φ` of its full duty.',
    equations: ['p = p_sat(T_2 + φ (T_s − T_2))', 'LMTD(T) = (T_2 − T_1)/ln[(T − T_1)/(T − T_2)]'],
    symbols: [
      ['T_1', 'temperature of the secondary fluid where it enters'],
      ['T_2', 'temperature of the secondary fluid where it leaves'],
      ['T_s', 'boiling temperature of the steam at full load'],
    ],
    notes: [
      'The first equation is for constant secondary flow and varying inlet. For varying flow the pressure is that at which the mean temperature difference is `φ LMTD(T_s)`.',
    ],
    range: '`φ` from 0 to 1; from full load up the valve stands open.',
    limits: [
      'The coefficient of heat transfer is taken as constant, and an exchanger that floods is not followed further.',
    ],
    sources: [
      'Mean temperature difference of condensing steam, any text-book of heat transfer',
      'Use for stall: common practice',
    ],
    checked: 'Both put back into the heat balance, to 1e-9.',
    page: 'operating-cases',
  },
  {
    id: 'failed-open',
    title: 'Traps that have failed open',
    summary:
      'Live steam blown through the trap’s orifice on top of its load, against the back pressure that the steam itself raises.',
    equations: [`W = ${printed(ORIFICE_DISCHARGE_COEFFICIENT)} A p/70`, 'G² ∝ r^(2/n) − r^((n + 1)/n)'],
    symbols: [
      ['W', 'steam, lb/s, while the orifice is choked'],
      ['A', 'area of the orifice, in²'],
      ['p', 'inlet pressure, psia'],
      ['r', 'back pressure over inlet pressure, both absolute'],
    ],
    notes: [
      `Choked up to \`r = ${printed(CHOKED_PRESSURE_RATIO, 3)}\`; above that the flow falls as \`G\` at \`r\` does from \`G\` at that limit, with Zeuner’s exponent \`n\` for dry saturated steam.`,
    ],
    range: 'Saturated steam; an orifice diameter of the trap model or of the case is needed.',
    limits: [
      'An upper bound: the condensate that shares the orifice is not taken off.',
      'Nothing flows back through a trap whose return stands above its inlet.',
    ],
    sources: [
      'Napier’s rule as handbooks print it',
      'US DOE Steam Tip Sheet 1, Inspect and Repair Steam Traps',
      'De Saint-Venant & Wantzel (1839)',
    ],
    checked: '16 cells of the leak table within 0.5 %; an independent walk of the demo plant with one trap open.',
    page: 'steam-orifice',
    warning: 'Live steam in a return burns whoever opens the line. Isolate and drain before touching a trap.',
  },
];
