import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import type { Download, Page } from '@playwright/test';
import readWorkbook from 'read-excel-file/node';
import { copyOfDemo, demoNetworkPath, signIn } from './people';
import { expect, test } from './violations';

const rowOf = (page: Page, name: string) => page.getByRole('listitem').filter({ hasText: name });

async function make(page: Page, format: string): Promise<void> {
  await page.getByRole('radio', { name: new RegExp(`^${format}`) }).check();
  await page.getByRole('button', { name: 'Make the report' }).click();
}

async function download(page: Page, name: string): Promise<Download> {
  const begun = page.waitForEvent('download');
  await page.getByRole('link', { name: `Download ${name}` }).click();
  return begun;
}

async function bytesOf(file: Download): Promise<Buffer> {
  return readFile(await file.path());
}

test('a viewer has a report made as a workbook and as a PDF, and finds both again after a reload', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Report to read');
  await signIn(page, 'viewer');
  await page.goto(`${network}/report`);
  await expect(page.getByRole('link', { name: 'Report', exact: true })).toHaveAttribute('aria-current', 'page');
  await expect(page.getByText('Draft', { exact: true })).toBeVisible();
  await expect(page.getByText('None in the last day.')).toBeVisible();

  await page.getByLabel('Further ledgers', { exact: true }).selectOption({ label: 'RT-3' });
  await expect(page.getByRole('button', { name: 'Without the ledger of RT-3' })).toBeVisible();
  await make(page, 'XLSX');
  const workbook = 'Report-to-read-working.xlsx';
  await expect(rowOf(page, workbook)).toContainText('Made');
  await expect(page.getByText(`${workbook} is made and can be downloaded.`)).toBeAttached();

  await test.step('what is downloaded is what the page says, and a draft', async () => {
    const file = await download(page, workbook);
    expect(file.suggestedFilename()).toBe(workbook);
    const bytes = await bytesOf(file);
    await expect(rowOf(page, workbook)).toContainText(createHash('sha256').update(bytes).digest('hex'));
    const sheets = await readWorkbook(bytes);
    for (const { data } of sheets) expect(String(data[0]?.[0])).toContain('DRAFT');
    const ledgers = sheets.find(({ sheet }) => sheet === 'Ledgers')?.data.map(([trap]) => trap);
    expect(ledgers).toContain('RT-3');
  });

  await make(page, 'PDF');
  const pdf = 'Report-to-read-working.pdf';
  await expect(rowOf(page, pdf)).toContainText('Made', { timeout: 30_000 });
  expect((await bytesOf(await download(page, pdf))).subarray(0, 5).toString()).toBe('%PDF-');

  await page.reload();
  for (const name of [workbook, pdf]) await expect(rowOf(page, name)).toContainText('Made');
});

test('a report that waits for a long solve says so and is called off, then made again', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await largeNetwork(page);
  await page.goto(`${network}/report`);
  const name = 'Long-solve-working.json';
  await page.getByRole('radio', { name: /^JSON/ }).check();
  await startLongSolve(page, network);
  await page.getByRole('button', { name: 'Make the report' }).click();
  await expect(page.getByRole('progressbar', { name: `Progress of ${name}` })).toBeVisible();
  await page.getByRole('button', { name: `Call off ${name}` }).click();
  await expect(rowOf(page, name)).toContainText('Called off');
  await page.getByRole('button', { name: `Make ${name} again` }).click();
  await expect(page.getByRole('link', { name: `Download ${name}` })).toBeVisible({ timeout: 60_000 });
});

test('without a connection the page says so, and what was refused says why', async ({ page, context }) => {
  await signIn(page, 'viewer');
  await page.goto(`${await demoNetworkPath(page)}/report`);
  await page.getByRole('radio', { name: /^CSV/ }).check();
  await context.setOffline(true);
  await expect(page.getByText('There is no connection.')).toBeVisible();
  await page.getByRole('button', { name: 'Make the report' }).click();
  await expect(page.getByRole('alert')).toContainText('The server cannot be reached');
  await context.setOffline(false);
  await expect(page.getByText('There is no connection.')).toBeHidden();
});

/** Some seconds of solving, in which a person can change their mind: halls of 40 pipes, in three cases. */
async function largeNetwork(page: Page): Promise<string> {
  const junctions = 1_200;
  const indices = Array.from({ length: junctions }, (_, i) => i);
  const path = (await demoNetworkPath(page)).replace(/\/[^/]*$/, '');
  const made = await page.request.post(`/api${path}`, {
    headers: await proof(page),
    data: {
      format: 'riseback-network',
      version: 1,
      name: 'Long solve',
      nodes: [
        { id: 'R', kind: 'receiver', elevationM: 4, pressurePa: 120_000 },
        ...indices.map((i) => ({ id: `J${i}`, kind: 'junction', elevationM: 0.5, position: { x: i, y: 0 } })),
        ...indices.map((i) => ({
          ...{ id: `T${i}`, kind: 'trap', elevationM: 1, position: { x: i, y: 40 } },
          ...{ inletPressurePa: 600_000, loadKgS: 0.01 },
        })),
      ],
      pipes: [
        ...indices.map((i) => ({
          ...{ id: `H${i}`, from: `J${i}`, insideDiameterM: 0.08 },
          ...(i % 20 === 0 ? { to: 'R', lengthM: 20 } : { to: `J${i - 1}`, lengthM: 8 }),
        })),
        ...indices.map((i) => ({ id: `B${i}`, from: `T${i}`, to: `J${i}`, lengthM: 3, insideDiameterM: 0.024 })),
      ],
      cases: ['a', 'b', 'c'].map((id) => ({ id, name: `Case ${id}` })),
    },
  });
  expect(made.status()).toBe(201);
  return `${path}/${((await made.json()) as { id: string }).id}`;
}

/** One edit that every pressure hangs on. */
async function startLongSolve(page: Page, network: string): Promise<void> {
  const edited = await page.request.post(`/api/networks/${network.split('/').at(-1) ?? ''}/edits`, {
    headers: { ...(await proof(page)), 'If-Match': '"1"' },
    data: {
      batchId: crypto.randomUUID(),
      label: 'raise the receiver’s pressure',
      ops: [{ op: 'set', in: 'nodes', id: 'R', key: 'pressurePa', from: 120_000, to: 125_000 }],
    },
  });
  expect(edited.status()).toBe(200);
}

async function proof(page: Page): Promise<Record<string, string>> {
  const token = (await page.context().cookies()).find((cookie) => cookie.name === 'XSRF-TOKEN')?.value ?? '';
  return { 'X-XSRF-TOKEN': decodeURIComponent(token) };
}
