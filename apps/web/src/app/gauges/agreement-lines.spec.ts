import type { AgreementRow } from '@riseback/diagnosis';
import { Gauge } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { agreementFigure, CHART } from './agreement-figure';
import { agreementCounts, agreementLines, eText } from './agreement-lines';

const SI = { system: 'si', atmosphericPressurePa: 100_000 } as const;
const gauge = Gauge.parse({ id: 'G1', tag: 'PI-1', node: 'J1', elevationM: 0 });

function judged(
  tag: string,
  [measuredPa, measurementPa]: readonly [number, number],
  [predictedPa, predictionPa]: readonly [number, number],
  word: 'agrees' | 'doubtful' | 'disagrees',
): AgreementRow {
  const expanded = (expandedPa: number) => ({ parts: [], standardPa: expandedPa / 2, coverageFactor: 2, expandedPa });
  return {
    status: 'judged',
    gaugeId: tag,
    gauge: { ...gauge, tag },
    reading: { id: tag, gaugeId: tag, gauge, valuePa: measuredPa - 100_000 },
    prediction: {
      tap: { at: 'node', node: 'J1', elevationM: 0 },
      pressurePa: predictedPa,
      by: 'solved',
      below: [],
    },
    measuredPa,
    predictedPa,
    measurement: expanded(measurementPa),
    predicted: expanded(predictionPa),
    normalisedError: (measuredPa - predictedPa) / Math.hypot(measurementPa, predictionPa),
    word,
  };
}

// 3, 4, 5: both uncertainties together are 5 kPa
const agrees = judged('PI-1', [150_000, 3_000], [148_000, 4_000], 'agrees');
const disagrees = judged('PI-2', [180_000, 3_000], [160_000, 4_000], 'disagrees');

describe('agreementLines', () => {
  it('prints gauge pressures, both uncertainties, the difference and E', () => {
    expect(agreementLines([disagrees], new Map(), SI)[0]).toMatchObject({
      name: 'PI-2',
      word: 'Disagrees',
      status: 'fail',
      read: '80.0',
      readWithin: '± 3.0',
      expected: '60.0',
      expectedWithin: '± 4.0',
      difference: '+20.0',
      e: '+4.0',
    });
  });

  it('says why a gauge has no verdict', () => {
    const reading = { id: 'r', gaugeId: 'G1', gauge };
    const notRead: AgreementRow = { status: 'notRead', gaugeId: 'G1', gauge, reading };
    expect(agreementLines([notRead], new Map([['G1', 'broken']]), SI)[0]).toMatchObject({
      word: 'Not judged',
      why: 'Not read: broken',
      read: '',
      e: '',
    });
  });
});

describe('agreementCounts', () => {
  it('names the gravest first', () => {
    expect(agreementCounts([agrees, disagrees, agrees]).map(({ words }) => words)).toEqual(['1 disagrees', '2 agree']);
  });
});

describe('eText', () => {
  it('has its sign, but none at nothing', () => {
    expect([1.24, -0.36, 0.04, -0.04].map(eText)).toEqual(['+1.2', '−0.4', '0.0', '0.0']);
  });
});

describe('agreementFigure', () => {
  it('puts a reading above the diagonal where more was read than expected, and names who disagrees', () => {
    const figure = agreementFigure([agrees, disagrees], SI);
    const point = figure?.points.find(({ name }) => name === 'PI-2');
    // the axes are alike: the diagonal's height at the point's place
    const share = ((point?.x ?? NaN) - CHART.left) / (CHART.right - CHART.left);
    expect(point?.y).toBeLessThan(CHART.bottom - share * (CHART.bottom - CHART.top));
    expect(figure?.sentence).toBe('Pressure read against pressure expected, 2 gauges: PI-2 disagrees; 1 of 2 agree.');
  });

  it('is not drawn where no gauge is judged', () => {
    expect(agreementFigure([], SI)).toBeNull();
  });
});
