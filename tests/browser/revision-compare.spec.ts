import AxeBuilder from '@axe-core/playwright';
import type { NetworkFile } from '@riseback/network';
import type { Page } from '@playwright/test';
import { copyOfDemo, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

/** So many of the demo's pipes of 1½ in are widened. */
const WIDENED = 3;

async function post(page: Page, path: string, data: object, headers: Record<string, string> = {}): Promise<number> {
  const token = (await page.context().cookies()).find(({ name }) => name === 'XSRF-TOKEN')?.value ?? '';
  const answer = await page.request.post(path, {
    headers: { 'X-XSRF-TOKEN': decodeURIComponent(token), ...headers },
    data,
  });
  return answer.status();
}

/** A copy of the demo that was frozen as A, and in which three pipes were widened and one trap taken away since. */
async function changedSinceA(page: Page, name: string): Promise<string> {
  const network = await copyOfDemo(page, name);
  const api = `/api/networks/${network.split('/').at(-1) ?? ''}`;
  const frozen = { title: 'As surveyed', reason: 'First issue.', networkVersion: 1 };
  // a revision is frozen with its results, which take a moment
  await expect(async () => expect(await post(page, `${api}/revisions`, frozen)).toBe(201)).toPass();
  const file = (await (await page.request.get(`${api}/file`)).json()) as NetworkFile;
  const pipes = file.pipes.filter(({ size }) => size?.nps === '1-1/2').slice(0, WIDENED);
  const gone = file.pipes.find(({ tag }) => tag === 'CR-102');
  const ops = [
    ...pipes.map(({ id, size }) => ({
      op: 'set',
      in: 'pipes',
      id,
      key: 'size',
      from: size,
      to: { ...size, nps: '2' },
    })),
    { op: 'remove', in: 'pipes', id: gone?.id },
    { op: 'remove', in: 'nodes', id: gone?.from },
  ];
  const batch = { batchId: crypto.randomUUID(), label: 'widen the rack', ops };
  expect(await post(page, `${api}/edits`, batch, { 'If-Match': '"1"' })).toBe(200);
  return network;
}

async function expectNoFindings(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page })
      .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
      .analyze();
    const found = violations.map(
      ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`,
    );
    expect(found, colorScheme).toEqual([]);
  }
}

test('what was changed and what it did, in lists and on the drawing', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await changedSinceA(page, 'Compared by mouse');
  await page.goto(`${network}/revisions?revision=working`);
  const compare = page.locator('app-revision-compare');
  await expect(compare.getByRole('heading', { name: 'A to Working' })).toBeVisible();
  await expect(compare.getByText(/^5 inputs changed, \d+ of 29 traps moved by 0.1 psi or more$/)).toBeVisible();

  const inputs = compare.locator('app-input-list');
  const folded = inputs.getByRole('button', { name: /, 3 elements$/ });
  const row = inputs.getByRole('row').filter({ has: page.getByRole('button', { name: /, 3 elements$/ }) });
  await expect(row).toContainText('1½″ sch 80');
  await folded.click();
  await expect(inputs.locator('.part')).toHaveCount(3);
  await expect(inputs.getByRole('row', { name: /^CR-102 Pipe/ })).toContainText('removed');

  // the trap at the end of the pipe that was taken away stands among the results, and all others when they are asked for
  const effects = compare.locator('app-effect-list');
  await expect(effects.getByRole('row', { name: /^RT-2/ })).toContainText('Removed');
  await compare.getByRole('button', { name: 'Changed only' }).click();
  await expect(effects.locator('tbody tr')).toHaveCount(30);
  await compare.getByLabel('Operating case').selectOption('Turndown');
  await compare.getByLabel('What is compared').selectOption('differentialPa');
  await expect(effects.getByRole('columnheader', { name: /^Change/ })).toBeVisible();
  await expectNoFindings(page);

  await compare.getByRole('button', { name: 'On the drawing' }).click();
  const panel = page.getByRole('region', { name: 'Comparison on the drawing' });
  await expect(panel).toContainText('Compared with A');
  await expect(panel).toContainText('3 changed');
  await expect(panel).toContainText('2 removed: RT-2, CR-102');
  await expect(page.locator('app-comparison-layer')).toContainText('RT-2 removed');
  // the elements say it themselves
  await expect(page.getByRole('button', { name: /changed: size/ })).toHaveCount(3);
  await expectNoFindings(page);
  await panel.getByRole('link', { name: 'End comparing' }).click();
  await expect(panel).toBeHidden();
  await expect(page.locator('app-comparison-layer')).toHaveCount(0);
});

test('by keyboard alone, and on a phone without scrolling sideways', async ({ page }) => {
  await signIn(page, 'designer');
  const network = await changedSinceA(page, 'Compared by keyboard');
  await page.setViewportSize({ width: 390, height: 844 });
  await page.goto(`${network}/revisions?revision=working`);
  const compare = page.locator('app-revision-compare');
  const folded = compare.getByRole('button', { name: /, 3 elements$/ });
  await folded.focus();
  await page.keyboard.press('Enter');
  await expect(folded).toHaveAttribute('aria-expanded', 'true');
  await page.keyboard.press('Tab');
  const first = compare.locator('.part').first().getByRole('button').first();
  await expect(first).toBeFocused();
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
  await expectNoFindings(page);

  // Enter on an element leads to it on the drawing
  const name = (await first.textContent())?.trim() ?? '';
  await page.keyboard.press('Enter');
  await expect(page).toHaveURL(/\/drawing\?.*element=/);
  await savedAndSolved(page);
  await expect(page.getByRole('heading', { name, exact: true })).toBeVisible();
});
