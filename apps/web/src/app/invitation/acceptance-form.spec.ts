import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { beforeEach, describe, expect, it } from 'vitest';
import { LinkStore } from '../links/link-store';
import { LinkToken } from '../links/link-token';
import { SessionStore } from '../session/session-store';
import { AcceptanceForm, type InvitationTold } from './acceptance-form';

const invitation: InvitationTold = {
  purpose: 'invitation',
  email: 'bo.lind@quay.example',
  siteName: 'Tern Quay Cannery',
  role: 'reviewer',
  fromName: 'Ana Doe',
  hasAccount: false,
  expiresAt: '2026-12-02T08:00:00.000Z',
};
const GOOD = 'tall gulls eat my lunch';

describe('AcceptanceForm', () => {
  let fixture: ComponentFixture<AcceptanceForm>;
  let http: HttpTestingController;
  let accepted: number;
  let entered: object[];
  const element = () => fixture.nativeElement as HTMLElement;
  const alerts = () =>
    [...element().querySelectorAll('[role=alert]')].map((alert) => alert.textContent.trim()).join('');

  async function open(told: InvitationTold): Promise<void> {
    fixture = TestBed.createComponent(AcceptanceForm);
    fixture.componentRef.setInput('invitation', told);
    fixture.componentInstance.accepted.subscribe(() => (accepted += 1));
    await fixture.whenStable();
  }

  async function type(selector: string, text: string): Promise<void> {
    const box = element().querySelector<HTMLInputElement>(selector);
    if (box === null) throw new Error(`no field ${selector}`);
    box.value = text;
    box.dispatchEvent(new Event('input'));
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

  const sent = () => http.expectOne('/api/links/acceptance');
  const refuse = async (type_: string, status: number, detail: string) => {
    sent().flush({ type: type_, title: 'Refused', status, detail }, { status, statusText: 'x' });
    await settle();
  };

  beforeEach(() => {
    accepted = 0;
    entered = [];
    const session = {
      forget: () => undefined,
      restore: () => Promise.resolve(null),
      signIn: (input: object) => Promise.resolve(void entered.push(input)),
    };
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(),
        provideHttpClientTesting(),
        LinkStore,
        { provide: SessionStore, useValue: session },
      ],
    });
    http = TestBed.inject(HttpTestingController);
    TestBed.inject(LinkToken).hold('the-token');
  });

  it('asks who is new for a name and a good password before it asks the server', async () => {
    await open(invitation);
    await submit();
    expect(alerts()).toContain('Give your name');
    await type('#acceptance-name', 'Bo Lind');
    await type('app-password-field input', 'Bo Lind 2026');
    await submit();
    expect(alerts()).toContain('your own name');
    await type('app-password-field input', GOOD);
    await submit();
    const request = sent();
    expect(request.request.body).toEqual({ token: 'the-token', name: 'Bo Lind', password: GOOD });
    request.flush(null);
    await settle();
    expect(accepted).toBe(1);
    expect(TestBed.inject(LinkToken).value()).toBeNull();
    expect(entered).toEqual([{ email: 'bo.lind@quay.example', password: GOOD }]);
  });

  it('asks who has an account for its password alone, and for a code once the server wants one', async () => {
    await open({ ...invitation, hasAccount: true });
    expect(element().querySelector('#acceptance-name')).toBeNull();
    await type('app-password-field input', 'short');
    await submit();
    await refuse('/problems/code-needed', 401, 'Give the code.');
    await submit();
    expect(alerts()).toContain('Give a code.');
    await type('app-code-field input', '123456');
    await submit();
    await refuse('/problems/wrong-code', 401, 'This code is not right.');
    expect(alerts()).toContain('This code is not right.');
    expect(accepted).toBe(0);
    await type('app-code-field input', '654321');
    await submit();
    const request = sent();
    expect(request.request.body).toEqual({ token: 'the-token', password: 'short', code: '654321' });
    request.flush(null);
    await settle();
    expect(accepted).toBe(1);
    // the code is spent: signing in takes the next one
    expect(entered).toEqual([]);
  });
});
