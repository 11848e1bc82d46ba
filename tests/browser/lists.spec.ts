import { readFile } from 'node:fs/promises';
import AxeBuilder from '@axe-core/playwright';
import type { Download, Page } from '@playwright/test';
import { demoNetworkPath, openEmptyNetwork, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

test.use({ permissions: ['clipboard-read', 'clipboard-write'] });

const grid = (page: Page) => page.getByRole('grid');
const preview = (page: Page) => page.getByRole('dialog');

/** Copies cells as a spreadsheet does and pastes them into the list by the keyboard. */
async function paste(page: Page, text: string): Promise<void> {
  await page.evaluate((cells) => navigator.clipboard.writeText(cells), text);
  await grid(page).focus();
  await page.keyboard.press('Control+V');
  await expect(preview(page)).toBeVisible();
}

async function openList(page: Page, path: string, list: string): Promise<void> {
  await page.goto(`${path}/lists?list=${list}`);
  await expect(grid(page)).toBeVisible();
}

async function networkFile(
  page: Page,
  path: string,
): Promise<{ nodes: PastedNode[]; pipes: unknown[]; gauges: unknown[] }> {
  const id = path.split('/').at(-1) ?? '';
  return (await (await page.request.get(`/api/networks/${id}/file`)).json()) as never;
}
interface PastedNode {
  readonly id: string;
  readonly tag?: string;
  readonly position: { readonly x: number; readonly y: number };
}

async function saved(page: Page, item: string): Promise<Download> {
  await page.getByRole('button', { name: 'CSV or XLSX', exact: true }).click();
  const download = page.waitForEvent('download');
  await page.getByRole('menuitem', { name: item }).click();
  return download;
}

async function bytesOf(download: Download): Promise<Buffer> {
  return readFile(await download.path());
}

async function expectNoFindings(page: Page): Promise<void> {
  for (const colorScheme of ['dark', 'light'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html ?? ''}`)).toEqual([]);
  }
}

test('a network of 300 elements is built from pasted lists and placed by the keyboard alone', async ({ page }) => {
  await signIn(page, 'designer');
  await openEmptyNetwork(page, 'From a spreadsheet');
  const path = new URL(page.url()).pathname.replace(/\/drawing.*/, '');
  const HEADERS = 30;
  const TRAPS = 120;
  const take = async (): Promise<void> => {
    // the focus is in the preview; its button is the form's own, so Enter in a field or on it will do
    await preview(page)
      .getByRole('button', { name: /^Add \d+/ })
      .focus();
    await page.keyboard.press('Enter');
    await expect(preview(page)).toHaveCount(0);
  };

  await openList(page, path, 'vessels');
  await paste(page, 'Tag\tKind\tElevation, ft\nVR-1\tReceiver\t2');
  await take();
  await openList(page, path, 'junctions');
  const headers = Array.from({ length: HEADERS }, (_, i) => `H-${String(i + 1)}\t12`);
  await paste(page, ['Tag\tElevation, ft', ...headers].join('\n'));
  await take();
  await openList(page, path, 'traps');
  const traps = Array.from(
    { length: TRAPS },
    (_, i) => `TR-${String(i + 1)}\t5\t75\t${String(100 + i)}\tFloat-thermostatic`,
  );
  await paste(page, ['Tag\tElevation, ft\tInlet, psig\tLoad, lb/h\tType', ...traps].join('\n'));
  await take();
  await savedAndSolved(page).catch(() => undefined);
  const placed = (await networkFile(page, path)).nodes;
  await openList(page, path, 'pipes');
  const along = Array.from(
    { length: HEADERS },
    (_, i) => `CR-${String(i + 1)}\tH-${String(i + 1)}\t${i === 0 ? 'VR-1' : `H-${String(i)}`}\t20\t6\t40`,
  );
  const runs = Array.from(
    { length: TRAPS },
    (_, i) => `CR-${String(i + 101)}\tTR-${String(i + 1)}\tH-${String((i % HEADERS) + 1)}\t10\t1\t80`,
  );
  await paste(page, ['Tag\tFrom\tTo\tLength, ft\tSize\tSchedule', ...along, ...runs].join('\n'));
  await preview(page)
    .getByRole('checkbox', { name: /^Lay out along these pipes/ })
    .focus();
  await page.keyboard.press('Space');
  await take();
  await savedAndSolved(page);

  const { nodes, pipes } = await networkFile(page, path);
  expect(nodes.length + pipes.length).toBe(1 + HEADERS + TRAPS + HEADERS + TRAPS);
  const spots = new Set(nodes.map(({ position }) => `${String(position.x)},${String(position.y)}`));
  expect(spots.size).toBe(nodes.length);
  // laid out anew, since none had a pipe; undone as one step with the pipes
  expect(nodes).not.toEqual(placed);
  await page.getByRole('button', { name: 'Undo' }).press('Enter');
  await expect(page.getByRole('tab', { name: /Pipes 0/ })).toBeVisible();
  await expect(page.getByText('Saved', { exact: true })).toBeVisible();
  expect((await networkFile(page, path)).nodes).toEqual(placed);
  await page.getByRole('button', { name: 'Redo' }).press('Enter');
  await savedAndSolved(page);
  await page.goto(`${path}/drawing`);
  await expect(page.getByRole('application')).toBeVisible();
  await expect(page.getByText(/^Solved \d\d:\d\d/)).toBeVisible();
});

test('500 rows are pasted in under two seconds and taken back in one step', async ({ page }) => {
  await signIn(page, 'designer');
  await openEmptyNetwork(page, 'Five hundred');
  const path = new URL(page.url()).pathname.replace(/\/drawing.*/, '');
  await openList(page, path, 'traps');
  const rows = Array.from(
    { length: 500 },
    (_, i) => `T-${String(i + 1)}\tHall\t5\t75\t${String(100 + i)}\tInverted bucket\t3\tConstant`,
  );
  await page.evaluate(
    (cells) => navigator.clipboard.writeText(cells),
    ['Tag\tArea\tElevation\tInlet\tLoad\tType\tSizing factor\tService', ...rows].join('\n'),
  );
  await grid(page).focus();
  const started = Date.now();
  await page.keyboard.press('Control+V');
  await expect(preview(page).getByText('500 rows: 500 new')).toBeVisible();
  const shownMs = Date.now() - started;
  await preview(page).getByRole('button', { name: 'Add 500 traps' }).focus();
  const takenAt = Date.now();
  await page.keyboard.press('Enter');
  await expect(page.getByRole('tab', { name: /Traps 500/ })).toBeVisible();
  const listedMs = Date.now() - takenAt;
  await expect(page.getByText('Saved', { exact: true })).toBeVisible();
  const savedMs = Date.now() - takenAt;
  process.stdout.write(
    `500 rows: preview ${String(shownMs)} ms, in the list ${String(listedMs)} ms, saved ${String(savedMs)} ms\n`,
  );
  // two seconds is the bar on a quiet machine; a shared one gets three times as much
  expect(shownMs + listedMs).toBeLessThan(6_000);
  await page.getByRole('button', { name: 'Undo' }).click();
  await expect(page.getByRole('tab', { name: /Traps 0/ })).toBeVisible();
});

test('bad cells are named, mended or left out, and nothing is taken before', async ({ page }) => {
  await signIn(page, 'designer');
  const path = await demoNetworkPath(page);
  await openList(page, path, 'traps');
  await paste(page, 'Tag\tLoad, kg/h\tType\tRemarks\nRT-1\t400\tbell\tx\nRT-2\t75 ft\t\t\nNEW-1\t5\t\t');
  const dialog = preview(page);
  await expect(dialog.getByText('3 rows: 3 not taken')).toBeVisible();
  await expect(dialog.getByText('Not read: Remarks')).toBeVisible();
  await expectNoFindings(page);

  await dialog.getByRole('button', { name: 'Go to the first bad cell' }).click();
  await expect(dialog.getByRole('textbox', { name: 'Type of RT-1' })).toBeFocused();
  await page.keyboard.type('Thermodynamic');
  await page.keyboard.press('Tab');
  await expect(dialog.getByText('3 rows: 1 changed, 2 not taken')).toBeVisible();
  await expect(dialog.getByText('ft is a length')).toBeVisible();
  await dialog.getByRole('button', { name: 'Leave out Load of RT-2' }).click();
  await expect(dialog.getByText(/Elevation is missing: a new trap needs it/)).toBeVisible();
  await dialog.getByRole('button', { name: 'Leave out row 4' }).first().click();
  await expect(dialog.getByText('3 rows: 1 changed, 1 as they are, 1 left out')).toBeVisible();
  await dialog.getByRole('button', { name: 'Change 1 trap' }).click();
  await expect(page.getByRole('status').filter({ hasText: 'Done: paste: change 1 trap' })).toBeAttached();
  await page.getByRole('button', { name: 'Undo' }).click();
  await savedAndSolved(page);
});

test('what is saved as CSV or XLSX comes back without a change, and with one it is one step', async ({ page }) => {
  await signIn(page, 'designer');
  const path = await demoNetworkPath(page);
  for (const list of ['traps', 'pipes', 'junctions', 'vessels', 'pumped-inlets', 'gauges', 'trap-models']) {
    await openList(page, path, list);
    for (const kind of ['CSV', 'XLSX']) {
      const download = await saved(page, `Save this list as ${kind}`);
      expect(download.suggestedFilename()).toBe(`tern-quay-cannery-${list}.${kind.toLowerCase()}`);
      const buffer = await bytesOf(download);
      await page
        .getByLabel('CSV or XLSX file')
        .setInputFiles({ name: `rows.${kind.toLowerCase()}`, mimeType: '', buffer });
      await expect(
        preview(page).getByRole('button', { name: 'Nothing changes: close' }),
        `${list}, ${kind}`,
      ).toBeVisible();
      await page.keyboard.press('Escape');
      await expect(preview(page)).toHaveCount(0);
    }
  }
  await openList(page, path, 'gauges');
  const csv = (await bytesOf(await saved(page, 'Save this list as CSV'))).toString('utf8');
  const changed = Buffer.from(csv.replace('PI-1,', 'PI-99,'));
  await page.getByLabel('CSV or XLSX file').setInputFiles({ name: 'rows.csv', mimeType: 'text/csv', buffer: changed });
  await preview(page).getByRole('button', { name: 'Add 1 gauge' }).click();
  await expect(page.getByRole('tab', { name: /Gauges 7/ })).toBeVisible();
  await page.getByRole('button', { name: 'Undo' }).click();
  await expect(page.getByRole('tab', { name: /Gauges 6/ })).toBeVisible();
});

test('files that are none are refused in words', async ({ page }) => {
  await signIn(page, 'designer');
  await openList(page, await demoNetworkPath(page), 'traps');
  const box = page.getByLabel('CSV or XLSX file');
  await box.setInputFiles({ name: 'old.xls', mimeType: '', buffer: Buffer.from([0xd0, 0xcf, 0x11, 0xe0, 0]) });
  await expect(page.getByRole('alert')).toContainText('Save it as .xlsx');
  await box.setInputFiles({ name: 'large.csv', mimeType: '', buffer: Buffer.alloc(5_000_001, 65) });
  await expect(page.getByRole('alert')).toContainText('5 MB are the most');
  await page.getByRole('button', { name: 'Dismiss' }).click();
  await expect(page.getByRole('alert')).toHaveCount(0);
});

test('columns are chosen and moved by keyboard, stay on the device, and go back', async ({ page }) => {
  await signIn(page, 'designer');
  const path = await demoNetworkPath(page);
  await openList(page, path, 'traps');
  await page.getByRole('button', { name: 'Columns' }).click();
  const dialog = page.getByRole('dialog');
  await expect(dialog).toBeVisible();
  await expectNoFindings(page);
  await dialog.getByRole('checkbox', { name: 'Area' }).focus();
  await page.keyboard.press('Space');
  await dialog.getByRole('checkbox', { name: 'Load', exact: true }).focus();
  await page.keyboard.press('Alt+ArrowUp');
  await expect(dialog.getByRole('checkbox', { name: 'Load', exact: true })).toBeFocused();
  await page.keyboard.press('Enter');
  await expect(dialog).toHaveCount(0);
  const heads = async (): Promise<string[]> => page.getByRole('columnheader').allInnerTexts();
  const check = async (): Promise<void> => {
    const shown = (await heads()).map((text) => text.split('\n')[0]?.trim() ?? '');
    expect(shown).not.toContain('Area');
    expect(shown.indexOf('Load')).toBe(shown.indexOf('Inlet') - 1);
  };
  await check();
  await page.reload();
  await expect(grid(page)).toBeVisible();
  await check();
  await page.getByRole('button', { name: 'Columns' }).click();
  await dialog.getByRole('button', { name: 'As at first' }).click();
  await dialog.getByRole('button', { name: 'Set' }).click();
  await expect(page.getByRole('columnheader', { name: 'Area' })).toBeVisible();
});

test('a bulk change says which verdicts it would turn before it is made', async ({ page }) => {
  await signIn(page, 'designer');
  await openList(page, await demoNetworkPath(page), 'traps');
  await savedAndSolved(page);
  await grid(page).focus();
  await page.keyboard.press('Control+A');
  const bar = page.getByRole('region', { name: 'Selected rows' });
  await bar.getByRole('combobox', { name: /^Set/ }).selectOption({ label: 'Load' });
  await bar.getByRole('textbox').fill('1 lb/h');
  await expect(bar.getByText(/^Would turn \d+ fail/)).toBeVisible();
});

test('roles: commissioning staff change gauges only; a viewer saves and takes nothing in', async ({ page }) => {
  await signIn(page, 'commissioning');
  const path = await demoNetworkPath(page);
  await openList(page, path, 'traps');
  await expect(page.getByRole('button', { name: 'Paste rows' })).toHaveCount(0);
  await openList(page, path, 'gauges');
  await expectNoFindings(page);
  await page.getByRole('button', { name: 'Add a gauge' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('On', { exact: true }).fill('CR-101');
  await dialog.getByLabel('From the pipe’s start').fill('3 ft');
  await dialog.getByLabel('Elevation of the gauge').fill('5 ft');
  await dialog.getByRole('button', { name: 'Add', exact: true }).click();
  await expect(page.getByRole('tab', { name: /Gauges 7/ })).toBeVisible();
  await expect(page.getByText('Saved', { exact: true })).toBeVisible();
  await page.getByRole('button', { name: 'Undo' }).click();
  await expect(page.getByRole('tab', { name: /Gauges 6/ })).toBeVisible();
  await expect(page.getByText('Saved', { exact: true })).toBeVisible();

  await page.context().clearCookies();
  await signIn(page, 'viewer');
  await openList(page, path, 'gauges');
  await expect(page.getByRole('button', { name: 'Paste rows' })).toHaveCount(0);
  await page.getByRole('button', { name: 'CSV or XLSX', exact: true }).click();
  await expect(page.getByRole('menuitem')).toHaveText([
    'Save this list as XLSX',
    'Save this list as CSV',
    'Save the network as a file',
  ]);
});

test('a network file goes out and comes in whole, and a bad one is refused at its places', async ({ page }) => {
  await signIn(page, 'designer');
  const path = await demoNetworkPath(page);
  const site = path.replace(/\/networks\/.*/, '');
  await page.goto(site);
  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Save Tern Quay Cannery as a file' }).click();
  const buffer = await bytesOf(await download);
  const box = page.getByLabel('Network file', { exact: true });

  const file = JSON.parse(buffer.toString('utf8')) as { name: string; nodes: { loadKgS: number }[] };
  const bad = { ...file, nodes: file.nodes.map((node, i) => (i === 0 ? { ...node, loadKgS: -1 } : node)) };
  await box.setInputFiles({ name: 'bad.json', mimeType: '', buffer: Buffer.from(JSON.stringify(bad)) });
  await expect(page.getByRole('alert')).toContainText(/1 \([^)]+\), loadKgS:/);
  await box.setInputFiles({ name: 'no.json', mimeType: '', buffer: Buffer.from('{') });
  await expect(page.getByRole('alert')).toContainText('It is not JSON');

  const renamed = { ...file, name: 'Brought in' };
  await box.setInputFiles({ name: 'good.json', mimeType: '', buffer: Buffer.from(JSON.stringify(renamed)) });
  await expect(page).toHaveURL(/\/drawing$/);
  const copy = new URL(page.url()).pathname.replace(/\/drawing$/, '');
  expect(await networkFile(page, copy)).toEqual(renamed);
});
