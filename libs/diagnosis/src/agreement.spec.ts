import { readNetworkFile, type Gauge, type NetworkFile } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { isRefusal, solveNetwork, type SolveResult } from '@riseback/solver';
import { describe, expect, it } from 'vitest';
import { agreementOf, type TakenReading } from './agreement';
import { predictedAtGauge } from './predicted-at-gauge';
import { credibleHalfWidthPa, predictionUncertainty } from './prediction-uncertainty';
import { readingExpected } from './reading-at-tap';

const FILE = read({
  format: 'riseback-network',
  version: 1,
  name: 'Two traps on a header that rises',
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 6e5, loadKgS: 0.1 },
    { id: 'T2', kind: 'trap', elevationM: 0, inletPressurePa: 6e5, loadKgS: 0.2 },
    { id: 'J1', kind: 'junction', elevationM: 1 },
    { id: 'J2', kind: 'junction', elevationM: 4 },
    { id: 'R1', kind: 'receiver', elevationM: 4, vented: true },
  ],
  pipes: [
    { id: 'L1', from: 'T1', to: 'J1', lengthM: 10, insideDiameterM: 0.03 },
    { id: 'L2', from: 'T2', to: 'J1', lengthM: 10, insideDiameterM: 0.03 },
    {
      id: 'L3',
      from: 'J1',
      to: 'J2',
      lengthM: 40,
      insideDiameterM: 0.04,
      route: [
        { lengthM: 30, riseM: 0 },
        { lengthM: 3, riseM: 3 },
        { lengthM: 7, riseM: 0 },
      ],
    },
    { id: 'L4', from: 'J2', to: 'R1', lengthM: 0.01, insideDiameterM: 0.04 },
  ],
});
const RESULT = solve(FILE);
const GAUGE: Gauge = {
  id: 'G1',
  node: 'J1',
  elevationM: 2,
  waterLeg: true,
  rangeLowPa: 0,
  rangeHighPa: 4e5,
  accuracy: 0.01,
  resolutionPa: 2_000,
  retired: false,
};

describe('predictedAtGauge', () => {
  const onHeader = (distanceM: number) => predictedAtGauge(FILE, RESULT, { pipe: 'L3', distanceM });

  it('meets the result at both ends of a pipe, and at a node', () => {
    const nodePa = (id: string): number => RESULT.nodes.find((node) => node.id === id)?.pressurePa ?? NaN;
    expect(onHeader(0)?.pressurePa).toBe(nodePa('J1'));
    expect(onHeader(40)?.pressurePa).toBe(nodePa('J2'));
    expect(predictedAtGauge(FILE, RESULT, GAUGE)?.pressurePa).toBe(nodePa('J1'));
    expect(relativeError(onHeader(0.001)?.pressurePa ?? NaN, nodePa('J1'))).toBeLessThan(1e-4);
  });

  it('loses the lift in the riser: half a psi for each foot between its foot and its top', () => {
    const [foot, top] = [onHeader(30), onHeader(33)];
    expect(foot?.tap.elevationM).toBe(1);
    expect(top?.tap.elevationM).toBe(4);
    const lostPa = (foot?.pressurePa ?? NaN) - (top?.pressurePa ?? NaN);
    const liftPa = 3 * FILE.method.liftRulePaM;
    expect(lostPa).toBeGreaterThan(liftPa);
    // what friction takes beside it is of three metres, which is less than of the thirty before
    expect(lostPa - liftPa).toBeLessThan((onHeader(0)?.pressurePa ?? NaN) - (foot?.pressurePa ?? NaN));
  });

  it('is the same whatever way the pipe is drawn', () => {
    const turned = read({
      ...JSON.parse(JSON.stringify(FILE)),
      pipes: FILE.pipes.map((pipe) =>
        pipe.id === 'L3'
          ? {
              ...pipe,
              from: pipe.to,
              to: pipe.from,
              route: (pipe.route ?? []).toReversed().map(({ lengthM, riseM }) => ({ lengthM, riseM: -riseM })),
            }
          : pipe,
      ),
    });
    const there = predictedAtGauge(turned, solve(turned), { pipe: 'L3', distanceM: 25 });
    expect(relativeError(there?.pressurePa ?? NaN, onHeader(15)?.pressurePa ?? NaN)).toBeLessThan(1e-6);
    expect(there?.tap.elevationM).toBe(onHeader(15)?.tap.elevationM);
  });

  it('has the traps’ own band at a trap, and none to speak of at the receiver', () => {
    const trap = RESULT.traps.find(({ id }) => id === 'T1');
    const there = predictedAtGauge(FILE, RESULT, { node: 'T1' });
    expect(relativeError(there?.credible?.lowPa ?? NaN, trap?.credible?.lowPa ?? NaN)).toBeLessThan(1e-9);
    expect(relativeError(there?.credible?.highPa ?? NaN, trap?.credible?.highPa ?? NaN)).toBeLessThan(1e-9);
    const near = onHeader(39.999);
    const far = onHeader(0);
    expect(near && credibleHalfWidthPa(near, 'above')).toBeLessThan(
      0.01 * ((far && credibleHalfWidthPa(far, 'above')) ?? NaN),
    );
  });

  it('says nothing of what the result does not have', () => {
    expect(predictedAtGauge(FILE, RESULT, { node: 'J9' })).toBeUndefined();
    expect(predictedAtGauge(FILE, { ...RESULT, pipes: [] }, { pipe: 'L3', distanceM: 3 })).toBeUndefined();
  });

  it('lies between the ends where no trap’s way leads through', () => {
    const there = predictedAtGauge(FILE, { ...RESULT, traps: [] }, { pipe: 'L3', distanceM: 30 });
    const header = RESULT.pipes.find(({ id }) => id === 'L3');
    // below the tap: the whole riser, and 10 m of the 40 for friction and flash
    const expected =
      (header?.downstreamPressurePa ?? NaN) +
      (header?.staticPa ?? NaN) +
      ((header?.frictionPa ?? NaN) + (header?.flashPa ?? NaN)) / 4;
    expect(there?.by).toBe('between');
    expect(relativeError(there?.pressurePa ?? NaN, expected)).toBeLessThan(1e-9);
  });
});

describe('predictionUncertainty', () => {
  it('moves with loads as much as solves with every load at its tolerance, within what quadrature leaves', () => {
    const prediction = predictedAtGauge(FILE, RESULT, { node: 'J1' });
    if (prediction === undefined) throw new Error('no prediction');
    const { parts } = predictionUncertainty(FILE, RESULT, { ...prediction, credible: undefined }, 'above');
    const [loads] = parts;
    const movedBy = (id: string): number => {
      const file = {
        ...FILE,
        nodes: FILE.nodes.map((node) =>
          node.id === id && node.kind === 'trap' ? { ...node, loadKgS: node.loadKgS * 1.1 } : node,
        ),
      };
      return (predictedAtGauge(file, solve(file), { node: 'J1' })?.pressurePa ?? NaN) - prediction.pressurePa;
    };
    const separately = Math.hypot(movedBy('T1'), movedBy('T2')) / Math.sqrt(3);
    const ratio = (loads?.shape === 'normal' ? loads.standardPa : NaN) / separately;
    // a square law against the flow's own, somewhat less steep
    expect(ratio).toBeGreaterThan(0.95);
    expect(ratio).toBeLessThan(1.3);
  });

  it('takes half the credible width over √3 on the side measured', () => {
    const prediction = predictedAtGauge(FILE, RESULT, { node: 'J1' });
    if (prediction === undefined) throw new Error('no prediction');
    const at = { ...prediction, pressurePa: 150_000, credible: { lowPa: 149_000, highPa: 154_000 }, below: [] };
    expect(predictionUncertainty(FILE, RESULT, at, 'above').standardPa).toBe(4_000 / Math.sqrt(3));
    expect(predictionUncertainty(FILE, RESULT, at, 'below').standardPa).toBe(1_000 / Math.sqrt(3));
  });
});

describe('agreementOf', () => {
  const predicted = predictedAtGauge(FILE, RESULT, GAUGE);
  const expectedPa = readingExpected(predicted?.pressurePa ?? NaN, GAUGE, 1, FILE.site);
  const results = { file: FILE, result: RESULT };

  it('agrees with a reading of what is predicted, and disagrees with one far off', () => {
    const row = agreementOf({ readings: [taken('r1', expectedPa)] }, results).get('G1');
    expect(row).toMatchObject({ status: 'judged', word: 'agrees' });
    expect(Math.abs(row?.status === 'judged' ? row.normalisedError : NaN)).toBeLessThan(1e-9);
    const off = agreementOf({ readings: [taken('r1', expectedPa + 2e5)] }, results).get('G1');
    expect(off).toMatchObject({ status: 'judged', word: 'disagrees' });
  });

  it('combines accuracy, resolution and height of the leg by hand', () => {
    const row = agreementOf({ readings: [taken('r1', expectedPa)] }, results).get('G1');
    // 1 % of 4 bar is 4,000 Pa; half of 2,000 Pa; 5 cm of water, 489 Pa
    const u = Math.sqrt((4_000 ** 2 + 1_000 ** 2 + (0.05 * 998.2 * 9.80665) ** 2) / 3);
    expect(relativeError(row?.status === 'judged' ? row.measurement.standardPa : NaN, u)).toBeLessThan(1e-4);
  });

  it('takes the last reading that none replaces', () => {
    const readings = [taken('r1', 1e5), taken('r2', 2e5), { ...taken('r3', 3e5), replaces: 'r2' }];
    expect(agreementOf({ readings }, results).get('G1')?.reading.id).toBe('r3');
  });

  it('says which rows it cannot judge, and why', () => {
    const { accuracy: _, ...plain } = GAUGE;
    const readings = [
      taken('a', undefined, { ...GAUGE, id: 'G1' }),
      taken('b', 1e5, { ...plain, id: 'G2' }),
      taken('c', 1e5, { ...GAUGE, id: 'G3', node: 'J9' }),
    ];
    const rows = agreementOf({ readings }, results);
    expect([...rows.values()].map(({ status }) => status)).toEqual(['notRead', 'accuracyUnknown', 'notPredicted']);
  });

  it('judges the change since a baseline more closely than the reading: what is always wrong cancels', () => {
    const bias = 2_500;
    const baseline = { round: { readings: [taken('b', expectedPa + bias)] }, results };
    const now = agreementOf({ readings: [taken('r', expectedPa + bias + 3_000)] }, results, baseline).get('G1');
    if (now?.status !== 'judged' || now.sinceBaseline === undefined) throw new Error('not judged');
    expect(relativeError(now.sinceBaseline.measuredPa, 3_000)).toBeLessThan(1e-9);
    expect(now.sinceBaseline.predictedPa).toBe(0);
    expect(now.sinceBaseline.measurement.expandedPa).toBeLessThan(now.measurement.expandedPa);
    expect(now.sinceBaseline.predicted.expandedPa).toBeLessThan(now.predicted.expandedPa);
  });

  it('trusts a change on another instrument no more than two readings', () => {
    const former = { ...GAUGE, calibratedOn: '2026-01-10' };
    const baseline = { round: { readings: [taken('b', expectedPa, former)] }, results };
    const now = agreementOf({ readings: [taken('r', expectedPa)] }, results, baseline).get('G1');
    if (now?.status !== 'judged' || now.sinceBaseline === undefined) throw new Error('not judged');
    // both accuracies and both resolutions, the leg cancels: √(2 × (4,000² + 1,000²)/3)
    const u = Math.sqrt((2 * (4_000 ** 2 + 1_000 ** 2)) / 3);
    expect(relativeError(now.sinceBaseline.measurement.standardPa, u)).toBeLessThan(1e-9);
  });
});

function taken(id: string, valuePa: number | undefined, gauge: Gauge = GAUGE): TakenReading {
  return { id, gaugeId: gauge.id, gauge, ...(valuePa === undefined ? {} : { valuePa }) };
}

function read(json: unknown): NetworkFile {
  const outcome = readNetworkFile(json);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.errors));
  return outcome.file;
}

function solve(file: NetworkFile): SolveResult {
  const outcome = solveNetwork(file, { partial: false, bands: true });
  if (isRefusal(outcome) || outcome.problem !== undefined) throw new Error('no solution');
  return outcome;
}
