import AxeBuilder from '@axe-core/playwright';
import type { Locator, Page } from '@playwright/test';
import { copyOfDemo, demoNetworkPath, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

test('changes are tried by mouse, seen per trap, kept as one step of undo', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Tried by mouse');
  await page.goto(`${network}/try`);
  await savedAndSolved(page);
  await page.getByLabel('Tick the way of a trap').selectOption({ index: 3 });
  await page.getByRole('button', { name: 'Try', exact: true }).click();
  await expect(steps(page)).toHaveCount(1);
  await expect(steps(page)).toContainText('Next size up: CR-103');
  const effects = effectTable(page);
  await expect(effects.getByRole('row')).toHaveCount(31);
  await expect(page.getByText(/^(Better|Worse|No verdict)/)).toBeVisible();
  // wider pipes ease the trap at their head
  await expect(effects.getByRole('row', { name: /RT-3/ }).locator('.change')).toHaveText(/^−\d/);

  await page.getByRole('radio', { name: 'Receiver and vessel pressures' }).check();
  await page.getByRole('checkbox', { name: /FV-1/ }).check();
  await page.getByLabel('How').selectOption('Raise by');
  await page.getByLabel('Difference').fill('50 psi');
  await page.getByRole('button', { name: 'Try', exact: true }).click();
  await expect(steps(page)).toHaveCount(2);
  await expect(page.getByText(/^(Better: .*)?Worse: /)).toBeVisible();
  // the network itself is untouched
  expect(await sizeOf(page, network, 'CR-103')).toBe('1');

  await page.getByRole('button', { name: /^Take out: Pressure raised/ }).click();
  await expect(steps(page)).toHaveCount(1);
  await page.getByRole('button', { name: 'Keep as one edit' }).click();
  await expect(page.getByText(/^Kept: \d+ values as one edit/)).toBeVisible();
  await savedAndSolved(page);
  expect(await sizeOf(page, network, 'CR-103')).toBe('1-1/4');
  await page.getByRole('button', { name: 'Undo' }).click();
  await savedAndSolved(page);
  expect(await sizeOf(page, network, 'CR-103')).toBe('1');
});

test('by keyboard alone: a load is multiplied, the effect read, and dropped', async ({ page }) => {
  await signIn(page, 'designer');
  await page.goto(`${await demoNetworkPath(page)}/try`);
  await savedAndSolved(page);
  await tabTo(page, page.getByRole('radio', { name: 'Pipe sizes' }));
  // radios go by arrows: sizes, pressures, elevations, loads
  for (let i = 0; i < 3; i++) await page.keyboard.press('ArrowDown');
  await expect(page.getByRole('radio', { name: 'Loads' })).toBeChecked();
  await page.keyboard.press('Tab');
  await page.keyboard.type('RT-5');
  await expect(page.getByRole('checkbox')).toHaveCount(1);
  await tabTo(page, page.getByRole('checkbox', { name: /RT-5/ }));
  await page.keyboard.press('Space');
  await expect(page.getByText('1 of', { exact: false })).toBeVisible();
  await tabTo(page, page.getByLabel('Factor'));
  await page.keyboard.type('2');
  // Enter in the field tries it
  await page.keyboard.press('Enter');
  await expect(steps(page)).toContainText('Load × 2: RT-5');
  await expect(effectTable(page).getByRole('row', { name: /RT-5/ }).locator('.change')).toHaveText(/^\+\d/);
  await tabTo(page, page.getByRole('button', { name: 'Drop all' }));
  await page.keyboard.press('Enter');
  await expect(steps(page)).toHaveCount(0);
  await expect(page.getByText('Dropped. The network is as it was.')).toBeVisible();
});

test('what is tried survives a reload, and stands on what others change meanwhile', async ({ browser, page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Tried beside others');
  await page.goto(`${network}/try?change=size&by=up&element=L24`);
  await savedAndSolved(page);
  await expect(page.getByRole('button', { name: 'Try', exact: true })).toBeFocused();
  await page.keyboard.press('Enter');
  await expect(steps(page)).toHaveCount(1);
  await page.reload();
  await expect(steps(page)).toHaveCount(1);
  await expect(page.getByText(/^Begun .* and kept on this device/)).toBeVisible();
  await expect(effectTable(page)).toBeVisible();

  const other = await browser.newPage();
  await signIn(other, 'admin');
  await other.goto(`${network}/try?change=size&by=down&element=L24`);
  await savedAndSolved(other);
  await other.getByRole('button', { name: 'Try', exact: true }).click();
  await other.getByRole('button', { name: 'Keep as one edit' }).click();
  await savedAndSolved(other);
  await other.close();

  await expect(page.getByText('Changed by others meanwhile')).toBeVisible();
  await page.getByRole('button', { name: 'Take mine out there' }).click();
  await expect(steps(page)).toHaveCount(0);
});

test('a finding leads here with its mending filled in', async ({ page }) => {
  await signIn(page, 'designer');
  await page.goto(`${await demoNetworkPath(page)}/drawing`);
  await savedAndSolved(page);
  await page.getByRole('button', { name: /^Try a larger size for CR-1 road crossing: Velocity/ }).click();
  await expect(page.getByRole('button', { name: 'Try', exact: true })).toBeFocused();
  await expect(page.getByRole('checkbox', { name: /CR-1 road crossing/ })).toBeChecked();
  await page.keyboard.press('Enter');
  await expect(page.getByText('Velocity at CR-1 road crossing (fail to watch)')).toBeVisible();
  await page.getByRole('button', { name: 'Drop all' }).click();
});

test('a viewer may try but not keep', async ({ page }) => {
  await signIn(page, 'viewer');
  await page.goto(`${await demoNetworkPath(page)}/try?change=pressure&by=add&element=V1`);
  await savedAndSolved(page);
  await expect(page.getByText('may try changes but not keep them')).toBeVisible();
  await expect(page.getByRole('button', { name: 'Keep as one edit' })).toHaveCount(0);
  await page.getByRole('button', { name: 'Tick all shown' }).click();
  await page.getByLabel('Difference').fill('2 psi');
  await page.getByRole('button', { name: 'Try', exact: true }).click();
  await expect(effectTable(page).getByRole('row')).toHaveCount(31);
  await page.getByRole('button', { name: 'Drop all' }).click();
});

test('worst of all, refusals, both themes and a phone', async ({ page }) => {
  test.setTimeout(180_000);
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/try?case=worst`);
  await savedAndSolved(page);
  await page.getByRole('button', { name: 'Try', exact: true }).click();
  await expect(page.getByText('Choose at least one pipe.')).toBeVisible();
  await page.getByRole('button', { name: 'Tick all shown' }).click();
  await page.getByRole('button', { name: 'Try', exact: true }).click();
  await expect(effectTable(page).getByRole('row')).toHaveCount(31, { timeout: 30_000 });
  for (const width of [1440, 390, 320]) {
    await page.setViewportSize({ width, height: 844 });
    const overflow = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(overflow, `${String(width)} px`).toBeLessThanOrEqual(0);
  }
  for (const width of [1440, 390]) {
    await page.setViewportSize({ width, height: 900 });
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      const { violations } = await new AxeBuilder({ page })
        .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
        .analyze();
      expect(
        violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`),
      ).toEqual([]);
    }
  }
  await page.getByRole('button', { name: 'Drop all' }).click();
});

function steps(page: Page): Locator {
  return page.getByRole('list', { name: 'What is tried' }).getByRole('listitem');
}

function effectTable(page: Page): Locator {
  return page.getByRole('region', { name: 'What it does, trap by trap' }).getByRole('table');
}

/** What the server has of a pipe. */
async function sizeOf(page: Page, network: string, tag: string): Promise<string | undefined> {
  const id = network.split('/').at(-1) ?? '';
  const file = (await (await page.request.get(`/api/networks/${id}/file`)).json()) as {
    pipes: { tag?: string; size?: { nps: string } }[];
  };
  return file.pipes.find((pipe) => pipe.tag === tag)?.size?.nps;
}

/** Goes there as a person without a mouse does. */
async function tabTo(page: Page, target: Locator): Promise<void> {
  for (let i = 0; i < 80; i++) {
    if (await target.evaluate((element) => element === document.activeElement)) return;
    await page.keyboard.press('Tab');
  }
  await expect(target).toBeFocused();
}
