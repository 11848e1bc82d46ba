import { describe, expect, it } from 'vitest';
import { UndoStack, type UndoStep } from './undo-stack';

const step = (label: string): UndoStep => ({ label, ops: [] });

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
});
