import type { CaseOutcome, SolveResult, TrapResult } from '@riseback/contracts';
import { emptyDocument, findings, fromFile, NetworkFileShape, type NetworkDocument } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { allFindings, findingsOfCases } from './finding-list';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;

/** Two traps into one receiver, and a third that hangs on nothing. */
const document: NetworkDocument = fromFile(
  NetworkFileShape.parse({
    format: 'riseback-network',
    version: 1,
    name: 'Two traps',
    nodes: [
      {
        id: 'T2',
        kind: 'trap',
        tag: 'TR-10',
        elevationM: 0,
        inletPressurePa: 6e5,
        loadKgS: 0.05,
        position: { x: 40, y: 80 },
      },
      { id: 'T1', kind: 'trap', tag: 'TR-9', elevationM: 0, inletPressurePa: 6e5, loadKgS: 0.05 },
      { id: 'J', kind: 'junction', elevationM: 0 },
      { id: 'R', kind: 'receiver', elevationM: 0, vented: true },
    ],
    pipes: [
      { id: 'L1', from: 'T1', to: 'J', lengthM: 5, insideDiameterM: 0.02 },
      { id: 'L2', tag: 'CR-2', from: 'T2', to: 'J', lengthM: 5, insideDiameterM: 0.02 },
      { id: 'L3', from: 'J', to: 'R', lengthM: 5, insideDiameterM: 0.02 },
    ],
    cases: [{ id: 'design', name: 'Design', overrides: [{ node: 'T1', state: 'failedOpen' }] }],
  }),
);

const trap = (id: string, ...checks: TrapResult['checks']): TrapResult => ({
  id,
  backPressurePa: 2e5,
  receiverPressurePa: 101_325,
  staticPa: 0,
  frictionPa: 0,
  flashPa: 98_675,
  differentialPa: 4e5,
  handCheck: { staticPa: 0, backPressurePa: 101_325 },
  walk: [],
  checks,
  notChecked: [],
});
const solved = (result: Partial<SolveResult>): CaseOutcome => ({
  caseId: 'design',
  status: 'solved',
  result: { case: 'design', converged: true, iterations: 1, nodes: [], pipes: [], traps: [], warnings: [], ...result },
});
const said = (outcome: CaseOutcome | null, of = document) =>
  allFindings({ document: of, topology: findings(of), outcome, units });

describe('allFindings', () => {
  it('gathers checks and warnings, worst first, tags as a person counts, in the person’s units', () => {
    const list = said(
      solved({
        traps: [
          trap('T2', {
            code: 'differential',
            verdict: 'fail',
            message: '',
            text: ['The return stands at ', { quantity: 'pressure', si: 618_432 }, '.'],
            remedy: ['Lower it.'],
          }),
          trap(
            'T1',
            { code: 'capacity', verdict: 'fail', message: '', text: ['Too small.'] },
            { code: 'differential', verdict: 'pass', message: '', text: [] },
          ),
        ],
        warnings: [{ code: 'velocity', element: 'L2', verdict: 'watch', message: '', text: ['Fast.'] }],
      }),
    );
    expect(list.map(({ severity, tag, code }) => [severity, tag, code])).toEqual([
      ['fail', 'TR-9', 'capacity'],
      ['fail', 'TR-10', 'differential'],
      ['watch', 'CR-2', 'velocity'],
    ]);
    expect(list[1]).toEqual({
      id: 'nodes/T2/differential',
      severity: 'fail',
      element: { in: 'nodes', id: 'T2' },
      tag: 'TR-10',
      position: { x: 40, y: 80 },
      code: 'differential',
      what: 'The return stands at 75.0 psig.',
      remedy: 'Lower it.',
    });
    expect(list[2]?.position).toEqual({ x: 40, y: 80 });
  });

  it('leads from each mistake of a refused case to the element that it points at', () => {
    const problem = {
      type: '/problems/not-available',
      title: 'Not available yet',
      status: 400,
      errors: [
        { pointer: '/cases/0/overrides/0/state', detail: 'state failedOpen of T1 is not available yet' },
        { pointer: '/pipes/1', detail: 'a loop is not available yet' },
        { pointer: '/method/friction', detail: 'friction method friedel is not available yet' },
        { pointer: '/nodes/99', detail: 'nobody' },
      ],
    };
    const list = said({ caseId: 'design', status: 'refused', problem });
    expect(list.map(({ element, severity, what }) => [element?.id, severity, what])).toEqual([
      [undefined, 'fail', 'Friction method friedel is not available yet'],
      [undefined, 'fail', 'Nobody'],
      ['L2', 'fail', 'A loop is not available yet'],
      ['T1', 'fail', 'State failedOpen of T1 is not available yet'],
    ]);
    expect(new Set(list.map(({ id }) => id)).size).toBe(list.length);
  });

  it('tells a network without a solution', () => {
    const problem = {
      type: '/problems/no-solution',
      title: 'The network has no solution',
      status: 422,
      detail: 'At L3: too hot',
    };
    expect(said(solved({ converged: false, problem }))).toMatchObject([
      { severity: 'fail', code: 'noSolution', element: null, tag: '', what: 'At L3: too hot' },
    ]);
  });

  it('names the traps that were left out, and the rest in one line, unless they have a finding of their own', () => {
    const list = said(solved({ partial: true, leftOut: ['T1', 'J', 'L1', 'gone'] }));
    expect(list.map(({ severity, tag, what }) => [severity, tag, what])).toEqual([
      ['watch', 'TR-9', 'Left out of the solve: nothing leads from it to a receiver that can be computed.'],
      ['note', 'J', 'Left out of the solve: J, L1.'],
    ]);
  });

  it('shows what the drawing alone says while nothing is solved', () => {
    const list = said(null, emptyDocument('New'));
    expect(list).toMatchObject([{ severity: 'fail', code: 'noReceiver', element: null }]);
    expect(list[0]?.remedy).toContain('receiver');
  });
});

describe('findingsOfCases', () => {
  const check = (verdict: 'pass' | 'watch' | 'fail', code: string, words: string) => ({
    code,
    verdict,
    message: '',
    text: [words],
  });
  const inCase = (caseId: string, ...traps: TrapResult[]): CaseOutcome => ({ ...solved({ traps }), caseId });

  it('keeps one thing at one trap together by its worst, and says in which case each is so', () => {
    const list = findingsOfCases({
      document,
      topology: [],
      units,
      outcomes: [
        inCase(
          'design',
          trap('T1', check('watch', 'capacity', 'Just enough.')),
          trap('T2', check('fail', 'stall', 'Stalls.')),
        ),
        inCase('start-up', trap('T1', check('fail', 'capacity', 'Too small.'))),
      ],
    });
    expect(list.map(({ tag, what, cases }) => [tag, what, cases])).toEqual([
      ['TR-9', 'Too small.', ['start-up']],
      ['TR-9', 'Just enough.', ['design']],
      ['TR-10', 'Stalls.', ['design']],
    ]);
    expect(new Set(list.map(({ id }) => id)).size).toBe(3);
  });

  it('says once what several cases say in the same words', () => {
    const rated = trap('T1', check('fail', 'bodyRating', 'The body is not rated for it.'));
    const outcomes = [inCase('design', rated), inCase('start-up', rated)];
    const list = findingsOfCases({ document, topology: [], units, outcomes });
    expect(list).toHaveLength(1);
    expect(list[0]?.cases).toEqual(['design', 'start-up']);
  });

  it('tells a refused case beside the findings of the drawing, which belong to no case', () => {
    const problem = { type: '/problems/not-available', title: 'Not available', status: 400, detail: 'Not yet' };
    const topology = findings({ ...document, pipes: new Map() });
    const list = findingsOfCases({
      document,
      topology,
      units,
      outcomes: [{ caseId: 'design', status: 'refused', problem }],
    });
    expect(list.filter(({ code }) => code === 'refused').map(({ cases }) => cases)).toEqual([['design']]);
    expect(list.filter(({ code }) => code !== 'refused').map(({ cases }) => cases)).toEqual(
      topology.map(() => undefined),
    );
  });
});
