import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { describe, expect, it } from 'vitest';
import { BANDS_TO_COME } from '../bands-to-come';
import { type Status, StatusMark } from './status-mark';

async function wordsOf(inputs: { status: Status; word?: string; final?: boolean }, toCome: boolean): Promise<string> {
  TestBed.resetTestingModule();
  TestBed.configureTestingModule({ providers: [{ provide: BANDS_TO_COME, useValue: signal(toCome) }] });
  const fixture = TestBed.createComponent(StatusMark);
  for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
  await fixture.whenStable();
  return (fixture.nativeElement as HTMLElement).textContent.trim();
}

describe('StatusMark', () => {
  it('says its verdict in a word, or another word given', async () => {
    expect(await wordsOf({ status: 'pass' }, false)).toBe('Pass');
    expect(await wordsOf({ status: 'watch', word: '3 watch' }, false)).toBe('3 watch');
  });

  it('while bands are to come, says of all that they may still change that it holds so far', async () => {
    expect(await wordsOf({ status: 'pass' }, true)).toBe('Pass so far');
    expect(await wordsOf({ status: 'watch' }, true)).toBe('Watch so far');
    // a band betters no verdict, and what does not look at the back pressure knows no band
    expect(await wordsOf({ status: 'fail' }, true)).toBe('Fail');
    expect(await wordsOf({ status: 'pass', final: true }, true)).toBe('Pass');
    expect(await wordsOf({ status: 'none' }, true)).toBe('Not checked');
  });
});
