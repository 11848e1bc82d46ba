import { signal } from '@angular/core';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import type { NamedPerson, Problem } from '@riseback/contracts';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { SessionStore } from '../session/session-store';
import { CommentForm } from './comment-form';
import { type CommentPlace, CommentStore } from './comment-store';

const ON_PIPE: CommentPlace = { subject: { kind: 'element', elementId: 'L1' } };

describe('CommentForm', () => {
  let fixture: ComponentFixture<CommentForm>;
  const people = signal<readonly NamedPerson[]>([
    { id: 'p1', name: 'Ana Reyes', role: 'reviewer' },
    { id: 'p2', name: 'Ines Kallan', role: 'designer' },
  ]);
  const add = vi.fn<(place: CommentPlace, body: string) => Promise<Problem | null>>();
  const element = () => fixture.nativeElement as HTMLElement;
  const offered = () => [...element().querySelectorAll('[role=option]')].map((option) => option.textContent.trim());

  function box(): HTMLTextAreaElement {
    const found = element().querySelector('textarea');
    if (found === null) throw new Error('no box');
    return found;
  }

  async function type(text: string): Promise<void> {
    box().value = text;
    box().setSelectionRange(text.length, text.length);
    box().dispatchEvent(new Event('input'));
    await fixture.whenStable();
  }

  async function press(key: string): Promise<void> {
    box().dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
    await fixture.whenStable();
  }

  async function open(place: CommentPlace): Promise<void> {
    fixture = TestBed.createComponent(CommentForm);
    fixture.componentRef.setInput('label', 'New comment');
    fixture.componentRef.setInput('place', place);
    await fixture.whenStable();
  }

  async function send(): Promise<void> {
    element().querySelector('button')?.click();
    await new Promise((resolve) => setTimeout(resolve));
    await fixture.whenStable();
  }

  beforeEach(async () => {
    sessionStorage.clear();
    add.mockReset().mockResolvedValue(null);
    TestBed.configureTestingModule({
      providers: [
        { provide: CommentStore, useValue: { people, add, askForNames: () => undefined } },
        { provide: SessionStore, useValue: { person: signal({ id: 'me' }) } },
      ],
    });
    await open(ON_PIPE);
  });

  it('offers names behind an @ and takes one by keyboard', async () => {
    await type('ask @');
    expect(offered()).toHaveLength(2);
    expect(box().getAttribute('aria-activedescendant')).toMatch(/-0$/);
    await press('ArrowDown');
    await press('Enter');
    expect(box().value).toBe('ask @Ines Kallan ');
    expect(offered()).toEqual([]);
  });

  it('lets Escape put the names away and leaves the text', async () => {
    await type('ask @a');
    await press('Escape');
    expect(offered()).toEqual([]);
    expect(box().value).toBe('ask @a');
  });

  it('keeps what is typed for its subject until it has arrived', async () => {
    await type('half a thou');
    await open(ON_PIPE);
    expect(box().value).toBe('half a thou');
    await open({ subject: { kind: 'element', elementId: 'L2' } });
    expect(box().value).toBe('');
    await open(ON_PIPE);
    await send();
    expect(add).toHaveBeenCalledExactlyOnceWith(ON_PIPE, 'half a thou');
    await open(ON_PIPE);
    expect(box().value).toBe('');
  });

  it('loses nothing when it is refused, and says why', async () => {
    add.mockResolvedValueOnce({ type: 'about:blank', title: 'The server cannot be reached', status: 0 });
    await type('still here');
    await send();
    expect(box().value).toBe('still here');
    expect(element().querySelector('[role=alert]')?.textContent).toContain('cannot be reached');
    await open(ON_PIPE);
    expect(box().value).toBe('still here');
  });

  it('asks for words before it sends', async () => {
    await type('   ');
    await send();
    expect(add).not.toHaveBeenCalled();
    expect(element().textContent).toContain('Write something first.');
  });
});
