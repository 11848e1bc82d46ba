import AxeBuilder from '@axe-core/playwright';
import { copyOfDemo, demoNetworkPath, signIn } from './people';
import { expect, test } from './violations';

test('a pattern that makes no tag is told and not kept; who may not draw only reads', async ({ page }) => {
  await signIn(page, 'designer');
  const site = (await demoNetworkPath(page)).replace(/\/networks.*/, '');
  await page.goto(site);
  await page.getByRole('link', { name: 'Site settings' }).click();
  const pattern = page.getByLabel('Receiver', { exact: true });
  await pattern.fill('R');
  await pattern.press('Enter');
  await expect(page.getByText('one run of # for the number')).toBeVisible();
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
  }
  await page.reload();
  await expect(pattern).toHaveValue('');

  await page.context().clearCookies();
  await signIn(page, 'viewer');
  await page.goto(`${site}/settings`);
  await expect(page.getByText('The site’s designers and administrators change them.')).toBeVisible();
  await expect(pattern).toBeDisabled();
  await expect(page.getByLabel('Atmosphere')).toBeDisabled();
});

test('a new element is offered a tag after the site’s pattern', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Tags after a pattern');
  // the other tests share the site: its settings stay as they are
  await page.route('**/api/sites/*/settings', (route) =>
    route.fulfill({
      json: {
        atmosphericPressurePa: 101_325,
        ambientTemperatureK: 293.15,
        limits: {},
        tagPatterns: { pumpedInlet: 'PX-##' },
      },
    }),
  );
  await page.goto(`${network}/drawing`);
  await page.getByRole('button', { name: /^RT-5, trap/ }).click();
  await page.keyboard.press('u');
  await expect(page.getByLabel('Tag', { exact: true })).toHaveValue('PX-01');
});
