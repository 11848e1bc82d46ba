import { signal } from '@angular/core';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import type { CaseOutcome, CommentSubject, TrapResult, Verdict } from '@riseback/contracts';
import { NetworkFileShape } from '@riseback/network';
import type { UnitSystem } from '@riseback/units';
import { beforeEach, describe, expect, it } from 'vitest';
import { SessionStore } from '../../session/session-store';
import type { RevisionSide } from '../revision-side';
import { RevisionCompare } from './revision-compare';

/** 1 psi, NIST SP 811. */
const PSI = 6_894.757_293;
const ATMOSPHERE = 101_325;

const trap = (id: string, tag: string, loadKgS = 0.05) => ({
  id,
  kind: 'trap',
  tag,
  area: 'Retort hall',
  elevationM: 0,
  inletPressurePa: 618_000,
  loadKgS,
});
const file = (nps: string, traps: unknown[] = [trap('T1', 'TR-101'), trap('T2', 'TR-102')]) =>
  NetworkFileShape.parse({
    format: 'riseback-network',
    version: 1,
    name: 'Small',
    nodes: [...traps, { id: 'R1', kind: 'receiver', elevationM: 0, vented: true }],
    pipes: ['L1', 'L2', 'L3'].map((id, i) => ({
      id,
      tag: `CR-${String(18 + i)}`,
      from: 'T1',
      to: 'R1',
      lengthM: 3,
      size: { nps, schedule: '80' },
    })),
    cases: [
      { id: 'design', name: 'Design' },
      { id: 'start', name: 'Start-up' },
    ],
  });

function outcome(
  caseId: string,
  traps: readonly (readonly [id: string, psig: number, verdict: Verdict])[],
): CaseOutcome {
  const words = { message: '', text: [] };
  return {
    caseId,
    status: 'solved',
    result: {
      case: caseId,
      converged: true,
      iterations: 1,
      nodes: [],
      pipes: [],
      traps: traps.map(([id, psig, verdict]): TrapResult => {
        const backPressurePa = ATMOSPHERE + psig * PSI;
        return {
          id,
          backPressurePa,
          receiverPressurePa: ATMOSPHERE,
          staticPa: 0,
          frictionPa: 0,
          flashPa: 0,
          differentialPa: 50 * PSI - psig * PSI,
          handCheck: { staticPa: 0, backPressurePa },
          walk: [],
          checks: [{ code: 'differential', verdict, ...words }],
          notChecked: [],
        };
      }),
      warnings: [],
    },
  };
}

const before: RevisionSide = {
  label: 'B',
  file: file('1-1/2'),
  results: [
    outcome('design', [
      ['T1', 36.9, 'fail'],
      ['T2', 20, 'pass'],
    ]),
    outcome('start', [
      ['T1', 10, 'pass'],
      ['T2', 30, 'pass'],
    ]),
  ],
};
const after: RevisionSide = {
  label: 'C',
  file: file('2'),
  results: [
    outcome('design', [
      ['T1', 31.1, 'watch'],
      ['T2', 20.05, 'pass'],
    ]),
    outcome('start', [
      ['T1', 10, 'pass'],
      ['T2', 30, 'pass'],
    ]),
  ],
};

describe('two revisions side by side', () => {
  const system = signal<UnitSystem>('us');
  let fixture: ComponentFixture<RevisionCompare>;
  const page = () => fixture.nativeElement as HTMLElement;
  const text = (selector: string) => page().querySelector(selector)?.textContent.replace(/\s+/g, ' ').trim();
  const rowsOf = (list: string) =>
    [...page().querySelectorAll(`${list} tbody tr`)].map((row) =>
      [...row.querySelectorAll('th, td:not(.axis)')].map((cell) => cell.textContent.replace(/\s+/g, ' ').trim()),
    );
  async function show(one: RevisionSide, other: RevisionSide): Promise<void> {
    fixture = TestBed.createComponent(RevisionCompare);
    fixture.componentRef.setInput('before', one);
    fixture.componentRef.setInput('after', other);
    await fixture.whenStable();
  }
  async function press(button: Element | null | undefined): Promise<void> {
    (button as HTMLButtonElement).click();
    await fixture.whenStable();
  }
  async function choose(index: number, value: string): Promise<void> {
    const select = page().querySelectorAll('select')[index] as HTMLSelectElement;
    select.value = value;
    select.dispatchEvent(new Event('change'));
    await fixture.whenStable();
  }

  beforeEach(() => {
    system.set('us');
    TestBed.configureTestingModule({ providers: [{ provide: SessionStore, useValue: { unitSystem: system } }] });
  });

  it('say in one sentence how much was changed and how much moved', async () => {
    await show(before, after);
    expect(text('h2')).toBe('B to C');
    expect(text('.sentence')).toBe('3 inputs changed, 1 of 2 traps moved by 0.1 psi or more');
    system.set('si');
    await fixture.whenStable();
    // 689 Pa
    expect(text('.sentence')).toBe('3 inputs changed, 1 of 2 traps moved by 0.69 kPa or more');
  });

  it('fold equal changes, and open to the elements one by one', async () => {
    await show(before, after);
    expect(rowsOf('app-input-list')).toEqual([['CR-18 to CR-20', 'Size', 'B 1½″ sch 80', 'C 2″ sch 80', '']]);
    expect(page().querySelector('app-input-list del')?.textContent).toBe('1½″ sch 80');
    await press(page().querySelector('.fold'));
    expect(rowsOf('app-input-list').map(([what]) => what)).toEqual(['CR-18 to CR-20', 'CR-18', 'CR-19', 'CR-20']);
  });

  it('show the worst of all cases at first, each trap by the case that governs it', async () => {
    await show(before, after);
    expect(rowsOf('app-effect-list')).toEqual([
      ['TR-101', 'Retort hall', 'B 36.9', 'C 31.1', '−5.8', 'Fail to Watch Design', 'Comment'],
    ]);
    expect(text('.turns')).toBe('Better: 1 fail to watch.');
  });

  it('show what did not move too when asked, and one case by itself', async () => {
    await show(before, after);
    await press(page().querySelector('.tools button'));
    expect(rowsOf('app-effect-list')[1]).toEqual([
      'TR-102',
      'Retort hall',
      'B 30.0',
      'C 30.0',
      '–',
      'Pass as before Start-up',
      'Comment',
    ]);
    await choose(0, 'start');
    expect(rowsOf('app-effect-list').map(([tag, , was]) => [tag, was])).toEqual([
      ['TR-101', 'B 10.0'],
      ['TR-102', 'B 30.0'],
    ]);
    expect(text('.turns')).toBe('No verdict is turned.');
  });

  it('compare differentials as well', async () => {
    await show(before, after);
    await choose(1, 'differentialPa');
    // 50 − 36.9 and 50 − 31.1
    expect(rowsOf('app-effect-list')[0]?.slice(2, 5)).toEqual(['B 13.1', 'C 18.9', '+5.8']);
  });

  it('tell traps that came and went, and a case without a result', async () => {
    const problem = { type: '/problems/no-solution', title: 'No solution', status: 422, detail: 'The header chokes.' };
    const other: RevisionSide = {
      label: 'C',
      file: file('1-1/2', [trap('T1', 'TR-101'), trap('T3', 'TR-103')]),
      results: [
        outcome('design', [
          ['T1', 36.9, 'fail'],
          ['T3', 12, 'pass'],
        ]),
        { caseId: 'start', status: 'refused', problem },
      ],
    };
    await show(before, other);
    expect(rowsOf('app-effect-list').map(([tag, , was, is, , verdict]) => [tag, was, is, verdict])).toEqual([
      ['TR-102', 'B 30.0', 'C –', 'Pass to Removed Start-up'],
      ['TR-103', 'B –', 'C 12.0', 'Not there to Pass Design'],
    ]);
    expect(page().textContent).toContain('Start-up has no result in C: The header chokes.');
  });

  it('say so where nothing differs, and where results are still to come', async () => {
    await show(before, { ...before, label: 'Working' });
    expect(text('.sentence')).toBe('No input changed, none of 2 traps moved by 0.1 psi or more');
    expect(page().textContent).toContain('Nothing was changed.');
    expect(page().textContent).toContain('No trap moved, and no verdict is turned.');
    await show(before, { ...after, label: 'Working', results: [] });
    expect(page().textContent).toContain('No results of Working yet');
  });

  it('warn where only one of the two has its spread, which may turn a verdict by itself', async () => {
    const spread = { lowPa: ATMOSPHERE, highPa: ATMOSPHERE + PSI };
    const results = after.results.map((one) =>
      one.status === 'solved'
        ? { ...one, result: { ...one.result, traps: one.result.traps.map((each) => ({ ...each, spread })) } }
        : one,
    );
    await show(before, { ...after, results });
    expect(page().textContent).toContain('Only one of the two is computed with its spread');
    await show({ ...before, results }, { ...after, results });
    expect(page().textContent).not.toContain('Only one of the two is computed with its spread');
  });

  it('lead to elements, and to a comment on what is looked at', async () => {
    await show(before, after);
    const chosen: string[] = [];
    const asked: CommentSubject[] = [];
    fixture.componentInstance.elementChosen.subscribe((id) => chosen.push(id));
    fixture.componentInstance.commentOn.subscribe((subject) => asked.push(subject));
    await press(page().querySelector('app-effect-list .element'));
    await press(page().querySelector('app-effect-list app-comment-button button'));
    await choose(0, 'design');
    await press(page().querySelector('app-effect-list app-comment-button button'));
    await press(page().querySelector('.fold'));
    await press(page().querySelector('app-input-list .part app-comment-button button'));
    expect(chosen).toEqual(['T1']);
    expect(asked).toEqual([
      { kind: 'result', elementId: 'T1' },
      { kind: 'result', elementId: 'T1', caseId: 'design' },
      { kind: 'element', elementId: 'L1' },
    ]);
  });

  it('number the open comments where they are pinned; who may not comment still sees them', async () => {
    await show(before, after);
    fixture.componentRef.setInput(
      'commentsOf',
      new Map([
        ['L2', [2]],
        ['T1', [1, 4]],
      ]),
    );
    fixture.componentRef.setInput('mayComment', false);
    await fixture.whenStable();
    expect(rowsOf('app-input-list').map(([what, , , , comment]) => [what, comment])).toEqual([
      ['CR-18, CR-20', ''],
      ['CR-19', 'Comment 2'],
    ]);
    expect(rowsOf('app-effect-list')[0]?.at(-1)).toBe('Comments 1, 4');
  });
});
