import { expect, type Page } from '@playwright/test';

export type DemoPerson = 'admin' | 'designer' | 'commissioning' | 'reviewer' | 'viewer' | 'stranger';

/** Signs in through the page, as a person does. */
export async function signIn(page: Page, person: DemoPerson): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(`${person}@ternquay.example`);
  await page.getByLabel('Password', { exact: true }).fill('demo-tern-quay');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByRole('heading', { name: 'Sites' })).toBeVisible();
}

/** The demo network's page, as an address that lasts. */
export async function demoNetworkPath(page: Page): Promise<string> {
  const [site] = (await (await page.request.get('/api/sites')).json()) as { id: string }[];
  if (site === undefined) throw new Error('The demo has no site');
  const networks = (await (await page.request.get(`/api/sites/${site.id}/networks`)).json()) as {
    id: string;
    name: string;
  }[];
  const demo = networks.find(({ name }) => name === 'Tern Quay Cannery');
  if (demo === undefined) throw new Error('The demo has no network');
  return `/sites/${site.id}/networks/${demo.id}`;
}

/** The demo is for every test: one that changes a network works on a copy of its own. */
export async function copyOfDemo(page: Page, name: string): Promise<string> {
  const demo = await demoNetworkPath(page);
  const file = (await (await page.request.get(`/api/networks/${demo.split('/').at(-1) ?? ''}/file`)).json()) as object;
  const token = (await page.context().cookies()).find((cookie) => cookie.name === 'XSRF-TOKEN')?.value ?? '';
  const made = await page.request.post(`/api${demo.replace(/\/[^/]*$/, '')}`, {
    headers: { 'X-XSRF-TOKEN': decodeURIComponent(token) },
    data: { ...file, name },
  });
  expect(made.status()).toBe(201);
  return demo.replace(/[^/]*$/, ((await made.json()) as { id: string }).id);
}

/** Makes an empty network at the demo site through the pages and stands on its drawing. */
export async function openEmptyNetwork(page: Page, name: string): Promise<void> {
  await page.getByRole('link', { name: /Tern Quay Cannery/ }).click();
  await page.getByRole('button', { name: 'New network' }).click();
  await page.getByLabel('Name of the new network').fill(name);
  await page.getByRole('button', { name: 'Make the network' }).click();
  await expect(page).toHaveURL(/\/drawing$/);
  await expect(page.getByText('Nothing is drawn yet')).toBeVisible();
}

/** Saved, and solved from what was saved. */
export async function savedAndSolved(page: Page): Promise<void> {
  await expect(page.getByText('Saved', { exact: true })).toBeVisible();
  await expect(page.getByText(/^Solved \d\d:\d\d/)).toBeVisible();
}
