import AxeBuilder from '@axe-core/playwright';
import type { Page } from '@playwright/test';
import { Secret, TOTP } from 'otpauth';
import { invite, signIn } from './people';
import { expect, test } from './violations';

const OLD = 'slow kettles sing low';
const NEW = 'tall gulls eat my lunch';

test('one’s own account: units, password, codes and recovery codes from the first to the last', async ({
  page,
  browser,
}, { retry }) => {
  test.setTimeout(180_000);
  // of the test's own, since the password does not become the former again
  const who = `uma.${String(retry)}`;
  await invite(browser, who, OLD);
  await signIn(page, who, OLD);
  const elsewhere = await browser.newPage();
  await signIn(elsewhere, who, OLD);
  await openAccount(page);
  await expectNoFindings(page);

  await test.step('units count at once and are kept', async () => {
    await page.getByLabel('Units').selectOption('si');
    await expect(page.getByText('Kept.')).toBeVisible();
    await page.reload();
    await expect(page.getByLabel('Units')).toHaveValue('si');
  });

  await test.step('sessions are listed, this one first', async () => {
    const rows = page.getByRole('region', { name: 'Where you are signed in' }).getByRole('listitem');
    await expect(rows).toHaveCount(2);
    await expect(rows.first()).toContainText('this one');
    await expect(rows.first()).toContainText('Chrome on Linux');
    const third = await browser.newPage();
    await signIn(third, who, OLD);
    await page.reload();
    await expect(rows).toHaveCount(3);
    await page.getByRole('button', { name: 'End all others' }).click();
    await expect(page.getByText('2 ended. You are signed in here only.')).toBeVisible();
    expect((await third.request.get('/api/session')).status()).toBe(401);
    await third.close();
    await signIn(elsewhere, who, OLD);
  });

  await test.step('a new password is judged while it is typed, and ends the other session', async () => {
    const section = page.getByRole('region', { name: 'Password', exact: true });
    const next = section.getByLabel('New password', { exact: true });
    await next.fill('steam');
    await expect(section.getByText('needs at least 12')).toBeVisible();
    await expect(section.getByRole('alert')).toBeEmpty();
    await next.fill('condensate123');
    await expect(section.getByText('among the first that others would try')).toBeVisible();
    await next.fill(NEW);
    await expect(section.getByText('This will do.')).toBeVisible();
    await section.getByLabel('Present password', { exact: true }).fill('not the one I have');
    await section.getByRole('button', { name: 'Change the password' }).click();
    await expect(section.getByText('This is not your present password.')).toBeVisible();
    await expect(section.getByLabel('Present password', { exact: true })).toBeFocused();
    await section.getByLabel('Present password', { exact: true }).fill(OLD);
    await section.getByRole('button', { name: 'Change the password' }).click();
    await expect(section.getByText('every other session has ended')).toBeVisible();
    expect((await page.request.get('/api/session')).status()).toBe(200);
    expect((await elsewhere.request.get('/api/session')).status()).toBe(401);
    await elsewhere.close();
  });

  let secret = '';
  let recovery: string[] = [];
  await test.step('codes are turned on by the first of them', async () => {
    const section = page.getByRole('region', { name: 'One-time codes' });
    await section.getByRole('button', { name: 'Turn codes on' }).click();
    await section.getByLabel('Present password', { exact: true }).fill(NEW);
    await page.keyboard.press('Enter');
    await expect(section.getByRole('img', { name: /QR code/ })).toBeVisible();
    await expectNoFindings(page);
    secret = (await section.locator('.secret').innerText()).replaceAll(' ', '');
    await section.getByLabel('Code that it shows now').fill('000000');
    await page.keyboard.press('Enter');
    await expect(section.getByText('This code is not right')).toBeVisible();
    await section.getByLabel('Code that it shows now').fill(codeOf(secret));
    await page.keyboard.press('Enter');
    await expect(section.getByRole('heading', { name: 'Recovery codes' })).toBeFocused();
    recovery = await section.getByRole('listitem').allInnerTexts();
    expect(recovery).toHaveLength(10);
    const saved = page.waitForEvent('download');
    await section.getByRole('button', { name: 'Save as a text file' }).click();
    expect((await saved).suggestedFilename()).toBe('riseback-recovery-codes.txt');
    await expectNoFindings(page);
    await section.getByRole('button', { name: 'I have kept them' }).click();
    await expect(section.getByText('10 of 10 recovery codes left')).toBeVisible();
    await expectNoFindings(page);
  });

  await test.step('signing in asks for a code, and takes the next one', async () => {
    await signOut(page);
    await credentials(page, who, NEW);
    await expect(page.getByLabel('Code of your authenticator')).toBeFocused();
    await expectNoFindings(page);
    await page.getByLabel('Code of your authenticator').fill('000000');
    await page.keyboard.press('Enter');
    await expect(page.getByText('This code is not right')).toBeVisible();
    // The code that turned them on is spent; the next one counts already, clocks being what they are.
    await page.getByLabel('Code of your authenticator').fill(codeOf(secret, 30));
    await page.keyboard.press('Enter');
    await expect(page.getByRole('heading', { name: 'Sites' })).toBeVisible();
  });

  await test.step('a recovery code lets in once', async () => {
    const [first = ''] = recovery;
    await signOut(page);
    await credentials(page, who, NEW);
    await page.getByRole('button', { name: 'Use a recovery code' }).click();
    await page.getByLabel('Recovery code').fill(first);
    await page.keyboard.press('Enter');
    await expect(page.getByRole('heading', { name: 'Sites' })).toBeVisible();
    await signOut(page);
    await credentials(page, who, NEW);
    await page.getByRole('button', { name: 'Use a recovery code' }).click();
    await page.getByLabel('Recovery code').fill(first);
    await page.keyboard.press('Enter');
    await expect(page.getByText('was used already')).toBeVisible();
    await page.getByLabel('Recovery code').fill(recovery[1] ?? '');
    await page.keyboard.press('Enter');
    await expect(page.getByRole('heading', { name: 'Sites' })).toBeVisible();
  });

  await test.step('codes are turned off with password and code, and everything is as it was', async () => {
    await openAccount(page);
    const section = page.getByRole('region', { name: 'One-time codes' });
    await expect(section.getByText('8 of 10 recovery codes left')).toBeVisible();
    await section.getByRole('button', { name: 'Turn codes off' }).click();
    await section.getByLabel('Present password', { exact: true }).fill(NEW);
    await section.getByLabel('Code', { exact: true }).fill(recovery[2] ?? '');
    await page.keyboard.press('Enter');
    await expect(section.getByText('Codes are off')).toBeVisible();
    await page.getByLabel('Units').selectOption('us');
    await expect(page.getByText('Kept.')).toBeVisible();
  });
});

test('the account page fits a telephone', async ({ page }) => {
  await signIn(page, 'viewer');
  await openAccount(page);
  for (const width of [1440, 390, 320]) {
    await page.setViewportSize({ width, height: 844 });
    const overflow = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(overflow, `${String(width)} px`).toBeLessThanOrEqual(0);
  }
});

/** Six digits by this side's own reckoning; `ahead` seconds from now. */
function codeOf(secret: string, ahead = 0): string {
  return new TOTP({ secret: Secret.fromBase32(secret) }).generate({ timestamp: Date.now() + ahead * 1000 });
}

async function openAccount(page: Page): Promise<void> {
  await page.getByRole('button', { name: /^You:/ }).click();
  await page.getByRole('menuitem', { name: 'Your account' }).click();
  await expect(page.getByRole('heading', { name: 'Your account' })).toBeVisible();
  await expect(page.getByText('this one')).toBeVisible();
}

async function signOut(page: Page): Promise<void> {
  await page.getByRole('button', { name: /^You:/ }).click();
  await page.getByRole('menuitem', { name: 'Sign out' }).click();
  await expect(page.getByRole('button', { name: 'Sign in' })).toBeVisible();
}

async function credentials(page: Page, who: string, password: string): Promise<void> {
  await page.getByLabel('E-mail').fill(`${who}@ternquay.example`);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

async function expectNoFindings(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
  }
}
