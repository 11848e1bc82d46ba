import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { CaseOutcome, Problem, SolveResult } from '@riseback/contracts';
import { fromFile, NetworkFileShape, type NetworkDocument } from '@riseback/network';
import { isRefusal, solveNetwork } from '@riseback/solver';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { NetworkStore, type SolveState } from '../networks/network-store';
import { SessionStore } from '../session/session-store';
import { LedgerPage } from './ledger-page';

const FT = 0.3048;
/** Two traps under a lift of ten feet into a receiver at atmospheric pressure; the second one hangs at its foot with hardly any steam. */
const file = NetworkFileShape.parse({
  format: 'riseback-network',
  version: 1,
  name: 'One lift',
  nodes: [
    { id: 'T1', kind: 'trap', tag: 'TR-101', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
    { id: 'T2', kind: 'trap', tag: 'TR-102', elevationM: 0, inletPressurePa: 120_000, loadKgS: 0.01 },
    { id: 'T3', kind: 'trap', tag: 'TR-103', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.01 },
    { id: 'J0', kind: 'junction', elevationM: 0 },
    { id: 'J1', kind: 'junction', elevationM: 10 * FT },
    { id: 'R1', kind: 'receiver', elevationM: 10 * FT, pressurePa: 101_325 },
  ],
  pipes: [
    { id: 'L1', from: 'T1', to: 'J0', lengthM: 2, size: { nps: '1', schedule: '40' } },
    { id: 'L2', from: 'T2', to: 'J0', lengthM: 2, size: { nps: '1', schedule: '40' } },
    { id: 'L3', from: 'J0', to: 'J1', lengthM: 4, size: { nps: '1', schedule: '40' } },
    { id: 'L4', from: 'J1', to: 'R1', lengthM: 30, size: { nps: '1', schedule: '40' }, lossCoefficient: 5 },
  ],
});

function solved(): SolveResult {
  const outcome = solveNetwork(file, { partial: true });
  if (isRefusal(outcome)) throw new Error(outcome.problem.detail);
  return outcome as SolveResult;
}

function fakeStore() {
  const document = signal<NetworkDocument | null>(fromFile(file));
  const outcome = signal<CaseOutcome | null>({ caseId: '', status: 'solved', result: solved() });
  return {
    document,
    outcome,
    solveState: signal<SolveState>({ kind: 'solved', at: '2026-12-01T14:02:00.000Z', ms: 4, bandsToCome: false }),
    result: () => {
      const found = outcome();
      return found?.status === 'solved' ? found.result : null;
    },
    outcomes: () => new Map<string, CaseOutcome>(),
    finished: () => ({ finishedAt: '2026-12-01T14:02:00.000Z' }),
    units: () => ({ system: 'us', atmosphericPressurePa: 101_325 }) as const,
    topology: () => [],
    cases: () => [],
    caseName: () => '',
    showsWorst: () => false,
    network: () => ({ siteName: 'North works' }),
  };
}

describe('LedgerPage', () => {
  let store: ReturnType<typeof fakeStore>;
  let element: HTMLElement;
  const opened = async (wanted?: string) => {
    const fixture = TestBed.createComponent(LedgerPage);
    fixture.componentRef.setInput('element', wanted);
    await fixture.whenStable();
    element = fixture.nativeElement as HTMLElement;
    return fixture;
  };
  const text = (selector: string) => element.querySelector(selector)?.textContent.replace(/\s+/g, ' ').trim() ?? '';
  const printButton = () =>
    [...element.querySelectorAll('button')].find((button) => button.textContent.trim() === 'Print');

  beforeEach(() => {
    vi.stubGlobal(
      'ResizeObserver',
      class {
        observe(): void {}
        disconnect(): void {}
      },
    );
    store = fakeStore();
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        { provide: NetworkStore, useValue: store },
        { provide: SessionStore, useValue: { timeZone: () => 'UTC' } },
      ],
    });
  });

  it('opens at the trap that governs when none is chosen', async () => {
    await opened();
    expect(text('h1')).toBe('TR-102');
    expect(text('a[aria-current=true] .tag')).toBe('TR-102');
  });

  it('reads five psi of lift for ten feet, by the ledger and by hand', async () => {
    await opened('T1');
    const closing = [...element.querySelectorAll('tfoot td')].map((cell) => cell.textContent.trim());
    // columns: no, place and bore, length, rise, flow, flash %, static, friction, flash, running, bar, hand adds, hand running
    expect([closing[6], closing[11], closing[12]]).toEqual(['5.00', '5.00', '5.00']);
    expect(text('.hand-check')).toMatch(/^Hand check is \d\.\d\d psi lower: it leaves out .*flash steam/);
    expect(element.querySelectorAll('app-ledger-table tbody tr')).toHaveLength(4);
    expect(element.querySelector('app-lift-profile [role=img]')?.getAttribute('aria-label')).toContain(
      'with 10 ft lift',
    );
  });

  it('shows for a pipe the worst trap that drains through it', async () => {
    await opened('L1');
    expect(text('h1')).toBe('TR-101');
    await opened('L4');
    expect(text('h1')).toBe('TR-102');
  });

  it('reads the profile place by place with the keys', async () => {
    const fixture = await opened('T1');
    const reader = element.querySelector<HTMLElement>('[role=slider]');
    reader?.dispatchEvent(new KeyboardEvent('keydown', { key: 'End' }));
    await fixture.whenStable();
    expect(reader?.getAttribute('aria-valuetext')).toContain('in L4 1″, elevation 10 ft, 0.00 psig');
  });

  it('keeps the numbers when the network changes, says that they are stale and does not print them', async () => {
    const fixture = await opened('T1');
    expect(printButton()?.disabled).toBe(false);
    store.document.set({ ...fromFile(file), name: 'Changed', pipes: new Map() });
    store.solveState.set({ kind: 'solving' });
    await fixture.whenStable();
    expect(text('h1')).toBe('TR-101');
    expect(text('.stale-note')).toContain('Stale');
    expect(printButton()?.disabled).toBe(true);
    expect(element.querySelectorAll('app-ledger-table tbody tr')).toHaveLength(4);
  });

  it('says why a case has no account', async () => {
    const problem: Problem = {
      type: '/problems/not-available',
      title: 'Not available yet',
      status: 400,
      detail: 'state failedOpen of T1',
    };
    store.outcome.set({ caseId: '', status: 'refused', problem });
    await opened();
    expect(text('h1')).toBe('This network has no result, so no ledger');
    expect(text('app-findings-list')).toContain('state failedOpen of T1');
    expect(element.querySelector('app-ledger-table')).toBeNull();
  });

  it('shows the trap that governs to whoever asks for what is not there', async () => {
    await opened('gone');
    expect(text('h1')).toBe('Nothing by that name');
    expect(text('.notice a')).toBe('Show the trap that governs');
  });

  it('leads from a trap that was left out to what is against it', async () => {
    await opened('T3');
    expect(text('h1')).toBe('TR-103 has no ledger in this case');
    expect(text('app-findings-list')).toContain('Left out of the solve');
    expect(text('nav')).toContain('Not solved in this case');
  });

  it('tells an empty network what a ledger is', async () => {
    store.document.set({ ...fromFile(file), nodes: new Map() });
    store.outcome.set(null);
    await opened();
    expect(text('h1')).toBe('No traps yet');
  });
});
