import type { TrapResult } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { nodeName, pipeName } from './accessible-name';
import { samplePipe, sampleTrap } from './sample-network';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const SI = { system: 'si', atmosphericPressurePa: 101_325 } as const;
/** 31.2 psi (6,894.757 Pa each, NIST SP 811) above the atmosphere. */
const BACK_PRESSURE_PA = 101_325 + 31.2 * 6894.757;

const RESULT: TrapResult = {
  id: 'T4',
  backPressurePa: BACK_PRESSURE_PA,
  receiverPressurePa: 101_325,
  staticPa: 0,
  frictionPa: 0,
  flashPa: BACK_PRESSURE_PA - 101_325,
  differentialPa: 1,
  handCheck: { staticPa: 0, backPressurePa: 101_325 },
  walk: [],
  checks: [
    { code: 'capacity', verdict: 'watch', message: '', text: [] },
    { code: 'differential', verdict: 'fail', message: '', text: [] },
    { code: 'bodyRating', verdict: 'pass', message: '', text: [] },
  ],
  notChecked: [],
};
const NOTHING = { trap: undefined, result: undefined, warnings: [], selected: false };

describe('names read out', () => {
  it('says tag, kind, elevation, what stands behind a trap and what fails before what is watched', () => {
    const trap = sampleTrap('T4', { x: 0, y: 0 }, 'TR-104');
    expect(nodeName(trap, { ...NOTHING, trap: RESULT, selected: true }, US)).toBe(
      'TR-104, trap, elevation 4 ft, 31.2 psig behind it, differential fails, capacity to be watched, selected',
    );
    expect(nodeName(trap, NOTHING, US)).toBe('TR-104, trap, elevation 4 ft, not solved');
    expect(nodeName(trap, NOTHING, SI)).toBe('TR-104, trap, elevation 1.219 m, not solved');
  });

  it('takes the id where there is no tag', () => {
    expect(nodeName({ id: 'J1', kind: 'junction', elevationM: 0 }, NOTHING, US)).toBe('J1, junction, elevation 0 ft');
  });

  it('says a pipe’s ends, size and pressures', () => {
    const pipe = samplePipe('L1', 'T4', 'J1', { tag: 'CR-1', lengthM: 3.048 });
    const facts = {
      from: sampleTrap('T4', { x: 0, y: 0 }, 'TR-104'),
      to: undefined,
      result: undefined,
      warnings: [],
      selected: false,
    };
    expect(pipeName(pipe, facts, US)).toBe('CR-1, pipe from TR-104 to J1, 10 ft of 1 in schedule 40, not solved');
  });
});
