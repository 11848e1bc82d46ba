import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from '@playwright/test';
import { signIn } from './people';
import { expect, test } from './violations';

const PASSWORD = 'tall gulls eat my lunch';
const NEXT_PASSWORD = 'slow ferries carry cold tea';

/** Of this run alone: a second try must not meet whom the first one invited. */
const unique = `${String(Date.now() % 1_000_000)}`;

test('somebody is invited, accepts in another browser, signs in with the role, gets another one and loses it', async ({
  page,
  browser,
}) => {
  test.setTimeout(180_000);
  const email = `bo.${unique}@quay.example`;
  const name = `Bo Lind ${unique}`;
  await signIn(page, 'admin');
  await page.getByRole('link', { name: /Tern Quay Cannery/ }).click();
  await page.getByRole('link', { name: 'People' }).click();
  const people = page.getByRole('region', { name: 'With a role here' });
  const invited = page.getByRole('region', { name: 'Invited' });

  await test.step('a pasted list: what is no address stays in the box and is named', async () => {
    const box = page.getByLabel('E-mail addresses, a line each');
    await box.fill(`${email}\nnobody at all`);
    await page.getByLabel('Role', { exact: true }).selectOption('reviewer');
    await page.getByRole('button', { name: 'Send 2 invitations' }).click();
    await expect(page.getByText('1 invitation is on its way. 1 line needs mending.')).toBeVisible();
    await expect(page.getByText('Line 1, nobody at all: is not an e-mail address')).toBeVisible();
    await expect(box).toHaveValue('nobody at all');
    await expect(row(invited, email)).toContainText('as reviewer');
    await expectNoFindings(page);
    await box.fill(email);
    await page.getByRole('button', { name: 'Send the invitation' }).click();
    await expect(page.getByText('An invitation to this address is open.')).toBeVisible();
  });

  const invitation = await test.step('the mail is read on the page of mails', async () => {
    await page.getByRole('link', { name: 'Mails' }).click();
    const address = await linkInMail(page, email);
    await expect(page.getByText('Message-ID')).toBeVisible();
    await expect(
      page.getByRole('region', { name: 'Sent and waiting' }).getByRole('listitem').filter({ hasText: email }).first(),
    ).toContainText('Sent');
    await expectNoFindings(page);
    return address;
  });

  const theirs = await anonymousPage(browser);
  await test.step('the link leaves the address bar, and says who invites to what', async () => {
    await theirs.goto(invitation);
    await expect(theirs.getByRole('heading', { name: /invites you to Tern Quay Cannery/ })).toBeVisible();
    await expect(theirs).toHaveURL(/\/invitation$/);
    await expect(theirs.getByText('reviewer', { exact: true })).toBeVisible();
    await expectNoFindings(theirs);
  });

  await test.step('a new account: a bad password is refused, by keyboard alone', async () => {
    await theirs.getByLabel('Your name, as others read it').fill(name);
    await theirs.keyboard.press('Tab');
    await theirs.keyboard.type('condensate123');
    await theirs.keyboard.press('Enter');
    await expect(theirs.getByText('among the first that others would try')).toBeVisible();
    await expect(theirs.getByLabel('New password', { exact: true })).toBeFocused();
    await theirs.getByLabel('New password', { exact: true }).fill(PASSWORD);
    await theirs.keyboard.press('Enter');
    await expect(theirs.getByRole('heading', { name: 'Welcome to Tern Quay Cannery' })).toBeVisible();
    await theirs.getByRole('link', { name: 'To your sites' }).click();
    await expect(theirs.getByText('You are reviewer')).toBeVisible();
  });

  await test.step('a reviewer sees no page of people; a spent link says what to do', async () => {
    const site = await sitePath(page);
    await theirs.goto(`${site}/people`);
    await expect(theirs.getByText('This page is for the administrators of the site')).toBeVisible();
    await expect(theirs.getByRole('region', { name: 'With a role here' })).toHaveCount(0);
    await theirs.goto(site);
    await expect(theirs.getByRole('link', { name: 'Trap library' })).toBeVisible();
    await expect(theirs.getByRole('link', { name: 'People' })).toHaveCount(0);
    await theirs.goto(`${site}/mails`);
    await expect(theirs.getByText('This page is for the administrators of the site')).toBeVisible();
    const other = await anonymousPage(browser);
    await other.goto(invitation);
    await expect(other.getByText('If you have accepted it already')).toBeVisible();
    await other.reload();
    await expect(other.getByText('Open the link in the mail once more')).toBeVisible();
    await other.context().close();
  });

  await test.step('another role is given from the keyboard, which ends the session', async () => {
    await page.getByRole('link', { name: 'People' }).click();
    await page.getByRole('button', { name: `Change role of ${name}` }).focus();
    await page.keyboard.press('Enter');
    const dialog = page.getByRole('dialog');
    await dialog.getByRole('radio', { name: /^Reviewer/ }).focus();
    await page.keyboard.press('ArrowUp');
    await expect(dialog.getByText('No longer: returns or signs revisions')).toBeVisible();
    await expectNoFindings(page);
    await dialog.getByRole('button', { name: 'Give the role' }).press('Enter');
    await expect(page.getByText(`${name} is designer now.`)).toBeVisible();
    await expect(row(people, name)).toContainText('Designer');
    expect((await theirs.request.get('/api/session')).status()).toBe(401);
  });

  await test.step('the account is disabled and enabled, and the role taken away', async () => {
    await choose(page, name, 'Disable the account', 'Disable');
    await expect(row(people, name)).toContainText('Disabled');
    await expectNoFindings(page);
    await credentials(theirs, email, PASSWORD);
    await expect(theirs.getByText('address or the password is wrong')).toBeVisible();
    await choose(page, name, 'Enable the account', 'Enable');
    await expect(row(people, name)).not.toContainText('Disabled');
    await choose(page, name, 'Take the role away', 'Take away');
    await expect(page.getByText(`${name} has no role here any more.`)).toBeVisible();
    await expect(row(people, name)).toHaveCount(0);
  });

  await test.step('an account that is there already accepts with its own password', async () => {
    await page.getByLabel('E-mail addresses, a line each').fill(email);
    await page.getByRole('button', { name: 'Send the invitation' }).click();
    await expect(row(invited, email)).toContainText('as viewer');
    await page.getByRole('button', { name: `Send again to ${email}` }).click();
    await expect(page.getByText('the one before no longer counts')).toBeVisible();
    await page.getByRole('link', { name: 'Mails' }).click();
    await theirs.goto(await linkInMail(page, email, 3));
    await theirs.getByLabel('Your password', { exact: true }).fill('not the one I have');
    await theirs.keyboard.press('Enter');
    await expect(theirs.getByText('address or the password is wrong')).toBeVisible();
    await theirs.getByLabel('Your password', { exact: true }).fill(PASSWORD);
    await theirs.keyboard.press('Enter');
    await expect(theirs.getByText('You are viewer there from now on.')).toBeVisible();
  });
  await theirs.context().close();
});

test('a forgotten password is chosen anew by a link, whose page masks it, shows it on demand and takes a paste', async ({
  page,
  browser,
}) => {
  test.setTimeout(120_000);
  const email = `uli.${unique}@quay.example`;
  await signIn(page, 'admin');
  const site = await sitePath(page);
  await page.goto(`${site}/people`);
  await page.getByLabel('E-mail addresses, a line each').fill(email);
  await page.getByRole('button', { name: 'Send the invitation' }).click();
  await expect(page.getByText('1 invitation is on its way.')).toBeVisible();
  await page.goto(`${site}/mails`);
  const theirs = await anonymousPage(browser);
  await theirs.goto(await linkInMail(page, email));
  await theirs.getByLabel('Your name, as others read it').fill(`Uli ${unique}`);
  await theirs.getByLabel('New password', { exact: true }).fill(PASSWORD);
  await theirs.keyboard.press('Enter');
  await expect(theirs.getByRole('heading', { name: 'Welcome to Tern Quay Cannery' })).toBeVisible();

  await test.step('the answer is the same for an address that nobody has', async () => {
    const other = await anonymousPage(browser);
    for (const address of [`nobody.${unique}@quay.example`, email]) {
      await other.goto('/sign-in');
      await other.getByRole('link', { name: 'Forgotten password' }).click();
      await expect(other.getByRole('heading', { name: 'Forgotten password' })).toBeVisible();
      await other.getByLabel('E-mail').fill(address);
      await other.keyboard.press('Enter');
      await expect(other.getByRole('status')).toHaveText(
        new RegExp(`^\\s*If there is an account under ${address.replaceAll('.', '\\.')}, a link is on its way there`),
      );
    }
    await expectNoFindings(other);
    await other.context().close();
  });

  await test.step('the new password counts, and every session of before has ended', async () => {
    await page.reload();
    const other = await anonymousPage(browser, ['clipboard-read', 'clipboard-write']);
    await other.goto(await linkInMail(page, email, 2));
    await expect(other).toHaveURL(/\/password-reset$/);
    const box = other.getByLabel('New password', { exact: true });
    await expect(box).toHaveAttribute('type', 'password');
    await expect(box).toHaveAttribute('autocomplete', 'new-password');
    await other.evaluate((text) => navigator.clipboard.writeText(text), NEXT_PASSWORD);
    await box.focus();
    await other.keyboard.press('Control+V');
    await expect(box).toHaveValue(NEXT_PASSWORD);
    await other.getByRole('button', { name: /^Show what is typed/ }).click();
    await expect(box).toHaveAttribute('type', 'text');
    await expectNoFindings(other);
    await box.press('Enter');
    await expect(other.getByText('every session of yours has ended')).toBeVisible();
    expect((await theirs.request.get('/api/session')).status()).toBe(401);
    await credentials(other, email, PASSWORD);
    await expect(other.getByText('address or the password is wrong')).toBeVisible();
    await credentials(other, email, NEXT_PASSWORD);
    await expect(other.getByRole('heading', { name: 'Sites' })).toBeVisible();
    await other.context().close();
  });
  await theirs.context().close();
});

test('which mails one gets is chosen by ticks that are kept; the pages of people and mails fit a telephone', async ({
  page,
}) => {
  await signIn(page, 'stranger');
  await page.goto('/account');
  const mails = page.getByRole('region', { name: 'Mails' });
  const tick = mails.getByLabel('Somebody names me in a comment');
  await expect(tick).toBeChecked();
  await tick.press('Space');
  await expect(mails.getByText('Kept.')).toBeVisible();
  await page.reload();
  await expect(tick).not.toBeChecked();
  await tick.press('Space');
  await expect(mails.getByText('Kept.')).toBeVisible();
  await page.context().clearCookies();

  await signIn(page, 'admin');
  const site = await sitePath(page);
  for (const path of [
    `${site}/people`,
    `${site}/mails`,
    site,
    '/forgotten-password',
    '/invitation',
    '/password-reset',
  ]) {
    for (const width of [1440, 390, 320]) {
      await page.setViewportSize({ width, height: 844 });
      await page.goto(path);
      await page.waitForLoadState('networkidle');
      const overflow = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
      expect(overflow, `${path} at ${String(width)} px`).toBeLessThanOrEqual(0);
    }
  }
});

/** A browser of somebody who is not signed in. */
async function anonymousPage(browser: Browser, permissions: string[] = []): Promise<Page> {
  return (await browser.newContext({ permissions })).newPage();
}

async function sitePath(page: Page): Promise<string> {
  const sites = (await (await page.request.get('/api/sites')).json()) as { id: string; name: string }[];
  const site = sites.find(({ name }) => name === 'Tern Quay Cannery');
  if (site === undefined) throw new Error('The demo has no site');
  return `/sites/${site.id}`;
}

/** Waits for the `nth` mail to an address on the page of mails, and reads the link in the newest. */
async function linkInMail(page: Page, email: string, nth = 1): Promise<string> {
  const letters = page.getByRole('region', { name: 'Received here' }).getByRole('link').filter({ hasText: email });
  await expect(async () => {
    await page.getByRole('button', { name: 'Look again' }).click();
    await expect(letters).toHaveCount(nth, { timeout: 1_000 });
  }).toPass();
  await letters.first().click();
  const link = page.locator('app-mail-reader').getByRole('link');
  await expect(page.locator('app-mail-reader')).toContainText(email);
  const address = await link.filter({ hasText: '#' }).getAttribute('href');
  if (address === null) throw new Error('The mail has no link');
  return address;
}

function row(region: ReturnType<Page['getByRole']>, text: string): ReturnType<Page['getByRole']> {
  return region.getByRole('listitem').filter({ hasText: text });
}

/** From the menu of a person, with the question that comes before. */
async function choose(page: Page, name: string, what: string, act: string): Promise<void> {
  await page.getByRole('button', { name: `More for ${name}` }).click();
  await page.getByRole('menuitem', { name: what }).click();
  await page.getByRole('dialog').getByRole('button', { name: act, exact: true }).click();
}

async function credentials(page: Page, email: string, password: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

async function expectNoFindings(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
  }
  await page.emulateMedia({ colorScheme: 'light' });
}
