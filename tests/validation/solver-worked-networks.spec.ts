import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { found, networkFile, solved, trapOf } from '../fixtures/solver/small-networks';

const PSI_PA = 6894.757293168;
const FOOT_M = 0.3048;
const ATMOSPHERE_PA = 101_325;
const LB_H_KG_S = 0.45359237 / 3600;

const psig = (gauge: number): number => ATMOSPHERE_PA + gauge * PSI_PA;

describe('one trap, a 10 ft riser and a level line, by default methods', () => {
  // Independent walk of the same model (own Python integration with IF97); printed to 1 Pa, asked for within 0.2 %.
  const file = networkFile({
    nodes: [
      { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
      { id: 'J1', kind: 'junction', elevationM: 3.048 },
      { id: 'R1', kind: 'receiver', elevationM: 3.048, pressurePa: ATMOSPHERE_PA },
    ],
    pipes: [
      { id: 'L1', from: 'T1', to: 'J1', lengthM: 6, size: { nps: '1', schedule: '40' } },
      { id: 'L2', from: 'J1', to: 'R1', lengthM: 30, size: { nps: '1', schedule: '40' }, lossCoefficient: 5 },
    ],
  });
  const trap = trapOf(solved(file), 'T1');

  it('has the back pressure of the independent walk', () => {
    expect(relativeError(trap.backPressurePa, 139_408)).toBeLessThan(2e-3);
  });

  it('is made of the same parts', () => {
    expect(relativeError(trap.staticPa, 34_474)).toBeLessThan(2e-3);
    // 27 Pa is printed without decimals
    expect(Math.abs(trap.frictionPa - 27)).toBeLessThan(0.5);
    expect(relativeError(trap.flashPa, 3583)).toBeLessThan(2e-3);
  });

  it('has 5.0 psi of lift by the hand check, to the digit', () => {
    expect((trap.handCheck.staticPa / PSI_PA).toFixed(3)).toBe('5.000');
  });
});

describe('cold condensate in a full line', () => {
  // By hand, Darcy-Weisbach with Colebrook-White, water at 340 K: density 979.5 kg/m³ and viscosity 4.22e-4 Pa s (IAPWS, as in
  // any steam table), v = 2.5/(979.5 × π/4 × 0.0409²) = 1.943 m/s, Re = 1.844e5, f from Colebrook by fixed point iteration.
  it('agrees with Darcy-Weisbach and Colebrook-White by hand within 0.1 %', () => {
    const file = networkFile({
      method: { staticLift: 'liquidFull' },
      nodes: [
        { id: 'P1', kind: 'pumpedInlet', elevationM: 0, flowKgS: 2.5, temperatureK: 340 },
        { id: 'R1', kind: 'receiver', elevationM: 9, pressurePa: 120_000 },
      ],
      pipes: [{ id: 'L1', from: 'P1', to: 'R1', lengthM: 80, insideDiameterM: 0.0409, lossCoefficient: 6 }],
    });
    const bore = 0.0409;
    const density = 979.5;
    const speed = 2.5 / (density * (Math.PI / 4) * bore ** 2);
    const Re = (density * speed * bore) / 4.22e-4;
    let f = 0.02;
    for (let i = 0; i < 50; i++) f = (-2 * Math.log10(4.57e-5 / bore / 3.7 + 2.51 / (Re * Math.sqrt(f)))) ** -2;
    const expectedPa = 120_000 + ((f * 80) / bore + 6) * ((density * speed ** 2) / 2) + density * 9.80665 * 9;
    const inlet = found(solved(file).nodes, 'P1');
    expect(relativeError(inlet.pressurePa, expectedPa)).toBeLessThan(1e-3);
  });
});

describe('hand checks (common practice)', () => {
  const model = { id: 'M1', name: 'Model', maximumDifferentialPa: 125 * PSI_PA };
  const dripLeg = (trap: object, trapModel: object = model) =>
    networkFile({
      nodes: [
        {
          id: 'T1',
          kind: 'trap',
          elevationM: 0,
          inletPressurePa: psig(150),
          loadKgS: 120 * LB_H_KG_S,
          trapType: 'invertedBucket',
          trapModel: 'M1',
          maximumPressurePa: psig(150),
          ...trap,
        },
        { id: 'R1', kind: 'receiver', elevationM: 10 * FOOT_M, pressurePa: psig(25) },
      ],
      pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 10 * FOOT_M, size: { nps: '2', schedule: '40' } }],
      trapModels: [trapModel],
    });

  it('a drip-leg trap with 25 psig in its return and 10 ft of rise has 30 psig behind it, and 120 psi of differential', () => {
    const trap = trapOf(solved(dripLeg({})), 'T1');
    expect(Math.abs((trap.handCheck.backPressurePa - ATMOSPHERE_PA) / PSI_PA - 30)).toBeLessThan(0.005);
    // friction and flash of so small a load in a 2 in riser are a few hundredths of a psi
    expect(Math.abs(trap.differentialPa / PSI_PA - 120)).toBeLessThan(0.05);
  });

  it('at sizing factor 3 its 120 lb/h need 360 lb/h of capacity', () => {
    const at = (flowLbH: number) => {
      const capacity = [{ differentialPa: 100 * PSI_PA, flowKgS: flowLbH * LB_H_KG_S }];
      const check = trapOf(solved(dripLeg({}, { ...model, capacity })), 'T1').checks.find(
        ({ code }) => code === 'capacity',
      );
      return { verdict: check?.verdict, neededLbH: (check?.limit ?? NaN) / LB_H_KG_S };
    };
    expect(relativeError(at(361).neededLbH, 360)).toBeLessThan(1e-9);
    expect(at(361).verdict).toBe('pass');
    expect(at(359).verdict).toBe('fail');
  });

  it('a trap for 200 lb/h needs 600, and a model that passes it still fails with its seat rated below the safety valve', () => {
    const capacity = [{ differentialPa: 100 * PSI_PA, flowKgS: 600 * LB_H_KG_S }];
    const file = dripLeg({ loadKgS: 200 * LB_H_KG_S }, { ...model, capacity });
    const { checks } = trapOf(solved(file), 'T1');
    const verdict = (code: string) => checks.find((check) => check.code === code)?.verdict;
    expect(relativeError((checks.find(({ code }) => code === 'capacity')?.limit ?? NaN) / LB_H_KG_S, 600)).toBeLessThan(
      1e-9,
    );
    expect(verdict('capacity')).toBe('pass');
    expect(verdict('orificeRating')).toBe('fail');
  });
});
