import { describe, expect, it } from 'vitest';
import { freezeObstacle } from './freeze-obstacle';

const solved = { kind: 'solved', at: '2026-03-01T08:00:00.000Z', ms: 4, bandsToCome: false } as const;

describe('what stands in the way of freezing', () => {
  it('is nothing when all is saved and solved', () => {
    expect(freezeObstacle('saved', solved, 0)).toBeNull();
  });

  it('is first what two people changed, then what is not saved', () => {
    expect(freezeObstacle('notSaved', solved, 1)?.remedy).toBe('mend');
    expect(freezeObstacle('notSaved', solved, 0)?.remedy).toBe('save');
    expect(freezeObstacle('saving', solved, 0)?.remedy).toBe('wait');
  });

  it('is a solve that is under way, lacks its bands, or has failed', () => {
    expect(freezeObstacle('saved', { kind: 'solving' }, 0)?.remedy).toBe('wait');
    expect(freezeObstacle('saved', { ...solved, bandsToCome: true }, 0)?.remedy).toBe('wait');
    const problem = { type: 'about:blank', title: 'No solution', status: 422, detail: 'The loop does not close.' };
    expect(freezeObstacle('saved', { kind: 'failed', problem }, 0)?.words).toContain('The loop does not close.');
  });
});
