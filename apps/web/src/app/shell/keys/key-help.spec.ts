import { describe, expect, it } from 'vitest';
import { keySectionsOf } from './general-keys';
import { asksForKeys, KeyHelp } from './key-help';

describe('KeyHelp', () => {
  it('opens the view’s own list where there is one, and the general list once that view is left', () => {
    const help = new KeyHelp();
    const opened: string[] = [];
    help.offer('general', () => opened.push('general'));
    const leave = help.offer('own', () => opened.push('own'));
    help.open();
    leave();
    help.open();
    expect(opened).toEqual(['own', 'general']);
  });

  it('does not take a question mark that is being typed', () => {
    const asked: boolean[] = [];
    const hear = (event: KeyboardEvent): void => void asked.push(asksForKeys(event));
    document.addEventListener('keydown', hear);
    for (const tag of ['p', 'input', 'textarea'] as const) {
      const element = document.body.appendChild(document.createElement(tag));
      element.dispatchEvent(new KeyboardEvent('keydown', { key: '?', bubbles: true }));
      element.remove();
    }
    document.removeEventListener('keydown', hear);
    expect(asked).toEqual([true, false, false]);
  });
});

describe('keySectionsOf', () => {
  it('puts the keys of the open view before those of everywhere', () => {
    expect(keySectionsOf('/sites/a/networks/b/lists?list=pipes').map(({ title }) => title)).toEqual([
      'Lists',
      'Everywhere',
    ]);
    expect(keySectionsOf('/sites').map(({ title }) => title)).toEqual(['Everywhere']);
  });
});
