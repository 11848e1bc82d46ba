import { describe, expect, it } from 'vitest';
import { EMPTY_TRIAL, type Trial } from './trial';
import { TrialHistory } from './trial-history';

const trialOf = (...ids: string[]): Trial => ({ steps: ids.map((id) => ({ id, words: id, values: [] })), seen: [] });
const idsOf = (history: TrialHistory) => history.trial().steps.map(({ id }) => id);

describe('TrialHistory', () => {
  it('goes back and forth over what was tried, and names the step', () => {
    const history = new TrialHistory();
    expect([history.undoLabel(), history.redoLabel()]).toEqual([null, null]);
    history.change('try a', trialOf('a'));
    history.change('try b', trialOf('a', 'b'));
    history.undo();
    expect([idsOf(history), history.undoLabel(), history.redoLabel()]).toEqual([['a'], 'try a', 'try b']);
    history.undo();
    history.undo();
    expect(idsOf(history)).toEqual([]);
    history.redo();
    history.redo();
    history.redo();
    expect(idsOf(history)).toEqual(['a', 'b']);
  });

  it('forgets what was taken back as soon as something else is tried', () => {
    const history = new TrialHistory();
    history.change('try a', trialOf('a'));
    history.undo();
    history.change('try b', trialOf('b'));
    expect(history.redoLabel()).toBeNull();
  });

  it('brings back what was dropped, and not what was kept', () => {
    const history = new TrialHistory();
    history.change('try a', trialOf('a'));
    history.change('drop all', EMPTY_TRIAL);
    history.undo();
    expect(idsOf(history)).toEqual(['a']);
    history.begin(EMPTY_TRIAL);
    expect([history.undoLabel(), history.redoLabel()]).toEqual([null, null]);
  });
});
