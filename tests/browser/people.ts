import { expect, type Browser, type Page } from '@playwright/test';

export type DemoPerson = 'admin' | 'designer' | 'commissioning' | 'reviewer' | 'viewer' | 'stranger';

/** Signs in through the page, as a person does; `person` is what stands before the @. */
export async function signIn(page: Page, person: string, password = 'demo-tern-quay'): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(`${person}@ternquay.example`);
  await page.getByLabel('Password', { exact: true }).fill(password);
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

/** Somebody new, for a test that changes what is a person's own: invited by the administrator, and the invitation accepted. */
export async function invite(browser: Browser, person: string, password: string): Promise<void> {
  const context = await browser.newContext();
  const page = await context.newPage();
  await signIn(page, 'admin');
  const site = (await demoNetworkPath(page)).replace(/\/networks\/.*/, '');
  const email = `${person}@ternquay.example`;
  const headers = { 'X-XSRF-TOKEN': await proofOf(page) };
  const invited = await page.request.post(`/api${site}/invitations`, { headers, data: { email, role: 'viewer' } });
  expect(invited.status()).toBe(201);
  const token = async () => {
    const mails = (await (await page.request.get(`/api${site}/received-mails`)).json()) as { id: string; to: string }[];
    const mail = mails.find(({ to }) => to === email);
    if (mail === undefined) return '';
    const { text } = (await (await page.request.get(`/api${site}/received-mails/${mail.id}`)).json()) as {
      text: string;
    };
    return /\/invitation#([\w-]{43})/.exec(text)?.[1] ?? '';
  };
  await expect.poll(token, { timeout: 20_000 }).not.toBe('');
  const data = { token: await token(), name: person, password };
  expect((await page.request.post('/api/links/acceptance', { headers, data })).ok()).toBe(true);
  await context.close();
}

async function proofOf(page: Page): Promise<string> {
  const token = (await page.context().cookies()).find((cookie) => cookie.name === 'XSRF-TOKEN')?.value ?? '';
  return decodeURIComponent(token);
}

/** The demo is for every test: one that changes a network works on a copy of its own. */
export async function copyOfDemo(page: Page, name: string): Promise<string> {
  const demo = await demoNetworkPath(page);
  const file = (await (await page.request.get(`/api/networks/${demo.split('/').at(-1) ?? ''}/file`)).json()) as object;
  const made = await page.request.post(`/api${demo.replace(/\/[^/]*$/, '')}`, {
    headers: { 'X-XSRF-TOKEN': await proofOf(page) },
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
