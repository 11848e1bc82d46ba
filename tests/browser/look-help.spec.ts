import AxeBuilder from '@axe-core/playwright';
import { demoNetworkPath, signIn } from './people';
import { expect, test } from './violations';

test('a word of the trade explains itself on pointing, on focus and on a tap, and Escape puts the tip away', async ({
  page,
}) => {
  await signIn(page, 'viewer');
  await page.goto(`${await demoNetworkPath(page)}/drawing?element=TR5`);
  const inspector = page.getByRole('complementary', { name: 'Inspector' });
  const word = inspector.getByRole('button', { name: 'differential', exact: true });
  const tip = page.getByRole('tooltip').filter({ hasText: 'Nothing else drives condensate' });
  await expect(word).toHaveAccessibleDescription(/Nothing else drives condensate/);

  await word.hover();
  await expect(tip).toBeVisible();
  await tip.hover();
  await expect(tip).toBeVisible();
  await page.keyboard.press('Escape');
  await expect(tip).toBeHidden();
  // what lies under the tip has not heard of it
  await expect(page).toHaveURL(/element=TR5/);

  await word.focus();
  await expect(tip).toBeVisible();
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
  }
  await page.keyboard.press('Tab');
  await expect(tip).toBeHidden();
});

test('a tip opens on a tap and goes with the next one', async ({ browser }) => {
  const context = await browser.newContext({ hasTouch: true, viewport: { width: 390, height: 844 } });
  const page = await context.newPage();
  await signIn(page, 'viewer');
  await page.goto(`${await demoNetworkPath(page)}/drawing?element=TR5`);
  const word = page.getByRole('button', { name: 'spread', exact: true });
  const tip = page.getByRole('tooltip').filter({ hasText: 'From the lowest to the highest' });
  await word.tap();
  await expect(tip).toBeVisible();
  const box = await tip.boundingBox();
  expect(box?.x).toBeGreaterThanOrEqual(0);
  expect((box?.x ?? 0) + (box?.width ?? 0)).toBeLessThanOrEqual(390);
  await page.getByRole('heading', { name: 'Checks' }).tap();
  await expect(tip).toBeHidden();
  await context.close();
});

test('"?" lists the keys of every view, the drawing its own; the help menu has the words', async ({ page }) => {
  await signIn(page, 'viewer');
  const network = await demoNetworkPath(page);
  for (const [path, title] of [
    ['/sites', 'Keys'],
    ['/account', 'Keys'],
    [`${network}/lists`, 'Keys'],
    [`${network}/ledger`, 'Keys'],
    [`${network}/cases`, 'Keys'],
    [`${network}/try`, 'Keys'],
    [`${network}/method`, 'Keys'],
    [`${network}/drawing`, 'Keys of the drawing'],
  ] as const) {
    await page.goto(path);
    await page.getByRole('button', { name: 'Help' }).focus();
    await page.keyboard.press('?');
    await expect(page.getByRole('dialog', { name: title, exact: true }), path).toBeVisible();
    await page.keyboard.press('Escape');
    await expect(page.getByRole('dialog')).toHaveCount(0);
  }
  await page.goto(`${network}/lists`);
  await page.getByRole('button', { name: 'Help' }).press('Enter');
  await page.getByRole('menuitem', { name: 'Words' }).press('Enter');
  await expect(page.getByRole('dialog', { name: 'Words' })).toContainText('half a psi for each foot');
  expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
});
