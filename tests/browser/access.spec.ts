import { demoNetworkPath, signIn } from './people';
import { expect, test } from './violations';

test('a viewer reads everything and can change nothing', async ({ page }) => {
  await signIn(page, 'viewer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/drawing?element=TR5`);
  const inspector = page.getByRole('complementary', { name: 'Inspector' });
  await expect(inspector.getByRole('img', { name: /Back pressure/ })).toBeVisible();
  await expect(page.getByRole('toolbar').getByRole('button', { name: 'Trap' })).toHaveCount(0);
  await inspector.getByRole('tab', { name: 'Inputs' }).click();
  await expect(inspector.getByLabel('Load', { exact: true })).toBeDisabled();
  await page.getByRole('application').focus();
  await page.keyboard.press('t');
  await expect(page.getByRole('heading', { name: 'New trap' })).toHaveCount(0);
  await page.goto(`${network}/lists`);
  await expect(page.getByRole('button', { name: 'Add a trap' })).toHaveCount(0);
  // The server refuses too, whatever a page would allow.
  const token = (await page.context().cookies()).find(({ name }) => name === 'XSRF-TOKEN')?.value ?? '';
  const refused = await page.request.post(`/api/networks/${network.split('/').at(-1) ?? ''}/edits`, {
    headers: { 'X-XSRF-TOKEN': decodeURIComponent(token), 'If-Match': '"1"' },
    data: {
      batchId: crypto.randomUUID(),
      label: 'not allowed',
      ops: [{ op: 'set', in: 'network', key: 'name', from: 'Tern Quay Cannery', to: 'Mine' }],
    },
  });
  expect(refused.status()).toBe(403);
});

test('a stranger finds nothing where others find a network', async ({ page, browser }) => {
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  const other = await browser.newPage();
  await signIn(other, 'stranger');
  await expect(other.getByText('You have no role at a site yet')).toBeVisible();
  const answer = await other.request.get(`/api/networks/${network.split('/').at(-1) ?? ''}`);
  expect(answer.status()).toBe(404);
  await other.goto(`${network}/drawing`);
  await expect(other.getByRole('alert')).toBeVisible();
  await expect(other.getByText('Tern Quay Cannery')).toHaveCount(0);
  await other.close();
});

test('nobody gets past the door without signing in, and comes back where they were going', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await page.getByRole('button', { name: /^You:/ }).click();
  await page.getByRole('menuitem', { name: 'Sign out' }).click();
  await expect(page.getByRole('button', { name: 'Sign in' })).toBeVisible();
  await page.goto(`${network}/ledger`);
  await expect(page).toHaveURL(/sign-in\?return=/);
  await page.getByLabel('E-mail').fill('designer@ternquay.example');
  await page.getByLabel('Password', { exact: true }).fill('wrong password');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.locator('#complaint')).not.toBeEmpty();
  await page.getByLabel('Password', { exact: true }).fill('demo-tern-quay');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page).toHaveURL(/\/ledger/);
});
