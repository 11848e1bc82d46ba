import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { trapCapacityKgS } from './trap-capacity';

// Flow through an orifice goes with the root of the differential (Torricelli); the numbers are by hand.
describe('trapCapacityKgS', () => {
  const points = [
    { differentialPa: 10_000, flowKgS: 0.1 },
    { differentialPa: 40_000, flowKgS: 0.18 },
    { differentialPa: 90_000, flowKgS: 0.3 },
  ];

  it.each([
    { where: 'at a point', differentialPa: 40_000, flowKgS: 0.18 },
    { where: 'halfway in root between 100 and 200: 22,500 Pa', differentialPa: 22_500, flowKgS: 0.14 },
    {
      where: 'below the first point, with the root: a quarter of the differential, half the flow',
      differentialPa: 2500,
      flowKgS: 0.05,
    },
    { where: 'above the last point: never stretched upwards', differentialPa: 1e6, flowKgS: 0.3 },
  ])('$where', ({ differentialPa, flowKgS }) => {
    expect(relativeError(trapCapacityKgS(points, differentialPa), flowKgS)).toBeLessThan(1e-12);
  });

  it.each([0, -5000, NaN])('passes nothing at %s Pa', (differentialPa) => {
    expect(trapCapacityKgS(points, differentialPa)).toBe(0);
  });
});
