import type { Page } from '@playwright/test';
import { copyOfDemo, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const TRAP = 'TR1';
/** So soon what was typed must be on the device. */
const ON_DEVICE_WITHIN_MS = 300;

const field = (page: Page, label: string) =>
  page.getByRole('complementary', { name: 'Inspector' }).getByLabel(label, { exact: true });

async function openInputs(page: Page, network: string): Promise<void> {
  await page.goto(`${network}/drawing?element=${TRAP}`);
  await page.getByRole('complementary', { name: 'Inspector' }).getByRole('tab', { name: 'Inputs' }).click();
  await expect(field(page, 'Load')).toBeVisible();
}

const versionOf = async (page: Page, network: string) =>
  ((await (await page.request.get(`/api/networks/${network.split('/').at(-1) ?? ''}`)).json()) as { version: number })
    .version;

/** Measures within the page from the moment of the next change until a draft lies in the browser's database. */
async function timeNextDraft(page: Page): Promise<() => Promise<number>> {
  await page.evaluate(() => {
    const measured = new Promise<number>((resolve) => {
      document.addEventListener(
        'keydown',
        (event) => {
          if (event.key !== 'Enter') return;
          const began = performance.now();
          const opened = indexedDB.open('riseback-drafts', 1);
          // the page may not have made it yet
          opened.onupgradeneeded = () => opened.result.createObjectStore('drafts');
          opened.onsuccess = () => {
            const look = (): void => {
              const count = opened.result.transaction('drafts').objectStore('drafts').count();
              count.onsuccess = () => {
                if (count.result > 0) resolve(performance.now() - began);
                else setTimeout(look, 5);
              };
            };
            look();
          };
        },
        { capture: true },
      );
    });
    Object.assign(globalThis, { measured });
  });
  return () => page.evaluate(() => (globalThis as unknown as { measured: Promise<number> }).measured);
}

/** How many drafts lie in the browser's database, whosever they are. */
function draftCount(page: Page): Promise<number> {
  return page.evaluate(
    () =>
      new Promise<number>((resolve) => {
        const opened = indexedDB.open('riseback-drafts', 1);
        opened.onsuccess = () => {
          const count = opened.result.transaction('drafts').objectStore('drafts').count();
          count.onsuccess = () => resolve(count.result);
        };
      }),
  );
}

test('what is typed without a network is on the device within 300 ms, and goes out by itself when the network is back', async ({
  page,
  context,
}) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Network lost and found');
  await openInputs(page, network);
  await savedAndSolved(page);
  await context.setOffline(true);
  const measured = await timeNextDraft(page);
  await field(page, 'Load').fill('611 lb/h');
  await field(page, 'Load').press('Enter');
  const tookMs = await measured();
  process.stdout.write(`on the device after ${tookMs.toFixed(0)} ms\n`);
  expect(tookMs).toBeLessThan(ON_DEVICE_WITHIN_MS);
  await expect(page.getByText('Saved', { exact: true })).toHaveCount(0);
  await expect(page.getByText('Not saved', { exact: true })).toBeVisible({ timeout: 15_000 });
  expect(await versionOf(page, network).catch(() => 1)).toBe(1);
  await context.setOffline(false);
  await savedAndSolved(page);
  expect(await versionOf(page, network)).toBe(2);
  await expect
    .poll(() =>
      page.evaluate(
        () =>
          new Promise<number>((resolve) => {
            const opened = indexedDB.open('riseback-drafts', 1);
            opened.onsuccess = () => {
              const count = opened.result.transaction('drafts').objectStore('drafts').count();
              count.onsuccess = () => resolve(count.result);
            };
          }),
      ),
    )
    .toBe(0);
});

test('“Saved” waits for the server’s word', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Slow to answer');
  await openInputs(page, network);
  await savedAndSolved(page);
  let letGo: () => void = () => undefined;
  const held = new Promise<void>((resolve) => {
    letGo = resolve;
  });
  await page.route('**/edits', async (route) => {
    // a batch is safe to send twice, and a connection kept open may be closed just then
    const response = await route.fetch({ maxRetries: 3 });
    await held;
    await route.fulfill({ response });
  });
  // the stream says it too: only the answer is to be watched here
  await page.route('**/events*', (route) => route.abort());
  await page.reload();
  await openInputs(page, network);
  await field(page, 'Load').fill('612 lb/h');
  await field(page, 'Load').press('Enter');
  await expect.poll(() => versionOf(page, network)).toBe(2);
  await expect(page.getByText('Saving', { exact: true })).toBeVisible();
  await expect(page.getByText('Saved', { exact: true })).toHaveCount(0);
  letGo();
  await expect(page.getByText('Saved', { exact: true })).toBeVisible();
});

test('a tab that is closed in the middle of a field keeps what stands in it', async ({ browser }) => {
  const context = await browser.newContext();
  const page = await context.newPage();
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Closed while typing');
  await openInputs(page, network);
  await savedAndSolved(page);
  await context.setOffline(true);
  await field(page, 'Load').fill('613 lb/h');
  page.on('dialog', (dialog) => void dialog.accept());
  const closed = page.waitForEvent('close');
  await page.close({ runBeforeUnload: true });
  await closed;
  await context.setOffline(false);

  const again = await context.newPage();
  await openInputs(again, network);
  await again.getByRole('button', { name: 'Bring them in' }).click();
  await expect(field(again, 'Load')).toHaveValue('613');
  await savedAndSolved(again);
  expect(await versionOf(again, network)).toBe(2);
  await context.close();
});

test('two windows of one person see each other’s edits, and what one leaves behind comes in once', async ({
  browser,
}) => {
  const context = await browser.newContext();
  const page = await context.newPage();
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Two windows');
  await openInputs(page, network);
  const second = await context.newPage();
  await openInputs(second, network);
  await savedAndSolved(second);
  await expect(page.getByText('Also here')).toHaveCount(0);
  await field(second, 'Load').fill('614 lb/h');
  await field(second, 'Load').press('Enter');
  await page.bringToFront();
  await expect(field(page, 'Load')).toHaveValue('614');
  await expect(page.getByText('You, in another window, changed').first()).toBeAttached();

  await test.step('a window that lives keeps its drafts to itself; those of a crashed one are offered, and come in once', async () => {
    await context.setOffline(true);
    await field(second, 'Load').fill('615 lb/h');
    await field(second, 'Load').press('Enter');
    await second.waitForTimeout(ON_DEVICE_WITHIN_MS);
    await context.setOffline(false);
    const crashed = second.waitForEvent('crash');
    await second.goto('chrome://crash').catch(() => undefined);
    await Promise.race([crashed, second.waitForTimeout(2_000)]);
    await second.close();
    const third = await context.newPage();
    await openInputs(third, network);
    const fourth = await context.newPage();
    await openInputs(fourth, network);
    const bring = (tab: Page) => tab.getByRole('button', { name: 'Bring them in' });
    // the crash may have come after the network was back, and the edit with it
    if ((await versionOf(third, network)) === 2) {
      await expect(bring(fourth)).toBeVisible();
      await third.bringToFront();
      await bring(third).dblclick();
      await savedAndSolved(third);
      await fourth.bringToFront();
      await bring(fourth).click();
      await expect(bring(fourth)).toHaveCount(0);
    }
    await expect(field(fourth, 'Load')).toHaveValue('615');
    expect(await versionOf(fourth, network)).toBe(3);
  });
  await context.close();
});

test('whoever signs out with unsaved work is asked: kept it is offered on return, discarded it is gone', async ({
  page,
}) => {
  test.setTimeout(120_000);
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Unsaved at sign-out');
  await openInputs(page, network);
  await savedAndSolved(page);
  // only saving fails: whoever has no network at all cannot sign out either
  await page.route('**/edits', (route) => route.abort());
  await field(page, 'Load').fill('612 lb/h');
  await field(page, 'Load').press('Enter');
  await expect(page.getByText('Not saved', { exact: true })).toBeVisible({ timeout: 15_000 });
  const leave = async (choice: string) => {
    await page.getByRole('button', { name: /^You:/ }).click();
    await page.getByRole('menuitem', { name: 'Sign out' }).click();
    await page.getByRole('dialog').getByRole('button', { name: choice }).click();
  };
  const offer = page.getByRole('button', { name: 'Bring them in' });

  await leave('Stay signed in');
  await expect(field(page, 'Load')).toBeVisible();
  await leave('Keep here and sign out');
  await expect(page.getByRole('button', { name: 'Sign in' })).toBeVisible();
  expect(await draftCount(page)).toBe(1);
  await signIn(page, 'designer');
  await page.goto(`${network}/drawing`);
  await expect(offer).toBeVisible();
  await leave('Discard and sign out');
  await expect(page.getByRole('button', { name: 'Sign in' })).toBeVisible();
  await expect.poll(() => draftCount(page)).toBe(0);
  await signIn(page, 'designer');
  await page.goto(`${network}/drawing`);
  await expect(page.getByText(/^Solved \d\d:\d\d/)).toBeVisible();
  await expect(offer).toHaveCount(0);
});
