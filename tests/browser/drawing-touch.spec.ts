import type { CDPSession, Page } from '@playwright/test';
import { copyOfDemo, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

test.use({ hasTouch: true });

interface Finger {
  readonly x: number;
  readonly y: number;
}

const sheet = (page: Page) => page.getByRole('application');
const element = (page: Page, tag: string) => sheet(page).getByRole('button', { name: new RegExp(`^${tag},`) });
const zoom = async (page: Page) => Number.parseInt((await page.locator('.zoom').textContent()) ?? '', 10);

async function openCopy(page: Page, name: string): Promise<CDPSession> {
  await signIn(page, 'designer');
  const path = await copyOfDemo(page, name);
  await page.goto(`${path}/drawing`);
  await savedAndSolved(page);
  return page.context().newCDPSession(page);
}

async function touch(cdp: CDPSession, type: 'touchStart' | 'touchMove' | 'touchEnd', fingers: readonly Finger[]) {
  await cdp.send('Input.dispatchTouchEvent', { type, touchPoints: fingers.map((finger, id) => ({ ...finger, id })) });
}

async function drag(cdp: CDPSession, from: Finger, to: Finger): Promise<void> {
  await touch(cdp, 'touchStart', [from]);
  for (let i = 1; i <= 6; i++)
    await touch(cdp, 'touchMove', [{ x: from.x + ((to.x - from.x) * i) / 6, y: from.y + ((to.y - from.y) * i) / 6 }]);
  await touch(cdp, 'touchEnd', []);
}

async function middleOf(page: Page, tag: string): Promise<Finger> {
  const box = await element(page, tag).locator('circle.hit').first().boundingBox();
  if (box === null) throw new Error(`${tag} is not on the screen`);
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
}

test('two fingers zoom about what lies between them and pan with it', async ({ page }) => {
  const cdp = await openCopy(page, 'Pinched');
  const before = await middleOf(page, 'RT-5');
  const zoomBefore = await zoom(page);
  const pair = (apart: number, shift = 0): Finger[] => [
    { x: before.x - apart + shift, y: before.y },
    { x: before.x + apart + shift, y: before.y },
  ];
  await touch(cdp, 'touchStart', pair(40));
  for (const apart of [50, 60, 70, 80]) await touch(cdp, 'touchMove', pair(apart));
  await touch(cdp, 'touchMove', pair(80, 30));
  await touch(cdp, 'touchEnd', []);
  const after = await middleOf(page, 'RT-5');
  expect((await zoom(page)) / zoomBefore).toBeGreaterThan(1.8);
  expect((await zoom(page)) / zoomBefore).toBeLessThan(2.2);
  expect(Math.abs(after.x - before.x - 30)).toBeLessThan(4);
  expect(Math.abs(after.y - before.y)).toBeLessThan(4);
  await expect(sheet(page).locator('[aria-pressed=true]')).toHaveCount(0);
});

test('one finger pans, taps to select, and then moves what is selected', async ({ page }) => {
  const cdp = await openCopy(page, 'Touched');
  const start = await middleOf(page, 'RT-5');
  await drag(cdp, start, { x: start.x + 80, y: start.y + 40 });
  const panned = await middleOf(page, 'RT-5');
  expect(panned.x - start.x).toBeGreaterThan(60);
  await expect(sheet(page).locator('[aria-pressed=true]')).toHaveCount(0);
  await expect(page.getByRole('button', { name: 'Undo', exact: true })).toBeDisabled();

  await page.touchscreen.tap(panned.x, panned.y);
  await expect(element(page, 'RT-5')).toHaveAttribute('aria-pressed', 'true');
  const chosen = await middleOf(page, 'RT-5');
  const neighbour = await middleOf(page, 'RT-7');
  await drag(cdp, chosen, { x: chosen.x, y: chosen.y - 60 });
  const moved = await middleOf(page, 'RT-5');
  expect(chosen.y - moved.y).toBeGreaterThan(30);
  expect(await middleOf(page, 'RT-7')).toEqual(neighbour);
  await expect(page.getByRole('button', { name: 'Undo RT-5 moved' })).toBeEnabled();
});

test('a long press opens the commands', async ({ page }) => {
  const cdp = await openCopy(page, 'Long press');
  const finger = await middleOf(page, 'RT-5');
  await touch(cdp, 'touchStart', [finger]);
  await expect(page.getByRole('menu', { name: 'RT-5' })).toBeVisible();
  await touch(cdp, 'touchEnd', []);
  await page.getByRole('menuitem', { name: /^Duplicate/ }).click();
  await expect(page.getByRole('button', { name: /^Undo 1 element duplicated/ })).toBeEnabled();
});
