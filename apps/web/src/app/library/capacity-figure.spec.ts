import type { CapacityPoint } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { CAPACITY, capacityFigure } from './capacity-figure';

const SI = { system: 'si', atmosphericPressurePa: 101_325 } as const;
const KG_H = 1 / 3600;
/** An orifice: flow as the root of the differential, which is a straight line of slope ½ on these scales. */
const orifice: CapacityPoint[] = [10e3, 40e3, 160e3].map((differentialPa) => ({
  differentialPa,
  flowKgS: 100 * KG_H * Math.sqrt(differentialPa / 10e3),
}));

function numbersOf(path: string): [number, number][] {
  return [...path.matchAll(/(-?[\d.]+),(-?[\d.]+)/g)].map(([, x, y]) => [Number(x), Number(y)]);
}

function figureOf(points: CapacityPoint[], need?: { differentialPa: number; needKgS: number }) {
  const figure = capacityFigure(points, SI, need);
  if (figure === null) throw new Error('no figure');
  return figure;
}

describe('capacityFigure', () => {
  it('has nothing to draw without points', () => {
    expect(capacityFigure([], SI)).toBeNull();
  });

  it('draws the law of an orifice as a straight line through its points', () => {
    const { curve, points } = figureOf(orifice);
    const drawn = numbersOf(curve);
    const [start, end] = [drawn[0], drawn.at(-1)];
    if (start === undefined || end === undefined) throw new Error('no curve');
    expect(drawn).toHaveLength(25);
    const slope = (end[1] - start[1]) / (end[0] - start[0]);
    // a path is printed to three decimals
    for (const [x, y] of drawn) expect(Math.abs(y - start[1] - slope * (x - start[0]))).toBeLessThan(0.01);
    for (const { x, y } of points) expect(Math.abs(y - start[1] - slope * (x - start[0]))).toBeLessThan(0.01);
  });

  it('goes on below the first point by the root and stays above the last, as the solver has it', () => {
    // differentials 10 to 160 kPa end the scale at 10 and 200: only above is there something left
    const { beyond } = figureOf(orifice);
    expect(beyond).toHaveLength(1);
    const above = numbersOf(beyond[0] ?? '');
    expect(new Set(above.map(([, y]) => y)).size).toBe(1);
    expect(above.at(-1)?.[0]).toBe(CAPACITY.right);
    expect(figureOf(orifice.slice(1)).beyond).toHaveLength(2);
  });

  it('marks what a trap needs, and says so', () => {
    // 10 kPa passes 100 kg/h and 90 kPa three times that, by the root of nine
    const enough = figureOf(orifice, { differentialPa: 90e3, needKgS: 299 * KG_H });
    const short = figureOf(orifice, { differentialPa: 90e3, needKgS: 301 * KG_H });
    expect([enough.need?.short, short.need?.short]).toEqual([false, true]);
    expect(short.sentence).toBe(
      'Capacity from 100 kg/h at 10.0 kPa to 400 kg/h at 160.0 kPa, 3 points. At this trap’s 90.0 kPa it passes 300 kg/h; 301 kg/h is needed.',
    );
  });

  it('labels what fits', () => {
    const { differentialTicks } = figureOf(orifice);
    expect(differentialTicks.map(({ text }) => text)).toEqual(['10', '20', '50', '100', '200']);
    const wide = figureOf([
      { differentialPa: 100, flowKgS: 1 },
      { differentialPa: 1e6, flowKgS: 2 },
    ]);
    expect(wide.differentialTicks.map(({ text }) => text).filter((text) => text !== '')).toEqual([
      '0.1',
      '1',
      '10',
      '100',
      '1,000',
    ]);
  });

  it('draws one point too', () => {
    const { curve, points, beyond, rows } = figureOf(orifice.slice(0, 1));
    expect([points.length, rows.length, beyond.length]).toEqual([1, 1, 1]);
    expect(numbersOf(curve)).toHaveLength(1);
  });
});
