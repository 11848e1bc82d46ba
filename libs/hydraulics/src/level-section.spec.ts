import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { fullSection, logitOfLevel, sectionAtLogit } from './level-section';

describe('sectionAtLogit', () => {
  // Circular segment, from any handbook of mathematics, with c = 2h − 1 and r = √(1 − c²).
  it.each([0.01, 0.1, 0.3, 0.5, 0.7, 0.9, 0.99])('has the areas and lengths of a circular segment at h = %d', (h) => {
    const c = 2 * h - 1;
    const r = Math.sqrt(1 - c * c);
    const a = Math.acos(c);
    const section = sectionAtLogit(logitOfLevel(h));
    const liquidArea = (Math.PI - a + c * r) / 4;
    const vapourArea = (a - c * r) / 4;
    const close = (actual: number, expected: number): void => {
      expect(relativeError(actual, expected)).toBeLessThan(1e-11);
    };
    close(section.levelFraction, h);
    close(section.liquidArea, liquidArea);
    close(section.vapourArea, vapourArea);
    close(section.liquidPerimeter, Math.PI - a);
    close(section.vapourPerimeter, a);
    close(section.surfaceWidth, r);
    close(section.liquidHydraulicDiameter, (4 * liquidArea) / (Math.PI - a));
    close(section.vapourHydraulicDiameter, (4 * vapourArea) / (a + r));
    close(section.liquidSpeedUp, Math.PI / 4 / liquidArea);
    close(section.vapourSpeedUp, Math.PI / 4 / vapourArea);
  });

  // A thin film has the area 4/3 h √h D² (parabola), whose digits must not cancel; a thin gap at the crown likewise.
  it.each([1e-5, 1e-6])('keeps its digits where %d of the bore is filled, or left', (h) => {
    const parabola = (4 / 3) * h * Math.sqrt(h);
    expect(relativeError(sectionAtLogit(logitOfLevel(h)).liquidArea, parabola)).toBeLessThan(2 * h);
    expect(relativeError(sectionAtLogit(logitOfLevel(1 - h)).vapourArea, parabola)).toBeLessThan(2 * h);
  });

  it('a full pipe has hardly any vapour left', () => {
    expect(fullSection().levelFraction).toBeGreaterThan(1 - 2e-7);
    expect(fullSection().vapourArea).toBeLessThan(1e-9);
  });
});
