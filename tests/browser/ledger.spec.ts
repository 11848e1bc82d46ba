import { readFile } from 'node:fs/promises';
import AxeBuilder from '@axe-core/playwright';
import type { Download, Page } from '@playwright/test';
import { copyOfDemo, demoNetworkPath, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

interface Solved {
  readonly cases: readonly { readonly result?: { readonly traps: readonly { id: string; walk: string[] }[] } }[];
}

test('the ledger of the longest way prints on one sheet of A4 and of Letter', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await openLongest(page, network);
  for (const format of ['A4', 'Letter'] as const) {
    const pdf = await page.pdf({ format, landscape: true });
    expect(sheetsOf(pdf), format).toBe(1);
  }
  // from a phone as well: the figure is drawn for paper, not for the screen
  await page.setViewportSize({ width: 390, height: 844 });
  await page.waitForTimeout(300);
  expect(sheetsOf(await page.pdf({ format: 'A4', landscape: true }))).toBe(1);
});

test('its columns add up to the displayed digit in the file that is saved', async ({ page }) => {
  await signIn(page, 'designer');
  await openLongest(page, await demoNetworkPath(page));
  const csv = await readFile(await (await save(page, 'Ledger as CSV')).path(), 'utf8');
  const lines = csv
    .replace(/^\uFEFF/, '')
    .trim()
    .split(/\r?\n/)
    .map(cellsOf);
  const [head = [], ...rest] = lines;
  const end = rest.findIndex((line) => line[2] === 'Back pressure');
  const cents = (line: readonly string[] | undefined, title: string) => {
    const at = head.findIndex((cell) => cell.startsWith(title));
    return Math.round(Number(line?.[at] ?? '') * 100);
  };
  const [opening, closing] = [rest[0], rest[end]];
  const entries = rest.slice(1, end);
  let running = cents(opening, 'Running');
  for (const entry of entries) {
    running += cents(entry, 'Static') + cents(entry, 'Friction') + cents(entry, 'Flash psi');
    expect(cents(entry, 'Running')).toBe(running);
  }
  expect(cents(closing, 'Running')).toBe(running);
  for (const title of ['Static', 'Friction', 'Flash psi', 'Hand check adds'])
    expect(
      entries.reduce((sum, entry) => sum + cents(entry, title), 0),
      title,
    ).toBe(cents(closing, title));
  const xlsx = await save(page, 'Ledger as XLSX');
  expect(xlsx.suggestedFilename()).toMatch(/ledger\.xlsx$/);
  expect((await readFile(await xlsx.path())).subarray(0, 2).toString()).toBe('PK');
});

test('the lift profile is read by arrow keys and by the table, and saved as a drawing of its own', async ({ page }) => {
  await signIn(page, 'designer');
  await openLongest(page, await demoNetworkPath(page));
  const slider = page.getByRole('slider', { name: 'Place along the way' });
  await slider.focus();
  await page.keyboard.press('ArrowRight');
  await expect(slider).toHaveAttribute(
    'aria-valuetext',
    /^At the trap, into .*psig, credible .* to .*, by every method/,
  );
  await page.keyboard.press('End');
  await expect(slider).toHaveAttribute('aria-valuetext', /along the way, in /);
  await page.keyboard.press('Escape');
  await page.getByText('The profile’s numbers').click();
  const table = page.getByRole('region', { name: 'Numbers of the lift profile' }).getByRole('table');
  const points = Number(await slider.getAttribute('aria-valuemax')) + 1;
  // head, points, and the gauges on the way
  expect(await table.getByRole('row').count()).toBeGreaterThan(points);
  const svg = await readFile(await (await save(page, 'Lift profile as SVG')).path(), 'utf8');
  expect(svg).toContain('xmlns="http://www.w3.org/2000/svg"');
  expect(svg).not.toContain('class=');
  // it opens by itself, and nothing in it is black that was not
  const alone = await page.context().newPage();
  await alone.setContent(svg.replace(/^<\?xml.*\?>/, ''));
  expect(await alone.locator('svg text').count()).toBeGreaterThan(10);
  await alone.close();
  expect(svg).toContain('rgb(245, 230, 218)');
});

test('a long way goes on over the sheets, each with the head, what is carried and what is brought forward', async ({
  page,
}) => {
  await signIn(page, 'designer');
  for (const { pipes, sheets } of [
    { pipes: 11, sheets: 1 },
    { pipes: 12, sheets: 2 },
    { pipes: 40, sheets: 2 },
    { pipes: 70, sheets: 3 },
  ]) {
    await page.goto(`${await makeNetwork(page, longWay(pipes))}/ledger`);
    await savedAndSolved(page);
    await expect(page.getByRole('button', { name: 'Print' })).toBeEnabled({ timeout: 30_000 });
    for (const format of ['A4', 'Letter'] as const)
      expect(sheetsOf(await page.pdf({ format, landscape: true })), `${String(pipes)} pipes on ${format}`).toBe(sheets);
    await page.emulateMedia({ media: 'print' });
    await expect(page.getByText('Brought forward').filter({ visible: true })).toHaveCount(sheets - 1);
    // neither medium: a PDF would be made for the screen otherwise
    await page.emulateMedia({ media: null });
    await expect(page.getByText('Brought forward').filter({ visible: true })).toHaveCount(0);
  }
});

test('a stale ledger is neither printed nor saved, and says why', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Stale ledger');
  await openLongest(page, network);
  // the newest results do not come
  await page.route('**/results**', (route) => route.abort());
  await doubleLoad(page, network, 'TR1');
  await expect(page.getByRole('button', { name: 'Print' })).toBeDisabled({ timeout: 15_000 });
  await expect(page.getByRole('button', { name: 'Save as' })).toBeDisabled();
  await expect(page.getByText(/^No print and no file while the ledger is stale/)).toBeVisible();
  await page.emulateMedia({ media: 'print' });
  await expect(page.getByText('cannot be printed')).toBeVisible();
  await expect(page.locator('article')).toBeHidden();
});

test('without colour, in both themes, on a phone', async ({ page }) => {
  await signIn(page, 'designer');
  await openLongest(page, await demoNetworkPath(page));
  await page.evaluate(() => {
    window.print = () => {
      document.documentElement.dataset['printed'] =
        document.querySelector('.sheet.in-black') === null ? 'colour' : 'black';
    };
  });
  await page.getByRole('button', { name: 'Save as' }).click();
  await page.getByRole('menuitem', { name: 'Print in black only' }).click();
  await expect(page.locator('html')).toHaveAttribute('data-printed', 'black');
  await page.getByRole('button', { name: 'Print' }).click();
  await expect(page.locator('html')).toHaveAttribute('data-printed', 'colour');
  await page.getByText('The profile’s numbers').click();
  for (const width of [1440, 390, 320]) {
    await page.setViewportSize({ width, height: 844 });
    const overflow = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(overflow, `${String(width)} px`).toBeLessThanOrEqual(0);
  }
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page })
      .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
      .analyze();
    expect(
      violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`),
    ).toEqual([]);
  }
});

/** The ledger of the trap with the most pipes on its way, solved, with its bands. */
async function openLongest(page: Page, network: string): Promise<void> {
  const id = network.split('/').at(-1) ?? '';
  const solved = (await (await page.request.get(`/api/networks/${id}/results`)).json()) as Solved;
  const traps = solved.cases[0]?.result?.traps ?? [];
  const [longest] = [...traps].sort((a, b) => b.walk.length - a.walk.length);
  await page.goto(`${network}/ledger?element=${longest?.id ?? ''}`);
  await savedAndSolved(page);
  await expect(page.getByRole('button', { name: 'Print' })).toBeEnabled({ timeout: 30_000 });
}

async function save(page: Page, item: string): Promise<Download> {
  await page.getByRole('button', { name: 'Save as' }).click();
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('menuitem', { name: item }).click(),
  ]);
  return download;
}

/** Sheets of a PDF as its page tree says; Chromium writes page objects in the clear. */
function sheetsOf(pdf: Buffer): number {
  return pdf.toString('latin1').match(/\/Type\s*\/Page\b(?!s)/g)?.length ?? 0;
}

/** A trap, and so many pipes in a row to a receiver, rising a little in each third. */
function longWay(pipes: number): object {
  const node = (i: number) => `J${String(i)}`;
  return {
    format: 'riseback-network',
    version: 1,
    name: `Way of ${String(pipes)} pipes`,
    nodes: [
      { id: node(0), kind: 'trap', tag: 'TR-1', elevationM: 0, inletPressurePa: 1_135_000, loadKgS: 0.02 },
      ...Array.from({ length: pipes - 1 }, (_, i) => ({
        id: node(i + 1),
        kind: 'junction',
        elevationM: 0.1 * Math.floor((i + 1) / 3),
      })),
      { id: node(pipes), kind: 'receiver', tag: 'VR-1', elevationM: 0.1 * Math.floor(pipes / 3), vented: true },
    ],
    pipes: Array.from({ length: pipes }, (_, i) => ({
      id: `L${String(i)}`,
      from: node(i),
      to: node(i + 1),
      lengthM: 3.3,
      size: { nps: '2', schedule: '80' },
    })),
  };
}

async function makeNetwork(page: Page, file: object): Promise<string> {
  const site = (await demoNetworkPath(page)).replace(/\/networks\/.*/, '');
  const made = await page.request.post(`/api${site}/networks`, { headers: await token(page), data: file });
  expect(made.status()).toBe(201);
  return `${site}/networks/${((await made.json()) as { id: string }).id}`;
}

/** As from another window of the same person. */
async function doubleLoad(page: Page, network: string, trap: string): Promise<void> {
  const path = `/api/networks/${network.split('/').at(-1) ?? ''}`;
  const file = (await (await page.request.get(`${path}/file`)).json()) as { nodes: { id: string; loadKgS?: number }[] };
  const from = file.nodes.find(({ id }) => id === trap)?.loadKgS ?? 0;
  const etag = (await page.request.get(path)).headers()['etag'] ?? '';
  const batch = {
    batchId: crypto.randomUUID(),
    label: 'double a load',
    ops: [{ op: 'set', in: 'nodes', id: trap, key: 'loadKgS', from, to: 2 * from }],
  };
  const headers = { ...(await token(page)), 'If-Match': etag };
  expect((await page.request.post(`${path}/edits`, { headers, data: batch })).ok()).toBe(true);
}

async function token(page: Page): Promise<Record<string, string>> {
  const cookie = (await page.context().cookies()).find(({ name }) => name === 'XSRF-TOKEN');
  return { 'X-XSRF-TOKEN': decodeURIComponent(cookie?.value ?? '') };
}

/** The cells of a line of CSV; commas within quotes part nothing. */
function cellsOf(line: string): string[] {
  return [...`,${line}`.matchAll(/,(?:"((?:[^"]|"")*)"|([^",]*))/g)].map(([, quoted, plain]) => quoted ?? plain ?? '');
}
