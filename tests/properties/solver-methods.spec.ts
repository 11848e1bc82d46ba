import { FRICTION_METHODS, VOID_FRACTIONS, type NetworkFile } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { networkFile, solved, ternQuay, trapOf } from '../fixtures/solver/small-networks';

const STATIC = ['rule', 'twoPhase'] as const;
const METHODS = FRICTION_METHODS.flatMap((friction) => STATIC.map((staticLift) => ({ friction, staticLift })));

function withMethod(file: NetworkFile, method: object): NetworkFile {
  return { ...file, method: { ...file.method, ...method } };
}

describe.each(METHODS)('$friction with $staticLift', (method) => {
  const file = withMethod(ternQuay(), method);
  const result = solved(file, { caseId: 'design' });

  it('moves no trap of the demo plant by 5 Pa when its tolerance is tightened tenfold', () => {
    const tight = solved(file, { caseId: 'design', marchTolerancePa: 0.01 });
    const offPa = result.traps.map((trap, i) =>
      Math.abs(trap.backPressurePa - (tight.traps[i]?.backPressurePa ?? NaN)),
    );
    expect(Math.max(...offPa)).toBeLessThan(5);
  });

  it('has contributions that add up at every trap and pipe, and friction that is never negative', () => {
    for (const { backPressurePa, receiverPressurePa, staticPa, frictionPa, flashPa } of result.traps) {
      expect(Math.abs(receiverPressurePa + staticPa + frictionPa + flashPa - backPressurePa)).toBeLessThan(1e-5);
      expect(frictionPa).toBeGreaterThanOrEqual(0);
    }
    for (const pipe of result.pipes) {
      const sumPa = pipe.staticPa + pipe.frictionPa + pipe.flashPa;
      expect(Math.abs(pipe.downstreamPressurePa + sumPa - pipe.upstreamPressurePa)).toBeLessThan(1e-5);
      expect(pipe.frictionPa).toBeGreaterThanOrEqual(0);
    }
  });
});

/** A level or falling line and what its trap adds to the receiver, by load. */
function lineRisePa(method: object, loadKgS: number, riseM: number): number {
  const file = networkFile({
    method,
    nodes: [
      { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS },
      { id: 'R1', kind: 'receiver', elevationM: riseM, pressurePa: 1.2e5 },
    ],
    pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 20, size: { nps: '2', schedule: '40' } }],
  });
  const trap = trapOf(solved(file), 'T1');
  return trap.backPressurePa - trap.receiverPressurePa;
}

describe('what a line costs, swept over its load', () => {
  const POINTS = 6909; // three decades by a thousandth: ln 1000/ln 1.001
  it.each(FRICTION_METHODS)('%s shows no jump above 1 %% between loads a thousandth apart', (friction) => {
    for (const riseM of [0, -0.2]) {
      let before = NaN;
      let greatest = 0;
      for (let i = 0; i <= POINTS; i++) {
        const risePa = lineRisePa({ friction }, 0.003 * 1.001 ** i, riseM);
        if (before > 1) greatest = Math.max(greatest, Math.abs(risePa / before - 1));
        before = risePa;
      }
      expect(greatest, `rise ${String(riseM)} m`).toBeLessThan(0.01);
    }
  });
});

describe('a two-phase riser', () => {
  const riserPa = (voidFraction: string): number => {
    const file = networkFile({
      method: { friction: 'homogeneous', staticLift: 'twoPhase', voidFraction },
      nodes: [
        { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 5e5, loadKgS: 0.1 },
        { id: 'R1', kind: 'receiver', elevationM: 5, pressurePa: 1.2e5 },
      ],
      pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 5, size: { nps: '2', schedule: '40' } }],
    });
    return trapOf(solved(file), 'T1').staticPa;
  };

  it('weighs the more, the more its liquid lags behind', () => {
    const [homogeneous = NaN, zivi = NaN, chisholm = NaN, driftFlux = NaN] = VOID_FRACTIONS.map(riserPa);
    // published comparisons: without slip a column weighs a small part of what drift flux gives (0.0004 against 0.015 bar/m)
    expect(homogeneous).toBeLessThan(Math.min(zivi, chisholm) / 5);
    expect(Math.max(zivi, chisholm)).toBeLessThan(driftFlux);
  });
});
