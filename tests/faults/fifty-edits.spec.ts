// @vitest-environment jsdom
import '@angular/compiler';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type EditOp, setOp, toFile } from '@riseback/network';
import { afterAll, afterEach, beforeAll, beforeEach, expect, it, vi } from 'vitest';
import { START } from '../../apps/web/src/app/networks/testing/random-deeds';
import { startServer, type ServerProcess } from './server-process';
import { createNetwork, personOf, prepareBrowser, Tab, until } from './two-clients/tab';
import { Wire } from './two-clients/wire';

vi.mock('idb', async () => (await import('./two-clients/browser-storage')).idbStandIn);

const TABS = 50;
const NODE = 'N1';

let folder = '';
let server: ServerProcess;
let tabs: Tab[] = [];
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-fifty-'));
  prepareBrowser();
  server = await startServer(join(folder, 'riseback.db'));
});
afterAll(() => {
  server.child.kill('SIGKILL');
  vi.unstubAllGlobals();
  rmSync(folder, { recursive: true, force: true });
});

beforeEach(async () => {
  const people = [await personOf(server.address, 'designer'), await personOf(server.address, 'admin')];
  const networkId = await createNetwork(server.address, present(people[0]), toFile(START));
  const receipts = { sent: new Map<string, unknown>(), versions: new Map<string, number>() };
  tabs = Array.from({ length: TABS }, (_, index) => {
    const person = present(people[index % people.length]);
    return new Tab(person, new Wire(server, person.headers, receipts), networkId, { hears: false });
  });
  await Promise.all(tabs.map((tab) => tab.open()));
});
afterEach(async () => {
  await Promise.all(tabs.map((tab) => tab.close(true)));
});

/** All on version 1, at the same time. */
async function editAllAtOnce(opOf: (tab: Tab, index: number) => EditOp): Promise<void> {
  for (const [index, tab] of tabs.entries()) expect(tab.store.edit(`edit ${index}`, [opOf(tab, index)])).toBe(true);
  await until(() => tabs.every(({ store }) => store.saveState() !== 'saving'), 'all are answered', 60_000);
}

const elevationOf = ({ store }: Tab) => present(store.document()).nodes.get(NODE)?.value.elevationM;

it('saves one of fifty changes of one property on one version; each other author sees their own beside it', async () => {
  await editAllAtOnce(({ store }, index) => setOp(present(store.document()), 'nodes', NODE, 'elevationM', 100 + index));
  expect(tabs.map(({ queue }) => queue.version())).toEqual(tabs.map(() => 2));
  const won = new Set(tabs.map(elevationOf));
  expect(won.size).toBe(1);
  for (const [index, { store }] of tabs.entries()) {
    const own = 100 + index;
    const mine = won.has(own) ? [] : [{ before: { value: 1 }, mine: { there: true, value: own } }];
    expect(store.conflicts()).toMatchObject(mine);
    expect(store.conflicts()).toHaveLength(mine.length);
  }
});

it('saves all of fifty changes of different elements on one version', { timeout: 120_000 }, async () => {
  const ordinal = (index: number) => 100 + index;
  await editAllAtOnce((_tab, index) => ({
    op: 'add',
    in: 'nodes',
    ordinal: ordinal(index),
    value: { id: `X${index}`, kind: 'junction', elevationM: index },
  }));
  await Promise.all(tabs.map(({ queue }) => queue.readOn()));
  for (const { store, queue } of tabs) {
    expect(queue.version()).toBe(TABS + 1);
    expect(queue.unsaved()).toBeNull();
    const { nodes } = present(store.document());
    expect(Array.from({ length: TABS }, (_, index) => nodes.get(`X${index}`)?.value.elevationM)).toEqual(
      Array.from({ length: TABS }, (_, index) => index),
    );
  }
});

function present<T>(value: T | null | undefined): T {
  if (value === null || value === undefined) throw new Error('nothing is there');
  return value;
}
