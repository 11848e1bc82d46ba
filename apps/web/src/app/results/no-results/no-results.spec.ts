import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { describe, expect, it, vi } from 'vitest';
import { NetworkStore, type SolveState } from '../../networks/network-store';
import { NoResults } from './no-results';

const PROBLEM = {
  type: 'about:blank',
  title: 'The solve took too long',
  status: 200,
  detail: 'It was ended after 10 s.',
};

async function shown(state: SolveState, askResultsAgain = vi.fn()): Promise<HTMLElement> {
  const solveState = signal(state);
  TestBed.configureTestingModule({
    providers: [{ provide: NetworkStore, useValue: { solveState, askResultsAgain } }],
  });
  const fixture = TestBed.createComponent(NoResults);
  await fixture.whenStable();
  return fixture.nativeElement as HTMLElement;
}

describe('NoResults', () => {
  it('says why there are no results, and asks again', async () => {
    const askResultsAgain = vi.fn();
    const page = await shown({ kind: 'failed', problem: PROBLEM }, askResultsAgain);
    expect(page.querySelector('[role=alert]')?.textContent).toContain('It was ended after 10 s.');
    page.querySelector('button')?.click();
    expect(askResultsAgain).toHaveBeenCalledOnce();
  });

  it('is silent while results are there or on their way', async () => {
    expect((await shown({ kind: 'solving' })).textContent).toBe('');
  });
});
