import type { Page } from '@playwright/test';
import { copyOfDemo, demoNetworkPath, signIn } from './people';
import { expect, test } from './violations';

const nobodyAnswers = (page: Page) =>
  page.route(/\/api\/networks\/[^/]+\/results/, (route) =>
    route.fulfill({
      status: 503,
      contentType: 'application/problem+json',
      body: JSON.stringify({ type: 'about:blank', title: 'No solver is free', status: 503, detail: 'Try again soon.' }),
    }),
  );

test('a list on paper has every row and says what it is of, also those that are out of sight', async ({ page }) => {
  await signIn(page, 'viewer');
  await page.setViewportSize({ width: 1200, height: 500 });
  await page.goto(`${await demoNetworkPath(page)}/lists?list=pipes`);
  await expect(page.getByText(/^Solved \d\d:\d\d/)).toBeVisible();
  await page.evaluate(() => window.dispatchEvent(new Event('beforeprint')));
  await page.emulateMedia({ media: 'print' });
  const paper = page.getByRole('table', { name: /^Pipes of Tern Quay Cannery, .*; case Design$/ });
  // 46 pipes under their heads
  await expect(paper.getByRole('row')).toHaveCount(47);
  await expect(paper.getByRole('row').last()).toBeVisible();
  await expect(page.getByRole('grid')).toBeHidden();
  await page.emulateMedia({ media: 'screen' });
  await page.evaluate(() => window.dispatchEvent(new Event('afterprint')));
  await expect(page.getByRole('grid')).toBeVisible();
  await expect(paper).toHaveCount(0);
});

test('lists and cases say why there are no results, and ask again', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'No results');
  await nobodyAnswers(page);
  for (const view of ['lists', 'cases']) {
    await page.goto(`${network}/${view}`);
    await expect(page.getByRole('alert').filter({ hasText: 'No solver is free' })).toBeVisible({ timeout: 20_000 });
  }
  await page.unroute(/\/api\/networks\/[^/]+\/results/);
  await page.getByRole('button', { name: 'Try again' }).click();
  await expect(page.getByText(/^Solved \d\d:\d\d/)).toBeVisible();
  await expect(page.getByText('No solver is free')).toHaveCount(0);
});

test('a network opened without a connection says so, and loads when there is one', async ({ page, context }) => {
  await signIn(page, 'viewer');
  await page.goto(`${await demoNetworkPath(page)}/drawing`);
  await page.getByRole('link', { name: 'Tern Quay Cannery', exact: true }).first().click();
  const network = page.getByRole('link', { name: /Tern Quay Cannery/ }).last();
  await expect(network).toBeVisible();
  await context.setOffline(true);
  await network.click();
  await expect(page.getByText('There is no connection.', { exact: false })).toBeVisible();
  await context.setOffline(false);
  await expect(page.getByText(/^Solved \d\d:\d\d/)).toBeVisible({ timeout: 15_000 });
});

test('a column is filled down by a key, as one step that is taken back', async ({ page }) => {
  await signIn(page, 'designer');
  await page.goto(`${await copyOfDemo(page, 'Filled down')}/lists?list=traps`);
  const cell = (tag: string, column: number) =>
    page.getByRole('row', { name: new RegExp(`${tag} `) }).locator(`[data-column="${String(column)}"]`);
  const load = Number(await page.getByRole('columnheader', { name: /^Load/ }).getAttribute('data-column'));
  // the loads of the fixture, lb/h
  await expect(cell('RT-1', load)).toHaveText('600');
  await expect(cell('BL-1', load)).not.toHaveText('600');
  for (const tag of ['RT-1', 'BL-1']) await cell(tag, 0).click();
  await cell('RT-1', load).click();
  await page.keyboard.press('Control+d');
  await expect(cell('BL-1', load)).toHaveText('600');
  await page.keyboard.press('Control+z');
  await expect(cell('BL-1', load)).not.toHaveText('600');
});
