import AxeBuilder from '@axe-core/playwright';
import { demoNetworkPath, signIn } from './people';
import { expect, test } from './violations';

/** Quality bar: from the first visit to the first solved network. */
const FIRST_RESULT_WITHIN_MS = 120_000;

test('the first visit leads to a solved network and round it, by the keyboard alone', async ({ page }) => {
  const began = Date.now();
  await signIn(page, 'viewer');
  const begin = page.getByRole('button', { name: 'Show me round' });
  await begin.focus();
  await page.keyboard.press('Enter');
  const guide = page.getByRole('region', { name: 'Guide' });
  await expect(guide).toContainText('1 of 6');
  await expect(page.getByText(/^Solved \d\d:\d\d/)).toBeVisible();
  expect(Date.now() - began).toBeLessThan(FIRST_RESULT_WITHIN_MS);
  await expect(page.locator('[data-element][data-shown]')).toHaveCount(1);
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
  }

  const next = guide.getByRole('button', { name: 'Next' });
  await next.focus();
  for (const [anchor, view] of [
    ['app-staff', 'drawing'],
    ['app-findings-list', 'drawing'],
    ['app-ledger-table', 'ledger'],
    ['app-comparison-table', 'cases'],
    ['app-trial-form', 'try'],
  ] as const) {
    await page.keyboard.press('Enter');
    await expect(page).toHaveURL(new RegExp(`/${view}\\?`));
    await expect(page.locator(`${anchor}[data-shown]`)).toBeVisible();
  }
  await guide.getByRole('button', { name: 'Done' }).press('Enter');
  await expect(guide).toHaveCount(0);
  await expect(page.locator('[data-shown]')).toHaveCount(0);
  await expect(page.getByRole('button', { name: 'Help' })).toBeFocused();
});

test('the guide is offered once, ends on Escape, and can be had again from the help menu', async ({ page }) => {
  await signIn(page, 'viewer');
  await page.getByRole('button', { name: 'Not now' }).click();
  await expect(page.getByRole('heading', { name: 'First time here?' })).toHaveCount(0);
  await page.reload();
  await expect(page.getByRole('link', { name: /Tern Quay Cannery/ })).toBeVisible();
  await expect(page.getByRole('heading', { name: 'First time here?' })).toHaveCount(0);

  await page.goto(`${await demoNetworkPath(page)}/method`);
  await page.getByRole('button', { name: 'Help' }).press('Enter');
  await page.getByRole('menuitem', { name: 'Show me round' }).press('Enter');
  const guide = page.getByRole('region', { name: 'Guide' });
  await expect(guide).toContainText('1 of 6');
  await expect(page).toHaveURL(/\/drawing\?/);
  await guide.getByRole('button', { name: 'Next' }).press('Escape');
  await expect(guide).toHaveCount(0);
});
