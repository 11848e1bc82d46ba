import { signal } from '@angular/core';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import type { NewSignature, Problem, Revision, SignatureMeaning, SigningTerms } from '@riseback/contracts';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Load } from '../shared/load';
import { RevisionReader } from './revision-reader';
import { SigningForm } from './signing-form';

const terms: SigningTerms = {
  meaning: 'approved',
  sentences: ['I approve revision B.', 'Steam burns.'],
  fileHash: 'f1',
  resultsHash: 'r1',
  engineVersion: '1',
  openComments: 1,
  verdicts: { traps: 3, fail: 1, watch: 0 },
  asksForCode: true,
  token: 't1',
};

describe('SigningForm', () => {
  let fixture: ComponentFixture<SigningForm>;
  const load = signal<Load<SigningTerms>>({ status: 'ready', value: terms });
  const meaning = signal<SignatureMeaning>('approved');
  const sign = vi.fn<(input: NewSignature) => Promise<Problem | null>>();
  const element = () => fixture.nativeElement as HTMLElement;
  const boxes = () => [...element().querySelectorAll<HTMLInputElement>('input[type=checkbox]')];
  const complaint = () => element().querySelector('.complaint')?.textContent.trim() ?? '';

  async function submit(): Promise<void> {
    element().querySelector('form')?.dispatchEvent(new Event('submit'));
    await new Promise((resolve) => setTimeout(resolve));
    await fixture.whenStable();
  }

  async function type(selector: string, text: string): Promise<void> {
    const box = element().querySelector<HTMLInputElement>(`${selector} input`);
    if (box === null) throw new Error(`no ${selector}`);
    box.value = text;
    box.dispatchEvent(new Event('input'));
    await fixture.whenStable();
  }

  async function tickAll(): Promise<void> {
    for (const box of boxes()) box.click();
    await fixture.whenStable();
  }

  beforeEach(async () => {
    sign.mockReset().mockResolvedValue(null);
    load.set({ status: 'ready', value: terms });
    meaning.set('approved');
    const reader = { terms: load, meaning, changeCount: signal(2), sign, retry: () => undefined };
    TestBed.configureTestingModule({ providers: [{ provide: RevisionReader, useValue: reader }] });
    fixture = TestBed.createComponent(SigningForm);
    fixture.componentRef.setInput('revision', { letter: 'B', fileHash: 'f1' } as Revision);
    fixture.componentRef.setInput('comparedWith', 'A');
    fixture.componentRef.setInput('caseCount', 2);
    await fixture.whenStable();
  });

  it('says word for word what is signed', () => {
    const said = element().querySelector('.terms')?.textContent ?? '';
    for (const sentence of terms.sentences) expect(said).toContain(sentence);
  });

  it('sends nothing while a line, the password or the code is missing, and says which', async () => {
    await submit();
    expect(complaint()).toContain('Inputs compared with A, 2 changes seen');
    await tickAll();
    await submit();
    expect(complaint()).toContain('password');
    await type('app-password-field', 'a-long-password');
    await submit();
    expect(complaint()).toContain('code');
    expect(sign).not.toHaveBeenCalled();
  });

  it('signs the very terms that were shown, open comments included, and forgets the password', async () => {
    await tickAll();
    await type('app-password-field', 'a-long-password');
    await type('app-code-field', '123456');
    await submit();
    expect(sign).toHaveBeenCalledExactlyOnceWith({
      meaning: 'approved',
      token: 't1',
      password: 'a-long-password',
      code: '123456',
      despiteOpenComments: true,
    });
    expect(element().querySelector<HTMLInputElement>('app-password-field input')?.value).toBe('');
  });

  it('asks to read and tick anew when the terms have changed meanwhile', async () => {
    await tickAll();
    load.set({ status: 'ready', value: { ...terms, token: 't2', openComments: 2 } });
    await fixture.whenStable();
    expect(boxes().some(({ checked }) => checked)).toBe(false);
    expect(element().querySelector('.changed')?.textContent).toContain('has changed');
  });

  it('shows no terms of another revision', async () => {
    fixture.componentRef.setInput('revision', { letter: 'C', fileHash: 'f2' } as Revision);
    await fixture.whenStable();
    expect(element().querySelector('form')).toBeNull();
  });

  it('puts a refused password beside its field', async () => {
    const problem = { type: 'about:blank', title: 'The password is wrong.', status: 422 };
    const errors = [{ pointer: '/password', detail: 'This is not your present password.' }];
    sign.mockResolvedValueOnce({ ...problem, errors });
    await tickAll();
    await type('app-password-field', 'not-this-one');
    await type('app-code-field', '123456');
    await submit();
    expect(element().querySelector('app-password-field')?.textContent).toContain('not your present password');
    expect(element().querySelector('app-problem-banner')).toBeNull();
  });
});
