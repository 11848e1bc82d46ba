import type { TrapResult } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { staffModel } from './staff-model';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const NAMED = { receiverName: 'Receiver R1', limitPa: undefined };

/** 139,408 Pa = 101,325 + static 34,474 (10 ft at half a psi a foot) + friction 27 + flash 3,583. */
const trap: TrapResult = {
  id: 'T1',
  backPressurePa: 139_409,
  receiverPressurePa: 101_325,
  staticPa: 34_474,
  frictionPa: 27,
  flashPa: 3_583,
  differentialPa: 478_591,
  handCheck: { staticPa: 34_474, backPressurePa: 135_799 },
  walk: ['L1'],
  checks: [],
  notChecked: [],
};

describe('staffModel', () => {
  it('piles receiver, lift, friction and flash up to the back pressure', () => {
    const { parts, footPa, topPa } = staffModel(trap, 618_000, US, NAMED);
    expect([footPa, topPa]).toEqual([101_325, 618_000]);
    expect(parts.map(({ kind, fromPa, toPa }) => [kind, fromPa, toPa])).toEqual([
      ['receiver', 101_325, 101_325],
      ['lift', 101_325, 135_799],
      ['friction', 135_799, 135_826],
      ['flash', 135_826, 139_409],
    ]);
  });

  it('prints parts that add up, and knows the height of the lift', () => {
    const { parts, sentence } = staffModel(trap, 618_000, US, NAMED);
    expect(parts.map(({ name, shown }) => `${name} ${shown}`)).toEqual([
      'Receiver R1 0.00',
      'Lift, 10 ft 5.00',
      'Friction 0.00',
      'Flash steam 0.52',
    ]);
    expect(sentence).toBe(
      'Back pressure 5.5 psig against 74.9 psig at the steam inlet, 69.4 psi of differential. ' +
        'Made of: Receiver R1 0.00; Lift, 10 ft 5.00; Friction 0.00; Flash steam 0.52.',
    );
  });

  it('takes a credited fall off the top of the receiver', () => {
    const fallen = {
      ...trap,
      receiverPressurePa: 200_000,
      staticPa: -30_000,
      frictionPa: 5_000,
      flashPa: 0,
      backPressurePa: 175_000,
    };
    const { parts } = staffModel(fallen, 618_000, US, NAMED);
    expect(parts.map(({ fromPa, toPa }) => [fromPa, toPa])).toEqual([
      [101_325, 170_000],
      [170_000, 170_000],
      [170_000, 175_000],
      [175_000, 175_000],
    ]);
    expect(parts[1]?.name).toBe('Fall, credited');
  });

  it('says so when the return stands above the inlet, and reaches up to it', () => {
    const { topPa, sentence } = staffModel(trap, 120_000, US, { ...NAMED, limitPa: 110_000 });
    expect(topPa).toBe(139_409);
    expect(sentence).toContain('no differential, it is 2.8 psi above the inlet; limit 1.3 psig, exceeded');
  });

  it('begins below the atmosphere where the receiver stands under vacuum', () => {
    const { footPa, parts } = staffModel(
      { ...trap, receiverPressurePa: 80_000, backPressurePa: 118_084 },
      618_000,
      US,
      NAMED,
    );
    expect(footPa).toBe(80_000);
    expect(parts[0]).toMatchObject({ fromPa: 80_000, toPa: 80_000, shown: '−3.09' });
  });

  it('says both bands in words, and reaches down to the spread', () => {
    const banded = {
      ...trap,
      spread: { lowPa: 95_000, highPa: 446_000 },
      credible: { lowPa: 135_000, highPa: 170_000, withoutSolution: ['Friedel'] },
    };
    const { footPa, sentence } = staffModel(banded, 618_000, US, NAMED);
    expect(footPa).toBe(95_000);
    // psig: (135,000 − 101,325)/6,894.757 = 4.9, 9.96; −0.9, 50.0
    expect(sentence).toContain('Credible from 4.9 to 10.0 psig, Friedel without a solution.');
    expect(sentence).toContain('By every method from −0.9 to 50.0 psig.');
  });
});
