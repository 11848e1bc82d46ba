import type { Browser, Page } from '@playwright/test';
import { readFile } from 'node:fs/promises';
import { readPdf } from '../api/pdf-reading';
import { copyOfDemo, type DemoPerson, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const PASSWORD = 'demo-tern-quay';
const JOINED_PASSWORD = 'tall gulls eat my lunch';
/** Of this run alone: a second try must not meet whom the first one invited. */
const unique = `${String(Date.now() % 1_000_000)}`;

test('from a submission over mail, return and mending to a signature and the report that a viewer reads', async ({
  page,
  browser,
}) => {
  test.setTimeout(180_000);
  await signIn(page, 'designer');
  const name = `Signed off ${unique}`;
  const network = await copyOfDemo(page, name);
  const site = network.replace(/\/networks\/.*/u, '');
  await page.goto(`${network}/drawing`);
  await savedAndSolved(page);
  const admin = await openAs(browser, 'admin');

  await test.step('the designer submits, and cannot sign', async () => {
    await freezeAndSubmit(page, network, 'As surveyed', 'First issue of the hall.');
    await expect(page.getByText('A, under review.')).toBeVisible();
    await expect(page.getByText('Reviewers sign revisions; your role here does not.')).toBeVisible();
    expect((await page.request.get(`/api${await revisionPath(page, network)}/signing`)).status()).toBe(403);
  });

  const reviewer = await openAs(browser, 'reviewer');
  await test.step('the mail of it leads the reviewer to the revision', async () => {
    const mail = await openMail(admin, site, `Revision A of ${name} is issued for review`, 'reviewer@ternquay.example');
    await expect(mail).toContainText(/30 traps: \d+ fail, \d+ to watch[\s\S]*Highest back pressure \(.*psig/);
    await reviewer.goto(await linkOf(admin));
    await expect(reviewer.getByText('A, under review.')).toBeVisible();
  });

  await test.step('a comment on a pipe, and back to the designer', async () => {
    await reviewer.getByRole('link', { name: 'See it as frozen' }).click();
    await expect(reviewer.getByText('Revision A, frozen: cannot be edited.')).toBeVisible();
    await reviewer.goto(`${new URL(reviewer.url()).pathname}?element=L24`);
    await reviewer.getByRole('tab', { name: 'Comments' }).click();
    await reviewer.getByLabel(/^New comment on /).fill('Too small for all eight retorts.');
    await reviewer.getByRole('button', { name: 'Comment', exact: true }).click();
    await expect(reviewer.getByRole('article', { name: /^Comment 1: / })).toBeVisible();
    await reviewer.getByRole('link', { name: 'Review and sign' }).click();
    await reviewer.getByRole('button', { name: 'Return with comments' }).click();
    await reviewer.getByLabel('Why it is returned').fill('See the road crossing.');
    await reviewer.getByRole('button', { name: 'Return with comments' }).click();
    await expect(reviewer.getByText('Revision A is returned.')).toBeVisible();
  });

  await test.step('the mails lead the designer to the comment, who answers, mends and submits the next letter', async () => {
    const designer = 'designer@ternquay.example';
    const returned = await openMail(admin, site, `Revision A of ${name} was returned`, designer);
    await expect(returned).toContainText('See the road crossing.');
    const comment = await openMail(admin, site, `commented on CR-1 road crossing in revision A of ${name}`, designer);
    await expect(comment).toContainText('Too small for all eight retorts.');
    await page.goto(await linkOf(admin));
    await expect(page.getByText('Too small for all eight retorts.').first()).toBeVisible();
    await page.goto(`${network}/drawing?element=L24`);
    await page.getByRole('tab', { name: /^Comments/ }).click();
    await page.getByRole('button', { name: 'Answer comment 1' }).click();
    await page.getByLabel('Answer to comment 1').fill('It is 3 in now.');
    await page.getByRole('button', { name: 'Answer', exact: true }).click();
    await page.getByRole('button', { name: 'Resolve comment 1' }).click();
    await page.getByRole('tab', { name: 'Inputs' }).click();
    await page.getByLabel('Size', { exact: true }).selectOption('3');
    await savedAndSolved(page);
    await freezeAndSubmit(page, network, 'Wider crossing', 'The road crossing in 3 in.');
    await expect(page.getByText('B, under review.')).toBeVisible();
  });

  const revision = await revisionPath(page, network);
  await test.step('a copied cookie does not sign: the password is asked for', async () => {
    const thief = await (await browser.newContext({ storageState: await reviewer.context().storageState() })).newPage();
    const terms = await thief.request.get(`/api${revision}/signing?meaning=approved`);
    const { token } = (await terms.json()) as { token: string };
    const sign = { meaning: 'approved', token };
    expect(await post(thief, `/api${revision}/signatures`, sign)).toBe(400);
    expect(await post(thief, `/api${revision}/signatures`, { ...sign, password: 'a guess of twelve' })).toBe(422);
    await thief.context().close();
  });

  await test.step('whoever edited it does not sign, also as a reviewer by now', async () => {
    const email = `ada.${unique}@quay.example`;
    const joined = await (await browser.newContext()).newPage();
    await post(admin, `/api${site}/invitations`, { email, role: 'designer' });
    await openMail(admin, site, 'invites you', email);
    await joined.goto(await linkOf(admin));
    await joined.getByLabel('Your name, as others read it').fill(`Ada ${unique}`);
    await joined.getByLabel('New password', { exact: true }).fill(JOINED_PASSWORD);
    await joined.keyboard.press('Enter');
    await expect(joined.getByRole('heading', { name: /^Welcome to / })).toBeVisible();
    const ops = [{ op: 'set', in: 'nodes', id: 'TR1', key: 'note', to: 'Seen on site.' }];
    const edit = { batchId: crypto.randomUUID(), label: 'note at RT-1', ops };
    const api = `/api/networks/${network.split('/').at(-1) ?? ''}`;
    expect(await post(joined, `${api}/edits`, edit, { 'If-Match': '"2"' })).toBe(200);
    await freezeAndSubmit(page, network, 'Noted', 'A note at RT-1.');
    const people = (await (await admin.request.get(`/api${site}/people`)).json()) as { id: string; email: string }[];
    const person = people.find((each) => each.email === email)?.id ?? '';
    const role = { headers: await proof(admin), data: { role: 'reviewer' } };
    expect((await admin.request.put(`/api${site}/people/${person}`, role)).status()).toBe(200);
    await joined.goto('/sign-in');
    await joined.getByLabel('E-mail').fill(email);
    await joined.getByLabel('Password', { exact: true }).fill(JOINED_PASSWORD);
    await joined.getByRole('button', { name: 'Sign in' }).click();
    await expect(joined.getByRole('heading', { name: 'Sites' })).toBeVisible();
    await joined.goto(`${network}/revisions`);
    await expect(joined.getByText('C, under review.')).toBeVisible();
    await expect(joined.getByText(/^You edited .* Another reviewer has to sign it\.$/)).toBeVisible();
    await expect(joined.getByRole('button', { name: 'Sign revision C' })).toHaveCount(0);
    await joined.context().close();
  });

  await test.step('the reviewer reads what the signature says and signs with the password', async () => {
    await reviewer.goto(`${network}/revisions`);
    await expect(reviewer.getByRole('group', { name: 'What a signature says here' })).toContainText('revision C');
    for (const line of await reviewer.getByRole('group', { name: 'Before you sign' }).getByRole('checkbox').all())
      await line.check();
    await reviewer.getByLabel('Your password, once more', { exact: true }).fill(PASSWORD);
    await reviewer.getByRole('button', { name: 'Sign revision C' }).click();
    await expect(reviewer.getByText('You signed revision C as approved.')).toBeVisible();
    const approved = await openMail(admin, site, `Revision C of ${name} is approved`, 'designer@ternquay.example');
    await expect(approved).toContainText('signed it as approved');
  });

  await test.step('a viewer has its report made and reads who signed what', async () => {
    const viewer = await openAs(browser, 'viewer');
    await viewer.goto(`${network}/report`);
    const options = viewer.getByLabel('Report of').locator('option');
    await viewer.getByLabel('Report of').selectOption(await options.filter({ hasText: 'Revision C' }).innerText());
    await viewer.getByRole('button', { name: 'Make the report' }).click();
    const link = viewer.getByRole('link', { name: /^Download / });
    await expect(link).toBeVisible({ timeout: 30_000 });
    const begun = viewer.waitForEvent('download');
    await link.click();
    const { pages } = await readPdf(await readFile(await (await begun).path()));
    const cover = pages[0]?.join('\n') ?? '';
    expect(cover).toContain('Revision C, approved');
    expect(cover).toContain('Signed as approved by Greta Lowndes, reviewer');
    const file = (await (await viewer.request.get(`/api${await revisionPath(viewer, network)}`)).json()) as {
      fileHash: string;
    };
    for (const lines of pages) expect(lines.join('\n')).toContain(file.fileHash);
    await viewer.context().close();
  });
  await reviewer.context().close();
  await admin.context().close();
});

/** Another person at another machine. */
async function openAs(browser: Browser, person: DemoPerson): Promise<Page> {
  const page = await (await browser.newContext()).newPage();
  await signIn(page, person);
  return page;
}

async function freezeAndSubmit(page: Page, network: string, title: string, reason: string): Promise<void> {
  await page.goto(`${network}/revisions?revision=working`);
  await page.getByRole('button', { name: 'Freeze a revision' }).first().click();
  const dialog = page.getByRole('dialog', { name: 'Freeze a revision' });
  await dialog.getByLabel('Title').fill(title);
  await dialog.getByLabel('Reason').fill(reason);
  await dialog.getByRole('button', { name: 'Freeze', exact: true }).click();
  await expect(dialog).toBeHidden();
  await page.getByRole('button', { name: 'Submit for review' }).click();
  await page.getByLabel('Note to the reviewers').fill('Look at the lift first.');
  await page.getByRole('button', { name: 'Submit for review' }).click();
}

/** Of the newest, without `/api`. */
async function revisionPath(page: Page, network: string): Promise<string> {
  const revisions = `/networks/${network.split('/').at(-1) ?? ''}/revisions`;
  const [newest] = (await (await page.request.get(`/api${revisions}`)).json()) as { id: string }[];
  return `${revisions}/${newest?.id ?? ''}`;
}

/** Waits for a mail on the page of mails and opens it. */
async function openMail(admin: Page, site: string, subject: string, to: string): Promise<ReturnType<Page['locator']>> {
  await admin.goto(`${site}/mails`);
  const letters = admin.getByRole('region', { name: 'Received here' }).getByRole('link');
  const letter = letters.filter({ hasText: subject }).filter({ hasText: to });
  await expect(async () => {
    await admin.getByRole('button', { name: 'Look again' }).click();
    await expect(letter.first()).toBeVisible({ timeout: 1_000 });
  }).toPass();
  await letter.first().click();
  const reader = admin.locator('app-mail-reader');
  await expect(reader).toContainText(to);
  return reader;
}

/** Where the mail that is open leads. */
async function linkOf(admin: Page): Promise<string> {
  const address = await admin.locator('app-mail-reader').getByRole('link').first().getAttribute('href');
  if (address === null) throw new Error('The mail has no link');
  return address;
}

async function post(page: Page, path: string, data: object, headers: Record<string, string> = {}): Promise<number> {
  return (await page.request.post(path, { headers: { ...(await proof(page)), ...headers }, data })).status();
}

async function proof(page: Page): Promise<Record<string, string>> {
  const token = (await page.context().cookies()).find((cookie) => cookie.name === 'XSRF-TOKEN')?.value ?? '';
  return { 'X-XSRF-TOKEN': decodeURIComponent(token) };
}
