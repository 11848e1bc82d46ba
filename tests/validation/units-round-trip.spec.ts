// A value stored in SI survives being shown for editing and read back, in both systems and at any atmosphere: docs/units.md
// promises 1e-9, of the stored value.
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { relativeError } from '@riseback/numerics';
import {
  displayUnit,
  formatForEditing,
  formatQuantity,
  fromDisplay,
  parseQuantity,
  toDisplay,
  type DisplayUnits,
  type QuantityKind,
} from '@riseback/units';

/** Below this no stored quantity means anything, and doubles near the end of their range lose their digits. */
const LEAST = 1e-12;

/** Stored SI range of each kind, wider than any plant. */
const RANGES: Readonly<Record<Exclude<QuantityKind, 'count'>, readonly [number, number]>> = {
  // rounded for print, a pressure within 0.05 psi of vacuum would read as below it
  pressure: [1e3, 3e7],
  absolutePressure: [1e3, 3e7],
  gaugePressure: [-6e4, 3e7],
  pressureDifference: [-1e7, 1e7],
  length: [-1e4, 1e5],
  diameter: [1e-4, 5],
  roughness: [1e-8, 1e-2],
  massFlow: [0, 1e3],
  temperature: [1, 2000],
  temperatureDifference: [-500, 500],
  velocity: [-500, 500],
  pressureGradient: [-1e6, 1e6],
  pressurePerRise: [0, 1e5],
  momentumFlux: [0, 1e7],
  fraction: [0, 1],
  quality: [0, 1],
  factor: [0, 1e4],
  heatLossPerLength: [0, 1e4],
  specificEnthalpy: [-1e3, 5e6],
  density: [1e-3, 2e3],
};

const anyUnits: fc.Arbitrary<DisplayUnits> = fc.record({
  system: fc.constantFrom('us', 'si'),
  atmosphericPressurePa: fc.double({ min: 6e4, max: 1.1e5, noNaN: true }),
});

describe.each(Object.entries(RANGES) as [QuantityKind, readonly [number, number]][])('%s', (kind, [min, max]) => {
  const stored = fc.double({ min, max, noNaN: true }).filter((si) => si === 0 || Math.abs(si) > LEAST);

  it('reads back what it shows for editing, with and without its unit', () => {
    fc.assert(
      fc.property(stored, anyUnits, (si, units) => {
        const text = formatForEditing(si, kind, units);
        expect(text).toMatch(/^-?\d+(?:\.\d+)?$/);
        for (const typed of [text, `${text} ${displayUnit(kind, units.system)}`]) {
          const parsed = parseQuantity(typed, kind, units);
          expect(parsed.ok && relativeError(parsed.si, si)).toBeLessThan(1e-9);
        }
      }),
    );
  });

  it('converts there and back', () => {
    fc.assert(
      fc.property(stored, anyUnits, (si, units) => {
        const back = fromDisplay(toDisplay(si, kind, units), kind, units);
        expect(relativeError(back, si)).toBeLessThan(1e-9);
      }),
    );
  });

  it('prints digits, commas and one sign, never a negative zero, and reads its own print', () => {
    fc.assert(
      fc.property(stored, anyUnits, (si, units) => {
        const printed = formatQuantity(si, kind, units, { withUnit: true });
        expect(printed).toMatch(/^\u2212?\d{1,3}(?:,\d{3})*(?:\.\d+)?(?: \S.*)?$/);
        expect(printed).not.toMatch(/^\u2212[0.]+(?:\s|$)/);
        expect(parseQuantity(printed, kind, units).ok).toBe(true);
      }),
    );
  });
});

describe('a count', () => {
  it('stays what it is', () => {
    fc.assert(
      fc.property(fc.nat(), anyUnits, (count, units) => {
        expect(parseQuantity(formatForEditing(count, 'count', units), 'count', units)).toMatchObject({ si: count });
      }),
    );
  });
});

describe('any text at all', () => {
  it('is read or refused in words, and a suggestion is always text that would be read', () => {
    const kinds = Object.keys(RANGES) as QuantityKind[];
    const scraps = fc.constantFrom(
      '1',
      '12',
      '.5',
      ',',
      '1,040',
      '-',
      '/',
      ' ',
      "'",
      '"',
      'ft',
      'in',
      'psig',
      'psia',
      'kPa',
      'e9',
      '%',
    );
    const anyText = fc.oneof(
      fc.string(),
      fc.array(scraps, { maxLength: 8 }).map((parts) => parts.join('')),
    );
    fc.assert(
      fc.property(anyText, fc.constantFrom(...kinds), anyUnits, (text, kind, units) => {
        const parsed = parseQuantity(text, kind, units);
        if (parsed.ok) {
          expect(Number.isFinite(parsed.si)).toBe(true);
        } else {
          expect(parsed.reason).toMatch(/\.$/);
          if (parsed.suggestion !== undefined) expect(parseQuantity(parsed.suggestion, kind, units).ok).toBe(true);
        }
      }),
      { numRuns: 2000 },
    );
  });
});
