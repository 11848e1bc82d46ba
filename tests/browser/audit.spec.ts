import AxeBuilder from '@axe-core/playwright';
import { signIn } from './people';
import { expect, test } from './violations';

test('an administrator reads, filters and saves the log of the site; nobody else finds it', async ({ page }) => {
  await signIn(page, 'designer');
  await page.getByRole('link', { name: /Tern Quay Cannery/ }).click();
  await expect(page.getByRole('heading', { name: 'Tern Quay Cannery' })).toBeVisible();
  await expect(page.getByRole('link', { name: 'Log of the site' })).toBeHidden();
  await page.context().clearCookies();

  await signIn(page, 'admin');
  await page.getByRole('link', { name: /Tern Quay Cannery/ }).click();
  await page.getByRole('link', { name: 'Log of the site' }).click();
  const rows = page.getByRole('table').getByRole('row');
  // by its name: it is the oldest entry, and other tests write to the log as well
  await page.getByLabel('What').selectOption({ label: 'made the site' });
  await expect(rows.filter({ hasText: 'made the site' })).toHaveCount(1);
  await page.getByLabel('What').selectOption({ label: 'signed in' });
  await expect(rows.filter({ hasText: 'made the site' })).toHaveCount(0);
  await expect(rows.filter({ hasText: 'signed in' }).first()).toBeVisible();
  await page.getByLabel('To day (UTC)').fill('2020-01-01');
  await expect(page.getByText('No entries match')).toBeVisible();
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
  }

  const saved = page.waitForEvent('download');
  await page.getByRole('link', { name: 'Save as CSV' }).click();
  expect((await saved).suggestedFilename()).toBe('riseback-log.csv');
});
