import AxeBuilder from '@axe-core/playwright';
import type { Page } from '@playwright/test';
import { copyOfDemo, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const sheet = (page: Page) => page.getByRole('application');
const element = (page: Page, tag: string) => sheet(page).getByRole('button', { name: new RegExp(`^${tag},`) });
const status = (page: Page) => page.locator('main [role=status]').last();
const inspector = (page: Page) => page.getByRole('complementary', { name: 'Inspector' });

/** A copy of the demo made by its designer, then seen by commissioning staff, who may place gauges but not draw. */
async function openAsCommissioning(page: Page, name: string): Promise<void> {
  await signIn(page, 'designer');
  const path = await copyOfDemo(page, name);
  await page.context().clearCookies();
  await signIn(page, 'commissioning');
  await page.goto(`${path}/drawing`);
  await savedAndSolved(page);
}

async function focus(page: Page, tag: string): Promise<void> {
  await sheet(page).locator('[tabindex="0"]').focus();
  await page.keyboard.press('/');
  await page.getByLabel('Find a tag').fill(tag);
  await page.keyboard.press('Enter');
  await expect(element(page, tag)).toBeFocused();
}

test('commissioning places a gauge by keyboard, reads what it should show, moves it, takes it back and deletes it', async ({
  page,
}) => {
  await openAsCommissioning(page, 'Gauges by keyboard');
  await focus(page, 'PI-1');
  await expect(element(page, 'PI-1')).toHaveAccessibleName(/^PI-1, gauge, on LH3, 0 to 60 psig, with a water leg/);
  // with the flow the keyboard goes to what the gauge taps, and on to its pipe
  await page.keyboard.press('PageDown');
  await page.keyboard.press('PageDown');
  await page.keyboard.press('g');
  await expect(status(page)).toHaveText(/^New gauge on /);
  const form = page.getByRole('form', { name: 'New gauge' });
  await expect(form.getByLabel('Tag')).toBeFocused();
  await expect(form.getByLabel('Tag')).toHaveValue('PI-7');
  await expect(form.getByLabel('Range to')).toHaveValue('15.0');
  await form.getByLabel('Range to').fill('30 psig');
  await form.getByLabel('From its start').fill('2 ft');
  await page.keyboard.press('Enter');
  await expect(element(page, 'PI-7')).toBeFocused();
  await expect(element(page, 'PI-7')).toHaveAccessibleName(/2 ft from its start, 0 to 30 psig/);
  await expect(inspector(page).getByRole('heading', { name: 'Expected' })).toBeVisible();
  await expect(inspector(page).getByText('On its dial')).toBeVisible();

  await page.keyboard.press('m');
  await page.keyboard.press('ArrowRight');
  await expect(status(page)).toHaveText('3 ft from its start');
  await page.keyboard.press('Enter');
  await expect(element(page, 'PI-7')).toHaveAccessibleName(/3 ft from its start/);

  await page.keyboard.press('Enter');
  const due = inspector(page).getByLabel('Calibration due');
  await due.fill('1.2.2020');
  await due.press('Enter');
  await expect(inspector(page).getByRole('alert')).toHaveText(/is not a date/);
  await due.fill('2020-02-01');
  await due.press('Enter');
  await expect(inspector(page).getByText('Its calibration was due on 2020-02-01')).toBeVisible();
  await expect(page.getByRole('row', { name: /PI-7.*Calibration overdue/ })).toBeVisible();
  await inspector(page).getByLabel('Fill in from a grade or class').selectOption({ label: 'EN 837-1 class 1.6' });
  await expect(inspector(page).getByLabel('Accuracy')).toHaveValue('1.6');

  const scan = await new AxeBuilder({ page }).analyze();
  expect(scan.violations).toEqual([]);

  await element(page, 'PI-7').focus();
  // accuracy, date and place
  for (let step = 0; step < 3; step++) await page.keyboard.press('Control+z');
  await expect(element(page, 'PI-7')).toHaveAccessibleName(/2 ft from its start/);
  await page.keyboard.press('Control+z');
  await expect(element(page, 'PI-7')).toHaveCount(0);
  await page.keyboard.press('Control+Shift+z');
  await expect(element(page, 'PI-7')).toBeFocused();
  await page.keyboard.press('Delete');
  await page.getByRole('button', { name: 'Delete' }).last().click();
  await expect(element(page, 'PI-7')).toHaveCount(0);
  await savedAndSolved(page);
});

test('commissioning places a gauge by mouse, and cannot delete what is drawn', async ({ page }) => {
  await openAsCommissioning(page, 'Gauges by mouse');
  await expect(page.getByRole('button', { name: 'Trap T' })).toHaveCount(0);
  await page.getByRole('button', { name: 'Gauge G' }).click();
  await element(page, 'RT-1').click();
  const form = page.getByRole('form', { name: 'New gauge' });
  await expect(form.getByText('On RT-1')).toBeVisible();
  await form.getByRole('button', { name: 'Place' }).click();
  await expect(element(page, 'PI-7')).toHaveAccessibleName(/gauge, on RT-1/);
  await savedAndSolved(page);
  await page.reload();
  await savedAndSolved(page);
  await element(page, 'PI-7').click();
  await expect(inspector(page).getByRole('heading', { name: 'PI-7' })).toBeVisible();
  await element(page, 'RT-1').click();
  await page.keyboard.press('Delete');
  await expect(page.getByRole('dialog')).toHaveCount(0);
  await expect(element(page, 'RT-1')).toHaveCount(1);
});
