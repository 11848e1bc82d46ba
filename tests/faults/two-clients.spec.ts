// @vitest-environment jsdom
import '@angular/compiler';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Network, SavedBatch } from '@riseback/contracts';
import { applyBatch, type NetworkDocument, toFile } from '@riseback/network';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { toDocument } from '../../apps/web/src/app/networks/stored-document';
import { DEEDS, opsOf, START } from '../../apps/web/src/app/networks/testing/random-deeds';
import { startServer, type ServerProcess } from './server-process';
import { FULL, randomFrom, seedOfRun } from './test-form';
import { DRAFT_WITHIN_MS, Ledger, numbersSaved } from './two-clients/ledger';
import { createNetwork, personOf, prepareBrowser, Tab, until } from './two-clients/tab';
import { type Receipts, type Server, Wire } from './two-clients/wire';

vi.mock('idb', async () => (await import('./two-clients/browser-storage')).idbStandIn);

const STEPS = FULL ? 500 : 60;
/** Each run by two people, and each by one person in two tabs. */
const RUNS = FULL ? 3 : 1;
/** The client waits a quarter of a second and more between its tries; here it has less patience. */
const HURRY = 25;

let folder = '';
let child: ServerProcess | undefined;
const server: Server = { address: null };

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-two-'));
  prepareBrowser();
  const plain = globalThis.setInterval;
  vi.stubGlobal('setInterval', (act: () => void, ms = 0) => plain(act, ms < 200 ? ms : ms / HURRY));
});
afterAll(() => {
  child?.child.kill('SIGKILL');
  vi.unstubAllGlobals();
  rmSync(folder, { recursive: true, force: true });
});

interface Trial {
  readonly networkId: string;
  /** As the server made it: version 1. */
  readonly start: NetworkDocument;
  readonly databasePath: string;
  readonly random: () => number;
  readonly ledger: Ledger;
  readonly receipts: Receipts;
  readonly tabs: Tab[];
  readonly counts: Map<string, number>;
}

/** What may happen next, as often as it stands here. */
const STEPS_KINDS = [
  ...Array<'edit'>(16).fill('edit'),
  ...Array<'undo'>(5).fill('undo'),
  ...Array<'redo'>(3).fill('redo'),
  ...Array<'choose'>(4).fill('choose'),
  ...Array<'offline'>(2).fill('offline'),
  ...Array<'online'>(4).fill('online'),
  'lostAnswer',
  'slow',
  'retry',
  'retry',
  'crash',
  'reload',
  'bringIn',
  'bringIn',
  'leaveOut',
  'killServer',
  ...Array<'startServer'>(3).fill('startServer'),
] as const;
type Step = (typeof STEPS_KINDS)[number];

it.each(Array.from({ length: 2 * RUNS }, (_, index) => ({ run: index + 1, people: index % 2 === 0 ? 2 : 1 })))(
  'holds everything that $people typed at once, through lost networks, crashed tabs and killed servers, run $run',
  async ({ run, people }) => {
    const trial = await begin(run, people);
    for (let step = 0; step < STEPS; step += 1) {
      const tab = pickOf(trial, [0, 1]);
      const kind = pickOf(trial, STEPS_KINDS);
      await take(trial, kind, tab);
      for (const each of trial.tabs) trial.ledger.look(each, `at step ${step}, ${kind} of tab ${tab}`);
      await pause(trial);
    }
    await comeToRest(trial);
    await demandSameEverywhere(trial);
    for (const tab of trial.tabs) await tab.close(true);
    child?.child.kill('SIGKILL');
    await child?.ended();
  },
  FULL ? 1_200_000 : 120_000,
);

async function begin(run: number, people: number): Promise<Trial> {
  const random = randomFrom(seedOfRun(`two clients, run ${run}`) + run);
  const databasePath = join(folder, `run-${run}.db`);
  // of a run that has failed
  child?.child.kill('SIGKILL');
  child = await startServer(databasePath);
  server.address = child.address;
  const designer = await personOf(child.address, 'designer');
  const other = people === 2 ? await personOf(child.address, 'admin') : designer;
  const networkId = await createNetwork(child.address, designer, toFile(START));
  const receipts: Receipts = { sent: new Map(), versions: new Map() };
  const ledger = new Ledger();
  const tabs = [designer, other].map(
    (person) => new Tab(person, new Wire(server, person.headers, receipts), networkId),
  );
  for (const tab of tabs) await tab.open();
  const start = present(tabOf({ tabs }, 0).store.document());
  return { networkId, start, databasePath, random, ledger, receipts, tabs, counts: new Map() };
}

async function take(trial: Trial, step: Step, index: number): Promise<void> {
  const { ledger, random, tabs } = trial;
  const tab = tabOf(trial, index);
  const { store, keeper, wire } = tab;
  let done = true;
  switch (step) {
    case 'edit':
      ledger.deed(tab, 'edit', () => edit(trial, tab));
      break;
    case 'undo':
      ledger.deed(tab, 'undo', () => undoAndPerhapsRedo(trial, tab));
      break;
    case 'redo':
      ledger.deed(tab, 'redo', () => {
        done = store.redo() !== null;
      });
      break;
    case 'choose': {
      const open = store.conflicts();
      const mine = open.filter(() => random() < 0.5);
      const theirs = open.filter((conflict) => !mine.includes(conflict) && random() < 0.8);
      done = open.length > 0;
      ledger.deed(tab, 'choose', () => void store.settle(mine, theirs));
      break;
    }
    case 'offline':
      tab.setOnline(false);
      break;
    case 'online':
      done = !wire.online;
      tab.setOnline(true);
      break;
    case 'lostAnswer':
      wire.answersToLose += 1 + Math.floor(random() * 3);
      break;
    case 'slow':
      wire.delayMs = random() < 0.5 ? 0 : Math.floor(random() * 80);
      break;
    case 'retry':
      done = store.saveState() === 'notSaved';
      if (done) store.retrySave();
      break;
    case 'crash':
    case 'reload':
      // a tab does not come back before its network does
      done = wire.online && server.address !== null;
      if (done) tabs[index] = await replace(trial, tab, step === 'reload');
      break;
    case 'bringIn': {
      const [offer] = keeper.offered();
      done = offer !== undefined;
      if (offer !== undefined) await keeper.bringIn(offer);
      break;
    }
    case 'leaveOut': {
      const [offer] = keeper.offered();
      done = offer !== undefined && random() < 0.3;
      if (offer === undefined || !done) break;
      ledger.look(tab);
      await keeper.leaveOut(offer);
      ledger.givenUp(tab);
      break;
    }
    case 'killServer':
      done = server.address !== null && random() < 0.5;
      if (done) await killServer();
      break;
    case 'startServer':
      done = server.address === null;
      if (done) await restartServer(trial);
  }
  if (done) trial.counts.set(step, (trial.counts.get(step) ?? 0) + 1);
}

function edit({ random, ledger }: Trial, { store }: Tab): void {
  const document = present(store.document());
  const whole = 1 + Math.floor(random() * 5);
  // now and then two type the same value
  const value = random() < 0.8 ? ledger.freshValue(whole) : whole;
  const what = DEEDS[Math.floor(random() * DEEDS.length)] ?? 'set';
  const ops = opsOf(document, { what, pick: Math.floor(random() * 1_000), value });
  store.edit(what, ops);
}

/** One step back; or back and forth in one breath, which must change nothing. */
function undoAndPerhapsRedo({ random }: Trial, { store, queue }: Tab): void {
  const before = store.document();
  const undone = store.undo();
  if (undone === null || random() < 0.7) return;
  if (store.redo() !== null) expect(store.document()).toEqual(before);
  expect(queue.pendingCount()).toBeGreaterThan(0);
}

/** The tab is gone, and its person opens another one, which may offer what the first left on the device. */
async function replace({ ledger, networkId, receipts }: Trial, tab: Tab, politely: boolean): Promise<Tab> {
  ledger.look(tab);
  const at = politely ? Number.POSITIVE_INFINITY : Date.now();
  await tab.close(politely);
  const next = new Tab(tab.person, new Wire(server, tab.person.headers, receipts), networkId);
  await next.open();
  ledger.crashed(tab, next, at);
  return next;
}

async function killServer(): Promise<void> {
  server.address = null;
  child?.child.kill('SIGKILL');
  await child?.ended();
}

async function restartServer({ databasePath }: Trial): Promise<void> {
  child = await startServer(databasePath);
  server.address = child.address;
}

/** Mostly at once, so that much is under way together; sometimes long enough for a draft to be due. */
async function pause({ random }: Trial): Promise<void> {
  const kind = random();
  if (kind < 0.4) return;
  await new Promise((resolve) => setTimeout(resolve, kind < 0.97 ? random() * 50 : DRAFT_WITHIN_MS + 50));
}

/** Every network up, every draft brought in, every choice made, everything saved. */
async function comeToRest(trial: Trial): Promise<void> {
  if (server.address === null) await restartServer(trial);
  for (const tab of trial.tabs) {
    tab.wire.delayMs = 0;
    tab.wire.answersToLose = 0;
    tab.setOnline(true);
  }
  const restless = () =>
    trial.tabs.filter(({ queue, keeper }) => queue.unsaved() !== null || keeper.offered().length > 0);
  await until(() => settled(trial), 'the requests of the steps are over');
  for (let round = 0; restless().length > 0; round += 1) {
    if (round > 40) throw new Error('the clients do not come to rest');
    for (const tab of restless()) {
      const { store, keeper } = tab;
      trial.ledger.look(tab, 'before bringing in');
      for (const offer of keeper.offered()) await keeper.bringIn(offer);
      trial.ledger.look(tab, 'bringing in at the end');
      if (store.saveState() === 'notSaved') store.retrySave();
      const mine = store.conflicts().filter(() => trial.random() < 0.5);
      trial.ledger.deed(tab, 'choose', () => {
        const unfit = store.settle(mine, store.conflicts());
        if (unfit.length > 0) store.settle([], unfit);
      });
      await until(() => store.saveState() !== 'saving', 'a save ends');
    }
    for (const tab of trial.tabs) trial.ledger.look(tab);
  }
}

function settled({ tabs }: Trial): boolean {
  return tabs.every(({ store }) => store.saveState() !== 'saving');
}

/** The server, both clients and the reference model hold one document, and the ledger balances. */
async function demandSameEverywhere({ networkId, start, tabs, ledger, receipts, counts }: Trial): Promise<void> {
  const get = async (path: string): Promise<unknown> => {
    const answer = await fetch(`${server.address}/api/networks/${networkId}${path}`, {
      headers: tabOf({ tabs }, 0).person.headers,
    });
    return answer.json();
  };
  const network = Network.parse(await get(''));
  const history: SavedBatch[] = [];
  for (let version = 1; version < network.version; version = history.at(-1)?.version ?? network.version)
    history.push(...SavedBatch.array().parse(await get(`/edits?since=${version}`)));
  await until(() => tabs.every(({ queue }) => queue.version() === network.version), 'both have the newest version');

  // the reference model: what was saved, one batch after the other, on what there was in the beginning
  const model = history.reduce<NetworkDocument>((document, { ops }) => {
    const applied = applyBatch(document, ops);
    if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
    return applied.document;
  }, start);
  expect(toDocument(network.document)).toEqual(model);
  for (const { store } of tabs) expect(store.document()).toEqual(model);

  expect(history.map(({ version }) => version)).toEqual(history.map((_, index) => index + 2));
  const versions = new Map(history.map(({ batchId, version }) => [batchId, version]));
  expect(versions.size).toBe(history.length);
  for (const [batchId, version] of receipts.versions) expect(versions.get(batchId)).toBe(version);
  for (const { batchId, label, ops } of history) expect(receipts.sent.get(batchId)).toEqual({ batchId, label, ops });

  const saved = numbersSaved(history.flatMap(({ ops }) => ops));
  const dropped = [...ledger.owed]
    .filter(([value]) => !saved.has(value))
    .map(([value, how]) => [value, how, ledger.trailOf(value)]);
  expect(dropped).toEqual([]);
  const did = [...counts].map(([step, count]) => `${count} ${step}`).join(', ');
  process.stdout.write(
    `${history.length} batches saved, ${ledger.typed} values typed, ${ledger.excused.size} younger than a draft; ${did}\n`,
  );
}

function pickOf<T>({ random }: Trial, choices: readonly T[]): T {
  return present(choices[Math.floor(random() * choices.length)]);
}

function tabOf({ tabs }: Pick<Trial, 'tabs'>, index: number): Tab {
  return present(tabs[index]);
}

function present<T>(value: T | null | undefined): T {
  if (value === null || value === undefined) throw new Error('nothing is there');
  return value;
}
