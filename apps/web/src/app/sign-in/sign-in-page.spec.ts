import { HttpErrorResponse } from '@angular/common/http';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { beforeEach, describe, expect, it } from 'vitest';
import { SessionStore } from '../session/session-store';
import { SignInPage } from './sign-in-page';

const refusal = (type: string, detail: string) =>
  new HttpErrorResponse({
    status: 401,
    error: { type: `/problems/${type}`, title: 'Signing in failed', status: 401, detail },
  });

describe('SignInPage', () => {
  let fixture: ComponentFixture<SignInPage>;
  let sent: object[];
  let answers: (HttpErrorResponse | undefined)[];
  const element = () => fixture.nativeElement as HTMLElement;
  const complaint = () => element().querySelector('#complaint')?.textContent.trim();

  async function fill(id: string, text: string): Promise<void> {
    const box = element().querySelector<HTMLInputElement>(`#${id}`);
    if (box === null) throw new Error(`no field ${id}`);
    box.value = text;
    box.dispatchEvent(new Event('input'));
    await fixture.whenStable();
  }

  async function submit(...following: (HttpErrorResponse | undefined)[]): Promise<void> {
    answers = following;
    element().querySelector('form')?.dispatchEvent(new Event('submit'));
    await fixture.whenStable();
  }

  beforeEach(async () => {
    sent = [];
    const signIn = (input: object) => {
      sent.push(input);
      const answer = answers.shift();
      return answer === undefined ? Promise.resolve() : Promise.reject(answer);
    };
    TestBed.configureTestingModule({
      providers: [provideRouter([{ path: 'sites', children: [] }]), { provide: SessionStore, useValue: { signIn } }],
    });
    fixture = TestBed.createComponent(SignInPage);
    await fixture.whenStable();
    await fill('email', 'ines@ternquay.example');
    await fill('password', 'four plain words here');
  });

  it('knows of no code until the server asks for one, and then sends it along', async () => {
    expect(element().querySelector('#code')).toBeNull();
    await submit(refusal('wrong-credentials', 'The e-mail address or the password is wrong.'));
    expect(element().querySelector('#code')).toBeNull();
    await submit(refusal('code-needed', 'Give the code.'));
    expect(element().querySelector('#password')).toBeNull();
    expect(complaint()).toBe('');
    await submit();
    expect(complaint()).toBe('Give a code.');
    await fill('code', '123456');
    await submit(refusal('wrong-code', 'This code is not right.'));
    expect(complaint()).toBe('This code is not right.');
    await fill('code', '654321');
    await submit();
    const credentials = { email: 'ines@ternquay.example', password: 'four plain words here' };
    expect(sent).toEqual([
      credentials,
      credentials,
      { ...credentials, code: '123456' },
      { ...credentials, code: '654321' },
    ]);
  });

  it('goes back to the password when it is no longer right, and to the start on demand', async () => {
    await submit(refusal('code-needed', 'Give the code.'));
    await fill('code', '123456');
    await submit(refusal('wrong-credentials', 'The e-mail address or the password is wrong.'));
    expect(element().querySelector('#password')).not.toBeNull();
    expect(complaint()).toContain('is wrong');
    await submit(refusal('code-needed', 'Give the code.'));
    [...element().querySelectorAll('button')].find((button) => button.textContent.includes('Start again'))?.click();
    await fixture.whenStable();
    expect(element().querySelector<HTMLInputElement>('#password')?.value).toBe('');
  });
});
