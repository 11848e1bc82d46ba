import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { beforeEach, describe, expect, it } from 'vitest';
import { FRICTION_WORDS } from '../../networks/method-words';
import { MethodChoice } from './method-choice';

describe('MethodChoice', () => {
  const accepted: string[] = [];
  const opened = async (disabled = false, blocked: Readonly<Record<string, string>> = {}) => {
    TestBed.configureTestingModule({ providers: [provideRouter([])] });
    const fixture = TestBed.createComponent(MethodChoice);
    const inputs = {
      key: 'friction',
      label: 'Friction',
      words: FRICTION_WORDS,
      value: 'flashVapour',
      disabled,
      blocked,
    };
    for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
    fixture.componentInstance.accepted.subscribe((value) => accepted.push(value));
    await fixture.whenStable();
    const element = fixture.nativeElement as HTMLElement;
    const details = element.querySelector('details');
    if (details !== null) details.open = true;
    return { element, details };
  };

  beforeEach(() => {
    accepted.length = 0;
  });

  it('gives every option a sentence and the way to its equations', async () => {
    const { element } = await opened();
    const rows = [...element.querySelectorAll('li')];
    expect(rows).toHaveLength(Object.keys(FRICTION_WORDS).length);
    for (const row of rows) expect(row.querySelector('p')?.textContent.trim().length).toBeGreaterThan(60);
    expect(element.querySelector('li a')?.getAttribute('href')).toContain('#friction-flashVapour');
  });

  it('takes a press, closes, and asks for nothing when the same is pressed again', async () => {
    const { element, details } = await opened();
    const press = (name: string) =>
      [...element.querySelectorAll('button')].find((button) => button.textContent.trim() === name)?.click();
    press('Friedel');
    expect([accepted, details?.open]).toEqual([['friedel'], false]);
    press(FRICTION_WORDS.flashVapour);
    expect(accepted).toEqual(['friedel']);
  });

  it('does not take what cannot be computed here, and says why beside it', async () => {
    const { element } = await opened(false, { friedel: 'Not in this network.' });
    const friedel = [...element.querySelectorAll('button')].find((button) => button.textContent.trim() === 'Friedel');
    friedel?.click();
    expect(accepted).toEqual([]);
    expect(friedel?.getAttribute('aria-disabled')).toBe('true');
    const reason = element.querySelector(`#${friedel?.getAttribute('aria-describedby') ?? ''}`);
    expect(reason?.textContent).toBe('Not in this network.');
  });

  it('says that nothing is computed where the network has such a choice already', async () => {
    const { element } = await opened(false, { flashVapour: 'Not in this network.' });
    expect(element.querySelector('.note')?.textContent).toContain(
      'Not computed with this choice. Not in this network.',
    );
  });

  it('only explains to whoever may not draw', async () => {
    const { element } = await opened(true);
    expect(element.querySelectorAll('button')).toHaveLength(0);
    expect(element.querySelectorAll('li p')).toHaveLength(Object.keys(FRICTION_WORDS).length);
  });

  it('closes at Escape before anything else takes the key', async () => {
    const { element, details } = await opened();
    const escape = new KeyboardEvent('keydown', { key: 'Escape', bubbles: true });
    element.querySelector('button')?.dispatchEvent(escape);
    expect(details?.open).toBe(false);
  });
});
