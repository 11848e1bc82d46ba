import AxeBuilder from '@axe-core/playwright';
import type { Page } from '@playwright/test';
import { demoNetworkPath, openEmptyNetwork, signIn } from './people';
import { expect, test } from './violations';

const THEMES = ['light', 'dark'] as const;
const WIDTHS = [1440, 390, 320] as const;

test('no axe findings on any page, in both themes', async ({ page }) => {
  test.setTimeout(300_000);
  await page.goto('/sign-in');
  await expectNoFindings('/sign-in', page);
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await openEmptyNetwork(page, 'Nothing yet');
  const empty = new URL(page.url()).pathname;
  const pages = [
    '/sites',
    network.replace(/\/networks\/.*/, ''),
    `${network}/drawing`,
    `${network}/drawing?element=TR5`,
    `${network}/drawing?element=L24`,
    `${network}/drawing?case=rt5open`,
    empty,
    `${network}/lists`,
    `${network}/ledger?element=TR5`,
    `${network}/cases?case=rt5open`,
    `${network}/cases?show=compare`,
    `${network}/drawing?element=TE1`,
    `${network}/method`,
    `${network}/method#check-stall`,
    `${network}/drawing?case=worst&element=TR5`,
    `${network}/lists?case=worst`,
    empty.replace('/drawing', '/cases'),
    '/account',
    '/nowhere',
  ];
  for (const path of pages) {
    await page.goto(path);
    await page.waitForLoadState('networkidle');
    await expectNoFindings(path, page);
  }
});

test('no page is wider than a phone', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  for (const width of WIDTHS) {
    await page.setViewportSize({ width, height: 844 });
    for (const path of [
      '/sites',
      `${network}/drawing`,
      `${network}/lists`,
      `${network}/ledger?element=TR5`,
      `${network}/cases?case=rt5open`,
      `${network}/cases?show=compare`,
      `${network}/method`,
    ]) {
      await page.goto(path);
      await page.waitForLoadState('networkidle');
      const overflow = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
      expect(overflow, `${path} at ${String(width)} px`).toBeLessThanOrEqual(0);
    }
  }
});

async function expectNoFindings(path: string, page: Page): Promise<void> {
  for (const colorScheme of THEMES) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page })
      .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
      .analyze();
    const found = violations.map(
      ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`,
    );
    expect(found, `${path}, ${colorScheme}`).toEqual([]);
  }
}
