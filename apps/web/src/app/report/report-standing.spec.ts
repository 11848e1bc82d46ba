import type { CaseOutcome } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { revisionStanding, workingStanding } from './report-standing';

const SOLVED = { kind: 'solved', at: '2026-03-01T08:00:00.000Z', ms: 40, bandsToCome: false } as const;
const PROBLEM = { type: 'about:blank', title: 'No solution', status: 200, detail: 'Pipe L3 does not settle.' };

describe('how the network as it stands is reported', () => {
  it('is a draft at best, and nothing keeps its report back', () => {
    const standings = workingStanding(SOLVED, 'saved', [], true);
    expect(standings.map(({ word }) => word)).toEqual(['Draft']);
    expect(standings.some(({ prevents }) => prevents)).toBe(false);
  });

  it('tells those who may not draw whom to ask', () => {
    expect(workingStanding(SOLVED, 'saved', [], false)[0]?.sentence).toContain('Ask a designer');
  });

  it('is kept back while edits are only on this device, and while there are no results', () => {
    const unsaved = workingStanding({ kind: 'stale' }, 'notSaved', [], true);
    expect(unsaved.find(({ prevents }) => prevents)?.word).toBe('Not saved');
    const failed = workingStanding({ kind: 'failed', problem: PROBLEM }, 'saved', [], true);
    expect(failed.find(({ prevents }) => prevents)?.sentence).toContain('Pipe L3 does not settle.');
  });

  it('waits for a solve, and says how many cases have none', () => {
    expect(workingStanding({ kind: 'solving' }, 'saving', [], true).map(({ word }) => word)).toEqual([
      'Draft',
      'Solving',
    ]);
    const refused: CaseOutcome = { caseId: 'a', status: 'refused', problem: PROBLEM };
    const found = workingStanding(SOLVED, 'saved', [refused, { ...refused, caseId: 'b' }], true).at(-1);
    expect(found?.sentence).toContain('2 of 2 cases have no solution');
    expect(found?.prevents).toBe(false);
  });
});

describe('how a revision is reported', () => {
  it.each([
    ['approved', 'pass'],
    ['draft', 'watch'],
    ['underReview', 'watch'],
    ['returned', 'watch'],
    ['superseded', 'watch'],
    ['withdrawn', 'fail'],
  ] as const)('%s is marked %s', (state, status) => {
    expect(revisionStanding({ letter: 'B', state })[0]?.status).toBe(status);
  });
});
