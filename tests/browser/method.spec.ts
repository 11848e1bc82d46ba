import type { Page } from '@playwright/test';
import { copyOfDemo, demoNetworkPath, openEmptyNetwork, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const choice = (page: Page, label: string) =>
  page.locator('app-method-choice', { has: page.locator('summary', { hasText: label }) });

test('a method is chosen by keyboard, explained, and marked in the Method view', async ({ page }) => {
  await signIn(page, 'designer');
  await openEmptyNetwork(page, 'Methods');
  const lift = choice(page, 'Static lift');
  await lift.locator('summary').focus();
  await page.keyboard.press('Enter');
  await expect(lift.getByRole('button')).toHaveCount(3);
  await lift.getByRole('button', { name: 'Two-phase risers' }).focus();
  await page.keyboard.press('Enter');
  await expect(lift.locator('summary')).toBeFocused();
  await expect(lift.locator('summary')).toContainText('Two-phase risers');

  const voidFraction = choice(page, 'Void fraction');
  await voidFraction.locator('summary').click();
  await voidFraction.getByRole('button', { name: 'No slip (homogeneous)' }).click();
  await expect(page.getByRole('note')).toContainText('Unsafe in rises');
  await savedAndSolved(page);

  await voidFraction.locator('summary').click();
  await voidFraction.getByRole('link', { name: /^Equations and sources: No slip/ }).click();
  await expect(page).toHaveURL(/\/method#voidFraction-homogeneous$/);
  await expect(page.getByRole('heading', { name: 'Void fraction without slip' })).toBeInViewport();
  const used = page.getByRole('region', { name: 'Void fraction without slip' });
  await expect(used.getByText('Used here')).toBeVisible();
  await expect(used.getByText('Unsafe in rises')).toBeVisible();
});

test('a limit takes typed units and goes back to its default when emptied', async ({ page }) => {
  await signIn(page, 'designer');
  await openEmptyNetwork(page, 'Limits');
  const limits = page.locator('app-limit-fields');
  await limits.locator('summary').click();
  const field = limits.getByRole('group', { name: /^Velocity/ }).getByLabel('Flashing: watch above');
  await field.fill('20 m/s');
  await field.press('Enter');
  await expect(limits.locator('summary')).toContainText('1 of this network’s own');
  await savedAndSolved(page);
  await page.reload();
  await limits.locator('summary').click();
  // 20 m/s is 3,937 ft/min
  await expect(field).toHaveValue('3,937');
  await field.fill('');
  await field.press('Enter');
  await expect(limits.locator('summary')).toContainText('All at their defaults');
});

test('a changed atmosphere asks which pressures stay, and is one step back', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'High up');
  const inlets = async () => {
    const answer = await page.request.get(`/api/networks/${network.split('/').at(-1) ?? ''}/file`);
    const { site, nodes } = (await answer.json()) as {
      site: { atmosphericPressurePa: number };
      nodes: { id: string; inletPressurePa?: number }[];
    };
    return [site.atmosphericPressurePa, nodes.find(({ id }) => id === 'TR5')?.inletPressurePa ?? NaN] as const;
  };
  await page.goto(`${network}/drawing`);
  await savedAndSolved(page);
  const [atmosphere, inlet] = await inlets();
  const field = page.locator('app-network-panel').getByLabel('Atmosphere');
  const dialog = page.getByRole('dialog', { name: 'Which pressures stay?' });

  await field.fill('84 kPa');
  await field.press('Enter');
  await dialog.getByRole('button', { name: 'Leave it' }).click();
  await expect(dialog).toBeHidden();
  expect(await inlets()).toEqual([atmosphere, inlet]);

  await field.fill('84 kPa');
  await field.press('Enter');
  await dialog.getByRole('button', { name: 'Gauge values stay' }).click();
  await savedAndSolved(page);
  await expect.poll(inlets).toEqual([84_000, inlet + 84_000 - atmosphere]);

  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect.poll(inlets).toEqual([atmosphere, inlet]);
});

test('bands and the stall curve say in words what they draw', async ({ page }) => {
  await signIn(page, 'viewer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/drawing?element=TE1`);
  await expect(page.getByRole('img', { name: /Credible from .* psig.*By every method from/ }).first()).toBeVisible();
  await expect(page.getByRole('img', { name: /It stalls below \d+ % of full load/ })).toBeVisible();
  await page.goto(`${network}/ledger?element=TE1`);
  await expect(page.getByRole('article').getByRole('term').filter({ hasText: 'Credible' })).toBeVisible();
});
