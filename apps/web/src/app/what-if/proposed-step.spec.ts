import { describe, expect, it } from 'vitest';
import { applyBatch, findings, type NetworkDocument, setOp } from '@riseback/network';
import { trialDocument } from '../lists/testing/trial-document';
import { sizeAway } from './next-size';
import { proposedStep, type Wish } from './proposed-step';
import { EMPTY_TRIAL, layOver, withStep } from './trial';
import { candidatesOf } from './trial-subjects';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const PSI = 6_894.757293168;
const base = trialDocument();

function tried(wish: Wish, document: NetworkDocument = base): NetworkDocument {
  const proposed = proposedStep(document, wish, units);
  if (!proposed.ok) throw new Error(proposed.reason);
  return layOver(document, withStep(document, EMPTY_TRIAL, { ...proposed.step, id: 'a' })).document;
}

describe('what a wish makes of a network', () => {
  it('goes up and down in the sizes of the pipe’s own schedule', () => {
    // ASME B36.10M: 1, 1-1/4, 1-1/2, 2 in order
    expect(tried({ subject: 'size', way: 'up', ids: ['L1'] }).pipes.get('L1')?.value.size).toEqual({
      nps: '1-1/4',
      schedule: '80',
    });
    expect(tried({ subject: 'size', way: 'down', ids: ['L1'] }).pipes.get('L1')?.value.size?.nps).toBe('3/4');
    // a bore of 50 mm stands between 2 in (49.25 mm) and 2-1/2 in (59.00 mm) of schedule 80
    const bore = base.pipes.get('L2')?.value;
    expect(bore === undefined ? '' : sizeAway(bore, 1)?.nps).toBe('2-1/2');
    expect(bore === undefined ? '' : sizeAway(bore, -1)?.nps).toBe('2');
  });

  it('says which pipe has no next size, and takes all or nothing', () => {
    const smallest = tried({ subject: 'size', way: 'set', ids: ['L1'], nps: '1/8' });
    expect(proposedStep(smallest, { subject: 'size', way: 'down', ids: ['L2', 'L1'] }, units)).toEqual({
      ok: false,
      reason: 'CR-1 has the smallest size that schedule 80 is made in.',
    });
    expect(proposedStep(base, { subject: 'size', way: 'up', ids: [] }, units)).toMatchObject({ ok: false });
  });

  it('holds a vented receiver at a pressure, counted from the atmosphere', () => {
    const raised = tried({ subject: 'pressure', way: 'add', ids: ['R1', 'V1'], amount: 5 * PSI });
    expect(raised.nodes.get('R1')?.value).toMatchObject({ pressurePa: 101_325 + 5 * PSI });
    expect(raised.nodes.get('R1')?.value).not.toHaveProperty('vented');
    expect(raised.nodes.get('V1')?.value).toMatchObject({ pressurePa: 204_746 + 5 * PSI });
    expect(proposedStep(base, { subject: 'pressure', way: 'add', ids: ['R1'], amount: -2e5 }, units)).toMatchObject({
      ok: false,
    });
  });

  it('multiplies and sets loads', () => {
    const more = tried({ subject: 'load', way: 'multiply', ids: ['T1', 'P1'], amount: 1.5 });
    expect(more.nodes.get('T1')?.value).toMatchObject({ loadKgS: 0.05 * 1.5 });
    expect(more.nodes.get('P1')?.value).toMatchObject({ flowKgS: 0.3 * 1.5 });
  });

  it('keeps routes and lengths fit for new elevations', () => {
    const routed = applied(base, [
      setOp(base, 'pipes', 'L1', 'route', [
        { lengthM: 3.048, riseM: 3.048 },
        { lengthM: 8.952, riseM: 0 },
      ]),
    ]);
    const raised = tried({ subject: 'elevation', way: 'add', ids: ['J1'], amount: 2 }, routed);
    expect(raised.pipes.get('L1')?.value.route?.[0]?.riseM).toBeCloseTo(5.048, 9);
    expect(raised.pipes.get('L1')?.value.lengthM).toBeCloseTo(14, 9);
    const geometry = ['routeRise', 'routeLength', 'shorterThanRise', 'zeroLength'];
    expect(findings(raised).filter(({ code }) => geometry.includes(code))).toEqual([]);
    // 30 m of pipe from J1 to R1 would be shorter than a fall of 40 m
    const high = tried({ subject: 'elevation', way: 'set', ids: ['J1'], amount: 41 }, routed);
    expect(findings(high).filter(({ code }) => geometry.includes(code))).toEqual([]);
  });

  it('says what it is in one line', () => {
    const words = (wish: Wish) => {
      const proposed = proposedStep(base, wish, units);
      return proposed.ok ? proposed.step.words : proposed.reason;
    };
    expect(words({ subject: 'size', way: 'up', ids: ['L1', 'L2'] })).toBe('Next size up: CR-1, CR-2');
    expect(words({ subject: 'pressure', way: 'add', ids: ['V1'], amount: -PSI })).toBe(
      'Pressure lowered by 1.0 psi: FV-1',
    );
    expect(words({ subject: 'load', way: 'multiply', ids: ['T1'], amount: 1.2 })).toBe('Load × 1.2: TR-2');
  });
});

describe('what can be tried', () => {
  it('names the elements of each subject, and where the case has a value of its own', () => {
    const names = (subject: Parameters<typeof candidatesOf>[1]) =>
      candidatesOf(base, subject, units, 'design').map(({ name }) => name);
    expect(names('size')).toEqual(['CR-1', 'CR-2']);
    expect(names('pressure')).toEqual(['FV-1', 'VR-1']);
    expect(names('load')).toEqual(['TR-2', 'TR-10', 'CP-1']);
    expect(candidatesOf(base, 'load', units, 'design').map(({ ownInCase }) => ownInCase)).toEqual([true, false, false]);
  });
});

function applied(document: NetworkDocument, ops: Parameters<typeof applyBatch>[1]): NetworkDocument {
  const result = applyBatch(document, ops);
  if (!result.ok) throw new Error(result.errors.map(({ detail }) => detail).join('; '));
  return result.document;
}
