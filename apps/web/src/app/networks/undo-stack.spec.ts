import { describe, expect, it } from 'vitest';
import { UndoStack, type UndoStep } from './undo-stack';

const step = (label: string): UndoStep => ({ label, ops: [], batchId: label, version: 1 });

describe('UndoStack', () => {
  it('offers the last edit first, then what was taken back', () => {
    const stack = new UndoStack();
    stack.edited(step('one'));
    stack.edited(step('two'));
    expect(stack.nextUndo()?.label).toBe('two');
    stack.undone(step('two'));
    expect(stack.nextUndo()?.label).toBe('one');
    expect(stack.nextRedo()?.label).toBe('two');
  });

  it('forgets the redo side at a new edit', () => {
    const stack = new UndoStack();
    stack.edited(step('one'));
    stack.undone(step('one'));
    stack.edited(step('other'));
    expect(stack.nextRedo()).toBeNull();
  });

  it('holds two hundred steps', () => {
    const stack = new UndoStack();
    for (let n = 1; n <= 250; n += 1) stack.edited(step(String(n)));
    let held = 0;
    while (stack.nextUndo() !== null) {
      stack.dropUndo();
      held += 1;
    }
    expect(held).toBe(200);
  });

  it('follows batches that were put on top of others’', () => {
    const stack = new UndoStack();
    stack.edited(step('gone'));
    stack.edited(step('split'));
    const inverse: UndoStep['ops'] = [{ op: 'remove', in: 'nodes', id: 'T1' }];
    const fates = new Map([
      ['gone', null],
      ['split', { batchId: 'new', inverse }],
    ]);
    stack.follow(fates, new Map());
    expect(stack.steps()).toEqual([{ label: 'split', ops: inverse, batchId: 'new', version: 1 }]);
  });
});
