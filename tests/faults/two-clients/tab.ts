import { HttpBackend, provideHttpClient } from '@angular/common/http';
import {
  createEnvironmentInjector,
  effect,
  EnvironmentInjector,
  runInInjectionContext,
  signal,
  untracked,
} from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { BrowserTestingModule, platformBrowserTesting } from '@angular/platform-browser/testing';
import { Session } from '@riseback/contracts';
import { vi } from 'vitest';
import { Company } from '../../../apps/web/src/app/networks/company';
import { DraftKeeper } from '../../../apps/web/src/app/networks/draft-keeper';
import { Drafts } from '../../../apps/web/src/app/networks/drafts';
import { EditQueue } from '../../../apps/web/src/app/networks/edit-queue';
import { NetworkApi } from '../../../apps/web/src/app/networks/network-api';
import { NetworkStore } from '../../../apps/web/src/app/networks/network-store';
import { UndoStack } from '../../../apps/web/src/app/networks/undo-stack';
import { SessionStore } from '../../../apps/web/src/app/session/session-store';
import { demoNetwork, signIn } from '../server-process';
import { keyRangeStandIn, locksStandIn } from './browser-storage';
import { DraftsOfTab } from './drafts-of-tab';
import type { Wire } from './wire';
import { WireEventSource } from './wire-event-source';

export interface TestPerson {
  readonly id: string;
  readonly name: string;
  readonly headers: Readonly<Record<string, string>>;
}

/**
 * One tab of one person: the client's own classes, joined as the network page joins them, without its pages. One that does not
 * hear opens no stream, of which a session has few.
 */
export class Tab {
  readonly store: NetworkStore;
  readonly queue: EditQueue;
  readonly keeper: DraftKeeper;
  private readonly drafts = new DraftsOfTab();
  private readonly injector: EnvironmentInjector;

  constructor(
    readonly person: TestPerson,
    readonly wire: Wire,
    private readonly networkId: string,
    { hears = true }: { readonly hears?: boolean } = {},
  ) {
    this.injector = createEnvironmentInjector(
      [
        NetworkStore,
        EditQueue,
        UndoStack,
        DraftKeeper,
        Company,
        NetworkApi,
        provideHttpClient(),
        { provide: HttpBackend, useValue: wire },
        { provide: Drafts, useValue: this.drafts },
        { provide: SessionStore, useValue: { person: signal(person), unitSystem: signal('si') } },
      ],
      TestBed.inject(EnvironmentInjector),
    );
    this.store = this.injector.get(NetworkStore);
    this.queue = this.injector.get(EditQueue);
    this.keeper = this.injector.get(DraftKeeper);
    const company = this.injector.get(Company);
    runInInjectionContext(this.injector, () => {
      effect(() => {
        if (this.store.network() === null || !hears) return;
        untracked(() => {
          WireEventSource.wire = wire;
          company.open(networkId);
        });
      });
      effect(() => {
        const solve = company.solveTold();
        if (solve !== null) untracked(() => this.store.hearOfSolve(solve));
      });
      effect(() => {
        if (company.reloadAsked() > 0) untracked(() => this.store.readOn());
      });
    });
  }

  /** Loads the network, and looks for what earlier tabs left behind. */
  async open(): Promise<void> {
    this.keeper.open(this.networkId);
    this.store.open(this.networkId);
    await until(() => this.store.document() !== null || this.store.problem() !== null, 'the network is loaded');
    if (this.store.document() === null) throw new Error(JSON.stringify(this.store.problem()));
  }

  setOnline(online: boolean): void {
    this.wire.online = online;
    // as the page does at the browser's own event
    if (online && this.store.saveState() === 'notSaved') this.store.retrySave();
  }

  /** Ends the tab as it stands; its last words, if it has any, are drafts. */
  async close(politely: boolean): Promise<void> {
    if (politely) this.keeper.flush();
    await soon();
    this.drafts.dead = true;
    this.wire.dead = true;
    this.injector.destroy();
    await soon();
  }
}

/** Lets promises that wait for nothing outside run. */
export function soon(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve));
}

export async function until(holds: () => boolean, what: string, withinMs = 20_000): Promise<void> {
  for (const late = Date.now() + withinMs; !holds();) {
    if (Date.now() > late) throw new Error(`Not within ${withinMs} ms: ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
}

/** Angular and what it needs of a browser, for all tabs of a test. */
export function prepareBrowser(): void {
  TestBed.initTestEnvironment(BrowserTestingModule, platformBrowserTesting());
  vi.stubGlobal('EventSource', WireEventSource);
  vi.stubGlobal('IDBKeyRange', keyRangeStandIn);
  Object.defineProperty(navigator, 'locks', { value: locksStandIn, configurable: true });
}

export async function personOf(address: string, name: string): Promise<TestPerson> {
  const headers = await signIn(address, name);
  const { person } = Session.parse(await (await fetch(`${address}/api/session`, { headers })).json());
  return { id: person.id, name: person.name, headers };
}

/** A new network at the demo's site. */
export async function createNetwork(address: string, { headers }: TestPerson, file: object): Promise<string> {
  const { siteId } = await demoNetwork(address, headers);
  const made = await fetch(`${address}/api/sites/${siteId}/networks`, {
    method: 'POST',
    headers,
    body: JSON.stringify(file),
  });
  if (made.status !== 201) throw new Error(`making a network was answered ${made.status}`);
  return ((await made.json()) as { id: string }).id;
}
