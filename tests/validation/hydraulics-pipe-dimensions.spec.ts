import { NOMINAL_SIZES, pipeBore, pipeSizes, type PipeBore } from '@riseback/hydraulics';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';

/** The standards' own rounding of walls between inches and millimetres. */
const TOLERANCE_M = 0.03e-3;

describe('pipe dimensions against the standards', () => {
  // ASME B36.10M, schedules 40, 80 and STD, 3/8 to 24 in; each wall also against its inch column.
  it.each(readFigures('steel-pipe.csv').map((row) => [row('schedule'), Number(row('dn')), row] as const))(
    'ASME B36.10M schedule %s, DN %d',
    (schedule, dn, row) => {
      const bore = boreByDn(schedule, dn);
      expect(Math.abs(bore.outsideDiameterM - Number(row('outsideMm')) / 1000)).toBeLessThan(1e-6);
      expect(Math.abs(bore.wallM - Number(row('wallMm')) / 1000)).toBeLessThan(1e-6);
      expect(Math.abs(bore.wallM - Number(row('wallIn')) * 0.0254)).toBeLessThan(TOLERANCE_M);
      expect(Math.abs(bore.insideDiameterM - Number(row('insideMm')) / 1000)).toBeLessThan(TOLERANCE_M);
    },
  );

  // EN 10255:2004, medium series.
  it.each(readFigures('en-pipe.csv').map((row) => [Number(row('dn')), row] as const))(
    'EN 10255 medium, DN %d',
    (dn, row) => {
      const bore = boreByDn('EN 10255 medium', dn);
      expect(bore.standard).toBe('EN 10255');
      expect(Math.abs(bore.outsideDiameterM - Number(row('outsideMm')) / 1000)).toBeLessThan(TOLERANCE_M);
      expect(Math.abs(bore.insideDiameterM - Number(row('insideMm')) / 1000)).toBeLessThan(TOLERANCE_M);
    },
  );

  // Masses per metre of a published EN 10255:2004 / BS 1387 dimension table: plain ends for DN 100 to 150, and for the small
  // sizes a trade table whose masses run about 1 % above a nominal tube's. Steel of 7850 kg/m3, as EN 10255 reckons.
  it.each([
    { dn: 15, medium: 1.21, heavy: 1.44 },
    { dn: 20, medium: 1.56, heavy: 1.87 },
    { dn: 25, medium: 2.41, heavy: 2.94 },
    { dn: 32, medium: 3.1, heavy: 3.8 },
    { dn: 40, medium: 3.57, heavy: 4.38 },
    { dn: 50, medium: 5.03, heavy: 6.19 },
    { dn: 100, medium: 12.2, heavy: 14.5 },
    { dn: 125, medium: 16.6, heavy: 17.9 },
    { dn: 150, medium: 19.8, heavy: 21.3 },
  ])('EN 10255 DN $dn weighs what is printed', ({ dn, medium, heavy }) => {
    expect(relativeError(massPerMetreKgM(boreByDn('EN 10255 medium', dn)), medium)).toBeLessThan(0.015);
    expect(relativeError(massPerMetreKgM(boreByDn('EN 10255 heavy', dn)), heavy)).toBeLessThan(0.015);
  });

  // ASME B36.10M, wall thickness designations: Standard and 40 are identical up to 10 in, and 3/8 in (9.53 mm) above;
  // Extra-Strong and 80 are identical up to 8 in, and 1/2 in (12.70 mm) above.
  it('keeps the identities that the standard states', () => {
    for (const { standard, schedule, sizes } of pipeSizes()) {
      if (standard !== 'ASME B36.10M') continue;
      for (const { dn, wallM } of sizes) {
        if (schedule === 'STD') expect(wallM).toBe(dn <= 250 ? boreByDn('40', dn).wallM : 0.00953);
        if (schedule === 'XS') expect(wallM).toBe(dn <= 200 ? boreByDn('80', dn).wallM : 0.0127);
      }
    }
  });

  // Schedule numbers mean rising wall at one outside diameter (ASME B36.10M); equal walls occur only where the standard
  // lets two schedules share one, which it never does among these numbers.
  it('walls grow with the schedule number', () => {
    for (const dn of Object.values(NOMINAL_SIZES)) {
      const walls = ['5', '10', '20', '30', '40', '60', '80', '100', '120', '140', '160'].flatMap(
        (schedule) => findByDn(schedule, dn)?.wallM ?? [],
      );
      expect(
        walls.every((wall, i) => i === 0 || wall > (walls[i - 1] ?? Infinity)),
        `DN ${dn}: ${walls.join(', ')}`,
      ).toBe(true);
    }
  });
});

function findByDn(schedule: string, dn: number): PipeBore | undefined {
  const nps = Object.entries(NOMINAL_SIZES).find(([, size]) => size === dn)?.[0];
  return nps === undefined ? undefined : pipeBore({ nps, schedule });
}

function boreByDn(schedule: string, dn: number): PipeBore {
  const bore = findByDn(schedule, dn);
  if (bore === undefined) throw new Error(`No pipe of DN ${dn}, schedule ${schedule}`);
  return bore;
}

function massPerMetreKgM({ outsideDiameterM, wallM }: PipeBore): number {
  return Math.PI * (outsideDiameterM - wallM) * wallM * 7850;
}
