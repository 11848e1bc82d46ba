import { levelFlowPattern, type LevelFlowPattern } from '@riseback/hydraulics';
import { describe, expect, it } from 'vitest';
import { readFigures } from '../fixtures/hydraulics/read-figures';
import { flowOfRow } from '../fixtures/hydraulics/saturated-row';

const WORDS: Readonly<Record<LevelFlowPattern, string>> = {
  stratifiedSmooth: 'stratified smooth',
  stratifiedWavy: 'stratified wavy',
  intermittent: 'intermittent',
  annular: 'annular',
  dispersedBubble: 'bubbly',
};

// Taitel and Dukler's map read off digitised curves, in smooth pipe; see the fixture. Its curves hold for power-law friction in turbulent
// flow and carry a few per cent of reading error, while this program solves the balance with its own friction factor: rows whose
// pattern changes within 15 % are left out, and one row in ten may stand near one of the curves for the other.
describe('level flow patterns', () => {
  const rows = readFigures('flow-patterns.csv').map((row) => ({
    agrees: WORDS[levelFlowPattern(flowOfRow(row, 0))] === row('pattern'),
    nearBoundary: row('nearBoundary') === '1',
    id: row('id'),
  }));

  it('agree clear of the boundaries', () => {
    const clear = rows.filter(({ nearBoundary }) => !nearBoundary);
    expect(clear.length).toBeGreaterThan(60);
    expect(clear.filter(({ agrees }) => !agrees).map(({ id }) => id)).toEqual([]);
  });

  it('agree in nine rows of ten, those near a boundary included', () => {
    expect(rows.filter(({ agrees }) => agrees).length / rows.length).toBeGreaterThan(0.9);
  });
});
