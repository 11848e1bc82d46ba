import type { ProfilePoint } from '@riseback/solver';
import { describe, expect, it } from 'vitest';
import { pressureRamp } from './pressure-ramp';
import { PROFILE, profileFigure } from './profile-figure';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const FT = 0.3048;
const WIDTH = 1056;
const RIGHT = WIDTH - PROFILE.rightMargin;
const psig = (value: number) => 101_325 + value * 6_894.757293168;
const point = (feet: number, elevation: number, pressure: number, pipeId: string): ProfilePoint => ({
  distanceM: feet * FT,
  elevationM: elevation * FT,
  pressurePa: psig(pressure),
  pipeId,
});

/** Down 1 ft from the trap, along a header, up 22 ft over two pieces, along a rack to a vessel at 15 psig. */
const POINTS = [
  point(0, 5, 30.6, 'L-105'),
  point(10, 4, 30.5, 'L-105'),
  point(130, 4, 29.9, 'CR-15'),
  point(145, 15, 24.2, 'CR-19'),
  point(160, 26, 18.6, 'CR-19'),
  point(400, 26, 15, 'CR-26'),
];
const figure = (limitPa?: number) =>
  profileFigure({
    points: POINTS,
    nameOfPipe: (id) => id,
    units,
    ramp: pressureRamp([psig(0), psig(35)], units),
    limitPa,
    width: WIDTH,
  });

describe('profileFigure', () => {
  it('runs from the left edge to the right with distance', () => {
    const { start, end, distanceTicks } = figure();
    expect([start.x, end.x]).toEqual([PROFILE.left, RIGHT]);
    expect(distanceTicks.map(({ text }) => text)).toEqual(['0', '100', '200', '300', '400']);
  });

  it('draws pressure upwards on round ticks that hold it', () => {
    const { pressureTicks, start, end } = figure();
    expect(pressureTicks.map(({ text }) => text)).toEqual(['15', '20', '25', '30', '35']);
    expect(start.pressureY).toBeLessThan(end.pressureY);
    expect(Math.abs(end.pressureY - PROFILE.pressureBottom)).toBeLessThan(5e-7);
  });

  it('changes colour along the riser, class by class downwards', () => {
    expect(figure().washes.map(({ pressureClass, paperCore }) => [pressureClass, paperCore])).toEqual([
      [7, true],
      [6, true],
      [5, true],
      [4, false],
    ]);
  });

  it('joins the pieces of a rise to one lift and leaves the fall alone', () => {
    const { lifts } = figure();
    expect(lifts).toHaveLength(1);
    expect(lifts[0]?.text).toBe('22 ft lift');
    const scale = (RIGHT - PROFILE.left) / 400;
    expect(Math.abs((lifts[0]?.x ?? NaN) - (PROFILE.left + 130 * scale))).toBeLessThan(5e-7);
    expect(Math.abs((lifts[0]?.width ?? NaN) - 30 * scale)).toBeLessThan(5e-7);
  });

  it('numbers the pipes as the ledger does, from the vessel back', () => {
    const { pipeNumbers, joints } = figure();
    expect(pipeNumbers.map(({ text }) => text)).toEqual(['4', '3', '2', '1']);
    expect(joints).toHaveLength(3);
  });

  it('tells each place in words', () => {
    const { samples } = figure();
    expect(samples).toHaveLength(POINTS.length);
    expect(samples[0]?.words).toBe('At the trap, into L-105, elevation 5 ft, 30.60 psig');
    expect(samples[4]?.words).toBe('160 ft along the way, in CR-19, elevation 26 ft, 18.60 psig');
  });

  it('shows a limit that is near, and leaves one out that would flatten the line', () => {
    expect(figure(psig(28.2)).limit).not.toBeNull();
    expect(figure(psig(140)).limit).toBeNull();
  });

  it.each([
    ['level and at one pressure', [point(0, 0, 0, 'A'), point(10, 0, 0, 'A')]],
    ['of no length', [point(0, 0, 1, 'A'), point(0, 3, 0, 'A')]],
    ['below the ground', [point(0, -12, 0.01, 'A'), point(3, -10, 0, 'A')]],
  ])('holds a way that is %s', (_, points) => {
    const made = profileFigure({
      points,
      nameOfPipe: (id) => id,
      units,
      ramp: pressureRamp([], units),
      limitPa: undefined,
      width: WIDTH,
    });
    expect(JSON.stringify(made)).not.toMatch(/null,"y|NaN|Infinity/);
    expect(made.washes.length).toBeGreaterThan(0);
  });

  it('marks the bands at the trap, whole where they fit and open where they run out', () => {
    const { spread, credible, pressureTicks } = profileFigure({
      points: POINTS,
      nameOfPipe: (id) => id,
      units,
      ramp: pressureRamp([psig(0), psig(35)], units),
      limitPa: undefined,
      spread: { lowPa: psig(2), highPa: psig(90) },
      credible: { lowPa: psig(21), highPa: psig(46.7) },
      width: WIDTH,
    });
    expect(pressureTicks.map(({ text }) => text)).toEqual(['10', '20', '30', '40', '50']);
    // ten psi to the step: 46.7 lies a third of a step below the top
    const step = (PROFILE.pressureBottom - PROFILE.pressureTop) / 4;
    expect(Math.abs((credible?.top ?? NaN) - (PROFILE.pressureTop + 0.33 * step))).toBeLessThan(5e-7);
    expect(credible?.capped).toEqual({ top: true, bottom: true });
    expect(spread).toEqual({
      top: PROFILE.pressureTop,
      bottom: PROFILE.pressureBottom,
      capped: { top: false, bottom: false },
    });
  });
});
