import type { TrapResult } from '@riseback/contracts';
import { fromFile, NetworkFileShape } from '@riseback/network';
import type { LedgerEntry } from '@riseback/solver';
import { describe, expect, it } from 'vitest';
import { ledgerModel } from './ledger-model';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const SI = { ...US, system: 'si' } as const;

/** Pascals of a psi and metres of a foot (NIST SP 811). */
const PSI = 6_894.757293168;
const FT = 0.3048;

/** A trap, a 10 ft riser and a level run to an open receiver. */
const document = fromFile(
  NetworkFileShape.parse({
    format: 'riseback-network',
    version: 1,
    name: 'One lift',
    nodes: [
      { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
      { id: 'J1', kind: 'junction', elevationM: 10 * FT },
      { id: 'R1', kind: 'receiver', elevationM: 10 * FT, vented: true },
    ],
    pipes: [
      { id: 'L1', tag: 'CR-1', from: 'T1', to: 'J1', lengthM: 20 * FT, size: { nps: '1-1/2', schedule: '80' } },
      {
        id: 'L2',
        from: 'J1',
        to: 'R1',
        lengthM: 98.5 * FT,
        insideDiameterM: 0.0254,
        area: 'Rack',
        note: 'over the road\nsteep',
      },
    ],
  }),
);

const entry = (pipeId: string, change: Partial<LedgerEntry>): LedgerEntry => ({
  pipeId,
  riseM: 0,
  fallM: 0,
  lengthM: 98.5 * FT,
  insideDiameterM: 0.0254,
  massFlowKgS: 0.05,
  quality: 0.1234,
  staticPa: 0,
  frictionPa: 0.003 * PSI,
  flashPa: 0.4 * PSI,
  runningPressurePa: 0,
  handCheckPa: 0,
  handCheckRunningPa: 0,
  ...change,
});
const lift = {
  riseM: 10 * FT,
  fallM: FT,
  lengthM: 20 * FT,
  staticPa: 5 * PSI,
  handCheckPa: 5 * PSI,
  flashPa: 0.123 * PSI,
};
const trap = { id: 'T1', receiverPressurePa: 101_325, backPressurePa: 101_325 + 5.529 * PSI } as TrapResult;

describe('ledgerModel', () => {
  const model = ledgerModel([entry('L2', {}), entry('L1', lift)], trap, document, US);

  it('opens at the receiver and closes at the trap, with the hand check’s five psi of lift', () => {
    expect(model.opening).toBe('0.00');
    expect(model.closing).toEqual({
      length: '118.5',
      rise: '+10 −1',
      up: '10',
      down: '1',
      static: '5.00',
      friction: '0.01',
      flashSteam: '0.52',
      running: '5.53',
      handAdds: '5.00',
      handRunning: '5.00',
    });
  });

  it('tells what is absent from what is too little to print', () => {
    const [level, riser] = model.rows;
    expect([level?.static, level?.friction, level?.rise, level?.handAdds]).toEqual(['–', '0.00', '–', '–']);
    expect([riser?.static, riser?.rise, riser?.lifts]).toEqual(['5.00', '+10 −1', true]);
  });

  it('names each element, its place and its bore as drawings do', () => {
    expect(model.rows.map(({ no, element, place, bore }) => [no, element, place, bore])).toEqual([
      [1, 'L2', 'Rack, over the road', '1 in'],
      [2, 'CR-1', 'Trap outlet', '1½″'],
    ]);
    expect(model.rows[0]?.flash).toBe('12.3');
  });

  it('explains what the hand check leaves out', () => {
    expect(model.handCheck).toBe(
      'Hand check is 0.53 psi lower: it leaves out friction 0.01 and flash steam 0.52. Falls are not credited.',
    );
    const full = ledgerModel(
      [entry('L1', { ...lift, staticPa: 4 * PSI, frictionPa: 0, flashPa: 0 })],
      trap,
      document,
      US,
    );
    expect(full.handCheck).toBe(
      'Hand check is 1.00 psi higher: it counts 1.00 more for rises and falls. Falls are not credited.',
    );
    const dry = ledgerModel([entry('L1', { ...lift, frictionPa: 0, flashPa: 0 })], trap, document, US);
    expect(dry.handCheck).toBe('Hand check agrees to the last digit. Falls are not credited.');
  });

  it('fills its bars from the lowest to the highest balance', () => {
    const [first, last] = model.rows.map(({ bar }) => bar);
    expect(first?.before).toBe(0);
    expect(last?.after).toBe(1);
    expect(last?.parts.map(({ kind }) => kind)).toEqual(['lift', 'friction', 'flash']);
  });

  it('speaks SI too', () => {
    const si = ledgerModel([entry('L2', {}), entry('L1', lift)], trap, document, SI);
    expect(si.titles).toEqual({ length: 'Length m', rise: 'Rise m', flow: 'Flow kg/h', adds: 'kPa', running: 'kPa g' });
    expect(si.closing.static).toBe('34.47');
  });

  it('stands for a trap that drains straight into its receiver', () => {
    const none = ledgerModel([], trap, document, US);
    expect(none).toMatchObject({ rows: [], opening: '0.00', closing: { running: '0.00', static: '–', rise: '–' } });
  });
});
