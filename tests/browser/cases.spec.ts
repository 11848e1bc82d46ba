import type { Page } from '@playwright/test';
import { demoNetworkPath, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const caseRow = (page: Page, name: string) => page.getByRole('region', { name: 'Cases' }).getByRole('row', { name });

/** A field is accepted by Enter. */
async function give(page: Page, label: string, text: string): Promise<void> {
  await page.getByLabel(label, { exact: true }).fill(text);
  await page.getByLabel(label, { exact: true }).press('Enter');
}

/** Names an element in the form under the settings and sets one value of it. */
async function setInCase(page: Page, tag: string, what: string, value: string): Promise<void> {
  const form = page.getByRole('form', { name: 'Set a value for this case' });
  await form.getByLabel('Element').fill(tag);
  await form.getByLabel('What').selectOption({ label: what });
  const field = form.getByLabel(what, { exact: true });
  if (what === 'State') await field.selectOption({ label: value });
  else await field.fill(value);
  await form.getByRole('button', { name: 'Set' }).click();
}

test('a case is made, changed, compared, copied, deleted and taken back', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/cases`);
  await page.getByRole('button', { name: 'New case' }).click();
  await expect(page.getByLabel('Name', { exact: true })).toBeFocused();
  await give(page, 'Name', 'Night shift');
  await give(page, 'Load', '50 %');
  await expect(caseRow(page, 'Night shift')).toContainText('50 %');

  await test.step('a name in use is refused where it was typed', async () => {
    await give(page, 'Name', 'Design');
    await expect(page.getByText('Another case has this name.')).toBeVisible();
    await give(page, 'Name', 'Night shift');
  });

  await test.step('a trap is shut off and another gets a load of its own, in any unit', async () => {
    await setInCase(page, 'RT-1', 'State', 'Isolated');
    await expect(page.getByLabel('State of RT-1', { exact: true })).toHaveValue('isolated');
    await setInCase(page, 'rt-2', 'Load', '100 kg/h');
    await expect(page.getByLabel('Load of RT-2', { exact: true })).toHaveValue('220');
    // 100 kg/h are 220.46 lb/h; half of RT-2's 600 lb/h would hold otherwise
    await expect(page.getByRole('row', { name: /Load of RT-2/ })).toContainText('300 lb/h');
    await expect(caseRow(page, 'Night shift')).toContainText(/\d fail/);
    await savedAndSolved(page);
  });

  await test.step('side by side shows it with what it sets, and leads to the drawing', async () => {
    await page.getByRole('tab', { name: 'Side by side' }).click();
    const table = page.getByRole('table', { name: /Back pressure in psig/ });
    await expect(table.getByRole('columnheader', { name: /Night shift/ })).toContainText('50 % load');
    await expect(table.getByRole('row', { name: /^RT-1 / })).toContainText('isolated');
    await table.getByRole('button', { name: 'Trap' }).click();
    await expect(table.getByRole('rowheader').first()).toHaveText('BL-1');
    await table.getByRole('button', { name: 'Worst of all' }).click();
    await table.getByRole('link', { name: /RT-2 in Night shift/ }).click();
    await expect(page).toHaveURL(/\/drawing\?.*case=C\d+.*element=TR2|\/drawing\?.*element=TR2.*case=C\d+/);
    const inspector = page.getByRole('complementary', { name: 'Inspector' });
    await expect(inspector.getByRole('list', { name: 'Pressure by case' })).toContainText('load 220 lb/h');
    await page.getByRole('link', { name: 'Cases' }).click();
  });

  await test.step('undo goes back value by value, redo forth', async () => {
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect(page.getByLabel('Load of RT-2', { exact: true })).toHaveCount(0);
    await page.getByRole('button', { name: 'Redo' }).click();
    await expect(page.getByLabel('Load of RT-2', { exact: true })).toHaveValue('220');
    await page.getByRole('button', { name: 'Remove: Load of RT-2' }).click();
    await expect(page.getByLabel('Load of RT-2', { exact: true })).toHaveCount(0);
  });

  await test.step('a copy takes the settings along; deleting says what goes, and undo brings it back', async () => {
    await page.getByRole('button', { name: 'Copy this case' }).click();
    await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Night shift, copy');
    await expect(page.getByLabel('State of RT-1', { exact: true })).toHaveValue('isolated');
    await page.getByRole('button', { name: 'Delete this case' }).click();
    await expect(page.getByRole('dialog')).toContainText('1 setting of its own');
    await page.getByRole('button', { name: 'Delete', exact: true }).click();
    await expect(caseRow(page, 'Night shift, copy')).toHaveCount(0);
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect(page.getByLabel('State of RT-1', { exact: true })).toHaveValue('isolated');
    await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Night shift, copy');
  });

  await test.step('the rest of the undoing leaves the network as it was', async () => {
    const undo = page.getByRole('button', { name: 'Undo' });
    while (await undo.isEnabled()) await undo.click();
    await expect(caseRow(page, 'Night shift')).toHaveCount(0);
    await savedAndSolved(page);
  });
});

test('a case is made for one trap out of the present one, and taken back in one step', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/drawing?case=turndown&element=TR1`);
  await savedAndSolved(page);
  const inspector = page.getByRole('complementary', { name: 'Inspector' });
  const make = async (setting: RegExp) => {
    await inspector.getByRole('button', { name: 'Make a case' }).click();
    await page.getByRole('menuitem', { name: setting }).click();
  };

  await test.step('failed open: its editor stands open, with what the present case sets', async () => {
    await make(/^Failed open/);
    await expect(page.getByLabel('Name', { exact: true })).toHaveValue('RT-1 failed open');
    await expect(page.getByLabel('Name', { exact: true })).toBeFocused();
    await expect(page.getByLabel('State of RT-1', { exact: true })).toHaveValue('failedOpen');
    await expect(caseRow(page, 'RT-1 failed open')).toContainText('50 %');
    await expect(caseRow(page, 'RT-1 failed open')).toContainText(/\d fail/);
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect(caseRow(page, 'RT-1 failed open')).toHaveCount(0);
    await expect(page.getByRole('button', { name: 'Undo' })).toBeDisabled();
  });

  await test.step('its own load: begins as what it is there, ready to be typed over', async () => {
    await page.goto(`${network}/drawing?case=turndown&element=TR1`);
    await make(/^Own load/);
    // half of 600 lb/h
    await expect(page.getByLabel('Load of RT-1', { exact: true })).toHaveValue(/^300\./);
    await expect(page.getByLabel('Load of RT-1', { exact: true })).toBeFocused();
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect(caseRow(page, 'RT-1 at its own load')).toHaveCount(0);
    await savedAndSolved(page);
  });
});

test('the worst of all cases shows each trap in the case that is worst for it', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/drawing?case=worst&element=TR5`);
  await savedAndSolved(page);
  await expect(page.getByRole('link', { name: /^Worst of all/ })).toHaveAttribute('aria-current', 'true');
  // a trap blowing live steam into its header stands against more than in any other case of the demo
  const inspector = page.getByRole('complementary', { name: 'Inspector' });
  await expect(inspector).toContainText('Its worst of all cases: RT-5 trap failed open.');
  await expect(page.getByRole('region', { name: 'Findings of all cases' })).toContainText('Turndown');
  await page.getByRole('link', { name: 'Lists' }).click();
  await expect(page.getByRole('columnheader', { name: 'Case' })).toBeVisible();
  await page.getByRole('link', { name: 'Lift & ledger' }).click();
  await expect(page.getByText('RT-5 trap failed open case, its worst of all')).toBeVisible();
});

test('a viewer reads the cases and changes none', async ({ page }) => {
  await signIn(page, 'viewer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/cases?case=rt5open`);
  await expect(page.getByLabel('State of RT-5', { exact: true })).toBeDisabled();
  await expect(page.getByLabel('Load', { exact: true })).toBeDisabled();
  for (const name of ['New case', 'Copy this case', 'Delete this case', 'Undo', 'Set'])
    await expect(page.getByRole('button', { name, exact: true })).toHaveCount(0);
});
