import AxeBuilder from '@axe-core/playwright';
import type { Round, RoundSummary } from '@riseback/contracts';
import type { Page } from '@playwright/test';
import { copyOfDemo, signIn } from './people';
import { expect, test } from './violations';

// a phone, as it is held in the plant
test.use({ viewport: { width: 360, height: 780 }, hasTouch: true, isMobile: true });

/** Within what is expected at the flash vessel, which is held at 15 psig. */
const AT_FLASH_VESSEL = '15';

async function openNetwork(page: Page, name: string): Promise<string> {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, name);
  await signIn(page, 'commissioning');
  return network;
}

async function beginRound(page: Page, network: string): Promise<void> {
  await page.goto(`${network}/gauges/reading`);
  await page.getByRole('button', { name: 'Begin with 6 gauges' }).tap();
  await expect(gaugeHead(page)).toBeVisible();
}

const gaugeHead = (page: Page) => page.getByRole('heading', { level: 1, name: /^PI-\d$/ });

async function press(page: Page, number: string): Promise<void> {
  for (const key of number) {
    await page.getByRole('button', { name: key === '.' ? 'Point' : key, exact: true }).tap();
  }
}

/** Types a number, waits until it is in, and keeps it whatever is said of it. */
async function enter(page: Page, number: string): Promise<void> {
  const before = await gaugeHead(page).textContent();
  await press(page, number);
  await expect(page.locator('.verdict')).toBeVisible();
  await page.getByRole('button', { name: /^(Keep|Correct)/ }).tap();
  await expect(page.locator('h1')).not.toHaveText(before ?? '');
}

async function goTo(page: Page, gauge: string): Promise<void> {
  await page.getByRole('button', { name: 'All gauges' }).tap();
  await page.getByRole('button', { name: new RegExp(`^${gauge} .*(read|psig)`) }).tap();
  await expect(gaugeHead(page)).toHaveText(gauge);
}

async function onlyRound(page: Page, network: string): Promise<Round> {
  const rounds = `/api/networks/${network.split('/').at(-1) ?? ''}/rounds`;
  const [first] = (await (await page.request.get(rounds)).json()) as RoundSummary[];
  if (first === undefined) throw new Error('No round has arrived');
  return (await (await page.request.get(`${rounds}/${first.id}`)).json()) as Round;
}

test('a round is read by touch, one reading corrected, one gauge passed over with its reason, and the agreement read', async ({
  page,
}) => {
  const network = await openNetwork(page, 'Round by touch');
  await beginRound(page, network);

  await test.step('three taps a reading; what is expected is hidden until the number is in', async () => {
    await expect(gaugeHead(page)).toHaveText('PI-5');
    await expect(page.getByText(/^Expected/)).toBeHidden();
    await press(page, AT_FLASH_VESSEL);
    await page.getByRole('button', { name: 'Keep, next PI-6' }).tap();
    await expect(gaugeHead(page)).toHaveText('PI-6');
  });

  await test.step('targets are at least 48 px', async () => {
    for (const button of await page.locator('app-reading-page').getByRole('button').all()) {
      const box = await button.boundingBox();
      expect(box?.height ?? 0, await button.textContent().then(String)).toBeGreaterThanOrEqual(48);
      expect(box?.width ?? 0).toBeGreaterThanOrEqual(48);
    }
  });

  await test.step('a slip of the finger is asked about', async () => {
    await press(page, '999');
    await page.getByRole('button', { name: /^Keep, next/ }).tap();
    await expect(page.getByText('Above the range of this gauge.')).toBeVisible();
    await page.getByRole('button', { name: 'Read it again' }).tap();
    await expect(page.getByRole('textbox', { name: /^Reading of PI-6/ })).toHaveValue('');
    await press(page, '.2');
    await page.getByRole('button', { name: /^Keep/ }).tap();
    await expect(gaugeHead(page)).toHaveText('PI-1');
  });

  await page.getByRole('button', { name: 'No reading' }).tap();
  await page.getByRole('button', { name: 'Cannot get to it' }).tap();
  await enter(page, '31');
  await enter(page, '15');
  await enter(page, '21');
  await expect(page.getByRole('heading', { name: 'Every gauge is done' })).toBeVisible();
  await expect(page.getByText('5 read, 1 could not be read.')).toBeVisible();

  await test.step('a correction replaces; the former stays', async () => {
    await goTo(page, 'PI-4');
    await expect(page.getByText(/Read 21\.0 psig, at/)).toBeVisible();
    await enter(page, '35');
  });
  await page.getByRole('button', { name: 'Close the round' }).tap();
  await expect(page.getByRole('heading', { name: 'This round is closed' })).toBeVisible();
  await expect(page.getByText('All readings sent.')).toBeVisible();
  await page.getByRole('button', { name: 'See the agreement' }).tap();

  await expect(page.getByRole('row', { name: /PI-5/ }).first()).toContainText('Agrees');
  await expect(page.getByRole('row', { name: /PI-1/ }).first()).toContainText('Not read: cannot get to it');
  await expect(page.getByRole('row', { name: /PI-4/ }).first()).toContainText('Disagrees');
  await expect(page.getByRole('img', { name: /PI-4[^;]* disagree/ })).toBeVisible();
  await expect(page.locator('del')).toHaveText('21.0');
});

test('ten readings taken with no signal arrive once each and in order, though answers are lost on the way', async ({
  page,
  context,
}) => {
  const network = await openNetwork(page, 'No signal in the hall');
  await beginRound(page, network);
  await expect(page.getByText('All readings sent.')).toBeVisible();
  await context.setOffline(true);
  for (const number of ['15', '0.2', '31', '30', '15', '21']) await enter(page, number);
  for (const gauge of ['PI-1', 'PI-2', 'PI-3', 'PI-4']) {
    await goTo(page, gauge);
    await enter(page, '20');
  }
  await expect(page.getByText('No signal: 10 readings kept.')).toBeVisible();

  const asked: string[] = [];
  await page.route(/\/readings$/, async (route) => {
    asked.push(route.request().headers()['idempotency-key'] ?? '');
    // the server has it, and the phone does not know
    if (asked.length === 1 || asked.length === 5) {
      await route.fetch();
      await route.abort();
    } else await route.continue();
  });
  await context.setOffline(false);
  await expect(async () => {
    // the browser's word hastens the next try
    await page.evaluate(() => dispatchEvent(new Event('online')));
    await expect(page.getByText('All readings sent.')).toBeVisible({ timeout: 1_000 });
  }).toPass({ timeout: 30_000 });

  const { readings } = await onlyRound(page, network);
  expect(readings.map(({ deviceSeq }) => deviceSeq)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
  expect(new Set(readings.map(({ id }) => id)).size).toBe(10);
  expect(readings.map(({ takenAt }) => takenAt)).toEqual(readings.map(({ takenAt }) => takenAt).toSorted());
  expect(readings.filter(({ replaces }) => replaces !== undefined)).toHaveLength(4);
  // each in its turn, two of them twice
  expect(asked).toHaveLength(12);
  expect([...new Set(asked)]).toEqual(readings.map(({ id }) => id));
});

test('what was kept before the page was left is sent when it is opened again', async ({ page, context }) => {
  const network = await openNetwork(page, 'Left with readings');
  await beginRound(page, network);
  await expect(page.getByText('All readings sent.')).toBeVisible();
  await context.setOffline(true);
  await enter(page, AT_FLASH_VESSEL);
  await expect(page.getByText('No signal: 1 reading kept.')).toBeVisible();
  await page.goto('about:blank');
  await context.setOffline(false);
  await page.goto(`${network}/gauges/reading`);
  await expect(page.getByText('All readings sent.')).toBeVisible();
  await expect.poll(async () => (await onlyRound(page, network)).readings.length).toBe(1);
});

test('no axe findings on the phone screen and beside the agreement, in both themes', async ({ page }) => {
  const network = await openNetwork(page, 'Readings for all');
  await page.goto(`${network}/gauges`);
  await expect(page.getByRole('heading', { name: 'No readings yet' })).toBeVisible();
  await expectNoFindings(page);
  await page.goto(`${network}/gauges/reading`);
  await expect(page.getByRole('heading', { name: 'Begin a round' })).toBeVisible();
  await expectNoFindings(page);
  await beginRound(page, network);
  await press(page, '99');
  await expect(page.locator('.verdict')).toBeVisible();
  await expectNoFindings(page);
  await page.getByRole('button', { name: 'No reading' }).tap();
  await expectNoFindings(page);
  await page.getByRole('button', { name: 'Note, photo' }).tap();
  await expectNoFindings(page);
  await page.getByRole('button', { name: 'Keep it as it is' }).tap();
  await page.getByRole('button', { name: 'All gauges' }).tap();
  await expectNoFindings(page);
  await page.goto(`${network}/gauges`);
  await expect(page.getByRole('heading', { name: 'Agreement' })).toBeVisible();
  await expectNoFindings(page);
});

async function expectNoFindings(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page }).analyze();
    const found = violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`);
    expect(found, colorScheme).toEqual([]);
  }
}
