import AxeBuilder from '@axe-core/playwright';
import type { Browser, BrowserContext, Page } from '@playwright/test';
import { copyOfDemo, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const FIRST = 'TR1';
const SECOND = 'TR2';
const WITHIN_MS = 1_000;

async function openAs(
  browser: Browser,
  person: 'designer' | 'admin',
): Promise<{ context: BrowserContext; page: Page }> {
  const context = await browser.newContext();
  const page = await context.newPage();
  await signIn(page, person);
  return { context, page };
}

const onSheet = (page: Page, id: string) => page.locator(`[data-element=${id}]`);

test('what someone else has selected is outlined and read out, in their own mark and not in copper', async ({
  page,
  browser,
}) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Selected by two');
  const { context, page: other } = await openAs(browser, 'admin');
  await page.goto(`${network}/drawing?element=${FIRST}`);
  await other.goto(`${network}/drawing?element=${SECOND}`);
  await savedAndSolved(page);
  const name = (await page.locator('app-company-strip strong').first().textContent()) ?? '';
  const initials = name.replace(/(\p{L})\S*\s*/gu, '$1');
  await expect(page.locator('.initials')).toHaveText(initials);
  await expect(page.locator('path.company')).toHaveCount(1);
  await expect(onSheet(page, SECOND)).toHaveAttribute('aria-label', new RegExp(`, also selected by ${name}$`));
  await expect(onSheet(page, FIRST)).not.toHaveAttribute('aria-label', /also selected/);
  const [stroke, copper] = await page.locator('path.company').evaluate((path) => {
    const probe = document.createElement('i');
    probe.style.color = 'var(--rb-copper-line)';
    document.body.append(probe);
    return [getComputedStyle(path).stroke, getComputedStyle(probe).color];
  });
  expect(stroke).not.toBe(copper);

  await test.step('in a list their initials stand in the row', async () => {
    await page.goto(`${network}/lists?element=${FIRST}`);
    await expect(page.locator('app-company-mark .mark')).toHaveText(initials);
    await expect(page.getByRole('gridcell', { name: new RegExp(`also selected by ${name}$`) })).toHaveCount(1);
    await page.goto(`${network}/drawing?element=${FIRST}`);
  });

  await test.step('all that they have selected, pipes too, and nothing once they let go', async () => {
    await onSheet(other, SECOND).focus();
    await other.keyboard.press('ControlOrMeta+a');
    await expect.poll(() => page.locator('path.company:not(.gap)').count()).toBeGreaterThan(20);
    await expect(page.locator('path.company.along').first()).toBeAttached();
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      const { violations } = await new AxeBuilder({ page }).analyze();
      expect(violations.map(({ id }) => id)).toEqual([]);
    }
    await other.keyboard.press('Escape');
    await expect(page.locator('path.company')).toHaveCount(0);
  });
  await context.close();
});

test('another’s results are on the screen within a second of their solve, and nothing asks for them again and again', async ({
  page,
  browser,
}) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Solved for two');
  const { context, page: other } = await openAs(browser, 'admin');
  await page.goto(`${network}/drawing?element=${FIRST}`);
  await other.goto(`${network}/drawing?element=${FIRST}`);
  await savedAndSolved(page);
  await savedAndSolved(other);
  await other.getByRole('complementary', { name: 'Inspector' }).getByRole('tab', { name: 'Inputs' }).click();
  // a second stream, only to know when the server said that the solve has ended
  await page.evaluate(
    ({ network, element }) => {
      const times = { told: 0, shown: 0 };
      Object.assign(globalThis, { times });
      const source = new EventSource(`/api/networks/${network}/events`);
      source.addEventListener('solve', (event: MessageEvent<string>) => {
        const { version, state } = JSON.parse(event.data) as { version: number; state: string };
        if (version > 1 && state === 'finished' && times.told === 0) times.told = performance.now();
      });
      const said = () => document.querySelector(`[data-element=${element}]`)?.getAttribute('aria-label');
      const before = said();
      const look = (): void => {
        if (said() !== before) times.shown = performance.now();
        else requestAnimationFrame(look);
      };
      requestAnimationFrame(look);
    },
    { network: network.split('/').at(-1) ?? '', element: FIRST },
  );
  let asked = 0;
  page.on('request', (request) => {
    if (request.url().includes('/results')) asked += 1;
  });
  const load = other.getByRole('complementary', { name: 'Inspector' }).getByLabel('Load', { exact: true });
  await load.fill('1900 lb/h');
  await load.press('Enter');
  const times = () => page.evaluate(() => (globalThis as unknown as { times: { told: number; shown: number } }).times);
  await expect.poll(async () => Math.min((await times()).told, (await times()).shown)).toBeGreaterThan(0);
  const { told, shown } = await times();
  await savedAndSolved(page);
  process.stdout.write(`shown ${(shown - told).toFixed(0)} ms after the server said that the solve has ended\n`);
  expect(shown - told).toBeLessThan(WITHIN_MS);
  // the pressures, then the bands
  expect(asked).toBeLessThanOrEqual(2);
  await context.close();
});
