// npm run screens: a picture of every screen in light, dark and phone width, in the folder screens/ (ignored by git).
//   --only WORD   just the screens whose name contains it
import { spawn } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { demandNode, ensureInstalled, root } from '../../server/install.mjs';

const { values: options } = parseArgs({ options: { only: { type: 'string' } } });
demandNode();
await ensureInstalled((line) => process.stdout.write(`${line}\n`));
const { chromium } = await import('@playwright/test');

const folder = join(root, 'screens');
const port = await freePort();
const address = `http://localhost:${port}`;
const database = mkdtempSync(join(tmpdir(), 'riseback-screens-'));
const server = spawn(process.execPath, ['server/start.mjs'], {
  cwd: root,
  env: { ...process.env, PORT: String(port), RISEBACK_DB: join(database, 'riseback.db') },
  stdio: 'inherit',
});

const looks = [
  { name: 'light', viewport: { width: 1440, height: 900 }, colorScheme: 'light' },
  { name: 'dark', viewport: { width: 1440, height: 900 }, colorScheme: 'dark' },
  { name: 'phone', viewport: { width: 390, height: 844 }, colorScheme: 'light' },
  { name: 'phone-dark', viewport: { width: 390, height: 844 }, colorScheme: 'dark' },
];

try {
  await answers(`${address}/readyz`);
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  const browser = await chromium.launch({
    executablePath: process.env.RISEBACK_CHROMIUM ?? '/usr/bin/chromium',
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
  // One sign-in for all looks: the server slows down guesses, and a person's session serves many windows.
  const first = await signedInContext(browser, 'designer');
  const signedIn = await first.storageState();
  const administrator = await (await signedInContext(browser, 'admin')).storageState();
  const demo = await demoNetwork(first);
  const empty = await emptyNetwork(first, demo.siteId);
  for (const { name, ...look } of looks) {
    const context = await browser.newContext({ ...look, storageState: signedIn });
    const anonymous = await browser.newContext(look);
    const administering = await browser.newContext({ ...look, storageState: administrator });
    for (const screen of screens(demo, empty)) {
      if (options.only !== undefined && !screen.name.includes(options.only)) continue;
      const whose = screen.anonymous ? anonymous : screen.administrator ? administering : context;
      const page = await whose.newPage();
      await page.goto(`${address}${screen.path}`);
      await page.waitForLoadState('networkidle');
      if (screen.act) await screen.act(page);
      if (screen.solved) await page.getByText(/^Solved \d\d:\d\d/).waitFor();
      await page.waitForTimeout(400);
      await page.screenshot({ path: join(folder, `${screen.name}-${name}.png`) });
      process.stdout.write(`screens/${screen.name}-${name}.png\n`);
      await page.close();
    }
    await context.close();
    await anonymous.close();
    await administering.close();
  }
  await browser.close();
} finally {
  server.kill('SIGTERM');
  rmSync(database, { recursive: true, force: true });
}

function screens({ siteId, networkId, elements }, empty) {
  const network = `/sites/${siteId}/networks/${networkId}`;
  return [
    { name: 'sign-in', path: '/sign-in', anonymous: true },
    { name: 'forgotten-password', path: '/forgotten-password', anonymous: true },
    { name: 'invitation-spent', path: `/invitation#${'A'.repeat(43)}`, anonymous: true },
    { name: 'sites', path: '/sites' },
    { name: 'networks', path: `/sites/${siteId}` },
    { name: 'people', path: `/sites/${siteId}/people`, administrator: true },
    { name: 'people-closed', path: `/sites/${siteId}/people` },
    { name: 'mails', path: `/sites/${siteId}/mails`, administrator: true, act: openFirstMail },
    { name: 'drawing', path: `${network}/drawing`, solved: true },
    { name: 'drawing-trap', path: `${network}/drawing?element=${elements.trap}`, solved: true },
    { name: 'drawing-pipe', path: `${network}/drawing?element=${elements.pipe}`, solved: true },
    { name: 'drawing-empty', path: `/sites/${siteId}/networks/${empty}/drawing` },
    { name: 'lists', path: `${network}/lists`, solved: true },
    { name: 'ledger', path: `${network}/ledger?element=${elements.trap}`, solved: true },
    { name: 'drawing-exchanger', path: `${network}/drawing?element=${elements.exchanger}`, solved: true },
    { name: 'try', path: `${network}/try`, solved: true },
    { name: 'gauges', path: `${network}/gauges`, solved: true },
    { name: 'gauges-empty', path: `/sites/${siteId}/networks/${empty}/gauges` },
    { name: 'reading', path: `${network}/gauges/reading` },
    { name: 'report', path: `${network}/report`, solved: true },
    { name: 'method', path: `${network}/method` },
    { name: 'method-section', path: `${network}/method#friction-friedel` },
    { name: 'revisions', path: `${network}/revisions` },
    { name: 'revisions-working', path: `${network}/revisions?revision=working` },
    { name: 'revisions-empty', path: `/sites/${siteId}/networks/${empty}/revisions` },
    { name: 'verification', path: `${network}/revisions/${elements.revision}/verification` },
    { name: 'frozen', path: `${network}/frozen/${elements.revision}/drawing`, solved: true },
    { name: 'cases', path: `${network}/cases?case=rt5open`, solved: true },
    { name: 'cases-compare', path: `${network}/cases?show=compare`, solved: true },
    { name: 'drawing-worst', path: `${network}/drawing?case=worst&element=${elements.trap}`, solved: true },
    { name: 'lists-pipes', path: `${network}/lists?list=pipes`, solved: true },
    { name: 'lists-vessels', path: `${network}/lists?list=vessels`, solved: true },
    { name: 'lists-trap-models', path: `${network}/lists?list=trap-models`, solved: true },
    { name: 'ledger-empty', path: `/sites/${siteId}/networks/${empty}/ledger` },
    { name: 'guide', path: '/sites', solved: true, act: beginGuide },
    { name: 'keys', path: `${network}/lists`, act: (page) => page.getByRole('button', { name: 'Help' }).press('?') },
    { name: 'tip', path: `${network}/drawing?element=${elements.trap}`, solved: true, act: openTip },
    { name: 'unreachable', path: '/sites', act: loseServer },
    { name: 'failed', path: '/sites', act: failServer },
    { name: 'account', path: '/account' },
    { name: 'library', path: `/sites/${siteId}/library` },
    { name: 'site-settings', path: `/sites/${siteId}/settings` },
    { name: 'not-found', path: '/nowhere' },
  ];
}

/** Where any came: the demo's own mails do. */
async function openFirstMail(page) {
  const mail = page.getByRole('region', { name: 'Received here' }).getByRole('link').first();
  if ((await mail.count()) > 0) await mail.click();
}

async function beginGuide(page) {
  await page.getByRole('button', { name: 'Help' }).click();
  await page.getByRole('menuitem', { name: 'Show me round' }).click();
  await page.getByRole('region', { name: 'Guide' }).getByRole('button', { name: 'Next' }).click();
}

async function openTip(page) {
  await page.getByRole('button', { name: 'credible band', exact: true }).focus();
}

async function loseServer(page) {
  await page.route('**/api/**', (route) => route.abort());
  await page.reload();
}

/** Who is asking is still answered, nothing else. */
async function failServer(page) {
  const problem = { type: 'about:blank', title: 'Something went wrong here', status: 500, detail: 'Try again soon.' };
  await page.route(/\/api\/sites/, (route) =>
    route.fulfill({ status: 500, contentType: 'application/problem+json', body: JSON.stringify(problem) }),
  );
  await page.reload();
}

async function signedInContext(browser, who) {
  const context = await browser.newContext();
  await context.request.post(`${address}/api/session`, {
    data: { email: `${who}@ternquay.example`, password: 'demo-tern-quay' },
  });
  return context;
}

async function demoNetwork(context) {
  const [site] = await json(context, '/api/sites');
  const [network] = await json(context, `/api/sites/${site.id}/networks`);
  const file = await json(context, `/api/networks/${network.id}/file`);
  const [revision] = await json(context, `/api/networks/${network.id}/revisions`);
  return {
    siteId: site.id,
    networkId: network.id,
    elements: {
      trap: file.nodes.find(({ tag }) => tag === 'BL-2').id,
      exchanger: file.nodes.find(({ service }) => service?.kind === 'modulating').id,
      pipe: file.pipes.find(({ route }) => route !== undefined).id,
      revision: revision?.id ?? 'none',
    },
  };
}

async function emptyNetwork(context, siteId) {
  const { cookies } = await context.storageState();
  const token = cookies.find(({ name }) => name === 'XSRF-TOKEN').value;
  const answer = await context.request.post(`${address}/api/sites/${siteId}/networks`, {
    headers: { 'X-XSRF-TOKEN': decodeURIComponent(token) },
    data: { format: 'riseback-network', version: 1, name: 'Empty sheet' },
  });
  return (await answer.json()).id;
}

async function json(context, path) {
  return (await context.request.get(`${address}${path}`)).json();
}

function freePort() {
  return new Promise((resolve) => {
    const probe = createServer().listen(0, () => {
      const { port: free } = probe.address();
      probe.close(() => resolve(free));
    });
  });
}

async function answers(url) {
  for (let attempt = 0; attempt < 240; attempt += 1) {
    if (server.exitCode !== null) throw new Error('The application did not start; its messages stand above.');
    const ready = await fetch(url).then(
      ({ ok }) => ok,
      () => false,
    );
    if (ready) return;
    await new Promise((resolve) => setTimeout(resolve, 1_000));
  }
  throw new Error('The application did not answer in four minutes.');
}
