import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { signal } from '@angular/core';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { beforeEach, describe, expect, it } from 'vitest';
import { SessionStore } from '../session/session-store';
import { AccountStore } from './account-store';
import { PasswordPanel } from './password-panel';

const person = { name: 'Ines Kallan', email: 'designer@ternquay.example', timeZone: 'UTC' };

describe('PasswordPanel', () => {
  let fixture: ComponentFixture<PasswordPanel>;
  let http: HttpTestingController;
  const element = () => fixture.nativeElement as HTMLElement;
  const boxes = () => [...element().querySelectorAll<HTMLInputElement>('app-password-field input')];
  const notes = () =>
    [...element().querySelectorAll('app-password-field .note')].map((note) => note.textContent.trim());
  const alerts = () =>
    [...element().querySelectorAll('[role=alert]')].map((alert) => alert.textContent.trim()).join('');

  async function type(present: string, next: string): Promise<void> {
    [present, next].forEach((text, index) => {
      const box = boxes()[index];
      if (box === undefined) throw new Error('no such field');
      box.value = text;
      box.dispatchEvent(new Event('input'));
    });
    await fixture.whenStable();
  }

  async function submit(): Promise<void> {
    element().querySelector('form')?.dispatchEvent(new Event('submit'));
    await settle();
  }

  /** Promises between an answer and the screen first. */
  async function settle(): Promise<void> {
    await new Promise((resolve) => setTimeout(resolve));
    await fixture.whenStable();
  }

  beforeEach(async () => {
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(),
        provideHttpClientTesting(),
        AccountStore,
        { provide: SessionStore, useValue: { person: signal(person) } },
      ],
    });
    http = TestBed.inject(HttpTestingController);
    fixture = TestBed.createComponent(PasswordPanel);
    await fixture.whenStable();
  });

  it('says while one types what is still wrong, in the voice of a hint', async () => {
    expect(notes()[1]).toContain('12 characters or more');
    await type('', 'short');
    expect(notes()[1]).toContain('at least 12');
    await type('', 'Ines Kallan 2026');
    expect(notes()[1]).toContain('your own name');
    await type('', 'tall gulls eat my lunch');
    expect(notes()[1]).toBe('This will do.');
    expect(alerts()).toBe('');
  });

  it('asks nothing of the server that it would refuse', async () => {
    await type('the one I have', 'short');
    await submit();
    expect(alerts()).toContain('at least 12');
    await type('', 'tall gulls eat my lunch');
    await submit();
    expect(alerts()).toContain('Give your present password.');
    http.expectNone('/api/password');
  });

  it('puts the server’s refusal under the field it is about, and takes it away when one types on', async () => {
    await type('not the one', 'tall gulls eat my lunch');
    await submit();
    const detail = 'This is not your present password.';
    http
      .expectOne('/api/password')
      .flush(
        { type: '/problems/unprocessable', title: 'x', status: 422, errors: [{ pointer: '/presentPassword', detail }] },
        { status: 422, statusText: 'Unprocessable' },
      );
    await settle();
    expect(notes()[0]).toBe(detail);
    await type('the right one', 'tall gulls eat my lunch');
    expect(notes()[0]).toBe('');
  });
});
