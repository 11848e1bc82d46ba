import AxeBuilder from '@axe-core/playwright';
import type { Browser, BrowserContext, Page } from '@playwright/test';
import { copyOfDemo, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

/** From the end of one person's typing until the other sees it. */
const WITHIN_MS = 1_000;

const FIRST = 'TR1';
const SECOND = 'TR2';

const idOf = (path: string) => path.split('/').at(-1) ?? '';

async function openAs(
  browser: Browser,
  person: 'designer' | 'admin',
): Promise<{ context: BrowserContext; page: Page }> {
  const context = await browser.newContext();
  const page = await context.newPage();
  await signIn(page, person);
  return { context, page };
}

const field = (page: Page, label: string) =>
  page.getByRole('complementary', { name: 'Inspector' }).getByLabel(label, { exact: true });

async function openInputs(page: Page, network: string, element: string): Promise<void> {
  await page.goto(`${network}/drawing?element=${element}`);
  await page.getByRole('complementary', { name: 'Inspector' }).getByRole('tab', { name: 'Inputs' }).click();
  await expect(field(page, 'Load')).toBeVisible();
}

async function give(page: Page, label: string, text: string): Promise<void> {
  await field(page, label).fill(text);
  await field(page, label).press('Enter');
}

async function expectNoFindings(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page })
      .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
      .analyze();
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html).join(' | ')}`)).toEqual([]);
  }
}

const versionOf = async (page: Page, network: string) =>
  ((await (await page.request.get(`/api/networks/${idOf(network)}`)).json()) as { version: number }).version;

test('two people see who is there, and each other’s edits and solves within a second', async ({ page, browser }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Seen by two');
  const { context, page: other } = await openAs(browser, 'admin');
  await openInputs(page, network, FIRST);
  await openInputs(other, network, FIRST);
  await expect(page.getByText('Also here')).toBeVisible();
  await expect(other.locator('app-company-strip strong')).toHaveCount(1);
  await savedAndSolved(page);
  await savedAndSolved(other);
  const solvedBefore = await page.getByText(/^Solved \d\d:\d\d/).textContent();

  await field(other, 'Load').fill('777 lb/h');
  await field(other, 'Load').press('Enter');
  await expect(field(page, 'Load')).toHaveValue('777', { timeout: WITHIN_MS });
  await expect(page.locator('app-company-strip [role=status]')).toContainText('changed: load of', {
    timeout: WITHIN_MS,
  });
  await savedAndSolved(page);
  expect(solvedBefore).not.toBeNull();
  await expectNoFindings(page);

  await test.step('what the other has selected is named, and that they have left', async () => {
    await other.goto(`${network}/drawing?element=${SECOND}`);
    await expect(page.locator('app-company-strip .others')).toContainText(/ at \S+/);
    await context.close();
    await expect(page.getByText('Also here')).toHaveCount(0, { timeout: 10_000 });
  });
});

test('what two people change at once is compared and chosen, and nothing typed is lost', async ({ page, browser }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Changed by two');
  const { context, page: other } = await openAs(browser, 'admin');
  await openInputs(page, network, FIRST);
  await openInputs(other, network, FIRST);
  await context.setOffline(true);
  await give(other, 'Load', '500 lb/h');
  await give(other, 'Subcooling', '7 °F');
  await give(page, 'Load', '650 lb/h');
  await savedAndSolved(page);

  await context.setOffline(false);
  await expect(other.getByRole('alert').filter({ hasText: 'changed what you changed' })).toBeVisible({
    timeout: 15_000,
  });
  await expect(field(other, 'Load')).toHaveValue('650');
  await expect(field(page, 'Subcooling')).toHaveValue('7', { timeout: 15_000 });

  await test.step('by keyboard alone', async () => {
    await other.getByRole('button', { name: 'Compare and choose' }).press('Enter');
    const dialog = other.getByRole('dialog', { name: 'Changed by two people at once' });
    await expect(dialog.getByRole('group')).toContainText(/load/i);
    await expect(dialog).toContainText('650 lb/h');
    await expect(dialog).toContainText('500 lb/h');
    await expectNoFindings(other);
    await other.getByRole('radio', { name: /Mine/ }).press('Space');
    await dialog.getByRole('button', { name: 'Keep what is chosen' }).press('Enter');
    await expect(dialog).toHaveCount(0);
  });
  await expect(field(page, 'Load')).toHaveValue('500', { timeout: 15_000 });
  await expect(other.getByRole('button', { name: 'Compare and choose' })).toHaveCount(0);

  await test.step('a step of undo that another has overtaken is left out and says who', async () => {
    await give(page, 'Load', '510 lb/h');
    await expect(field(other, 'Load')).toHaveValue('510', { timeout: 15_000 });
    await give(other, 'Load', '520 lb/h');
    await expect(field(page, 'Load')).toHaveValue('520', { timeout: 15_000 });
    await page.locator(`[data-element=${FIRST}]`).focus();
    await page.keyboard.press('ControlOrMeta+z');
    await expect(page.getByText(/was left out of undo: .* changed it meanwhile/).first()).toBeVisible();
    await expect(field(page, 'Load')).toHaveValue('520');
  });
  await context.close();
});

test('edits of a tab that was closed while offline are offered on return and saved exactly once', async ({
  browser,
}) => {
  const { context, page } = await openAs(browser, 'designer');
  const network = await copyOfDemo(page, 'Closed while offline');
  await openInputs(page, network, FIRST);
  await savedAndSolved(page);
  await context.setOffline(true);
  await give(page, 'Load', '432 lb/h');
  await expect(field(page, 'Load')).toHaveValue('432');
  // on the device within 300 ms; a crash asks nobody
  await page.waitForTimeout(300);
  await page.close({ runBeforeUnload: false });
  await context.setOffline(false);

  const again = await context.newPage();
  expect(await versionOf(again, network)).toBe(1);
  await openInputs(again, network, FIRST);
  await expect(again.getByText(/on this device did not reach the server: .*load/i)).toBeVisible();
  await expectNoFindings(again);
  await again.getByRole('button', { name: 'Bring them in' }).click();
  await expect(field(again, 'Load')).toHaveValue('432');
  await savedAndSolved(again);
  await expect(again.getByRole('button', { name: 'Bring them in' })).toHaveCount(0);
  expect(await versionOf(again, network)).toBe(2);

  await test.step('it can be undone, and is not offered again', async () => {
    await again.locator(`[data-element=${FIRST}]`).focus();
    await again.keyboard.press('ControlOrMeta+z');
    await expect(field(again, 'Load')).not.toHaveValue('432');
    await savedAndSolved(again);
    await again.reload();
    await savedAndSolved(again);
    await expect(again.getByRole('button', { name: 'Bring them in' })).toHaveCount(0);
    expect(await versionOf(again, network)).toBe(3);
  });
  await context.close();
});
