import AxeBuilder from '@axe-core/playwright';
import type { Page } from '@playwright/test';
import { demoNetworkPath, openEmptyNetwork, signIn } from './people';
import { expect, test } from './violations';

// each stands by itself: two browsers share what would else be the longest file
test.describe.configure({ mode: 'parallel' });

const THEMES = ['light', 'dark'] as const;
const LISTS = ['traps', 'pipes', 'junctions', 'vessels', 'pumped-inlets', 'gauges', 'trap-models'] as const;
/** 720 px is what a window of 1440 has left at a zoom of 200 %. */
const SIZES = [
  { width: 1440, height: 900 },
  { width: 720, height: 450 },
  { width: 390, height: 844 },
  { width: 320, height: 640 },
] as const;

/** By what they are about: the paths of their pages, from those of the demo's network, of an empty one, and the id of a revision. */
const PAGES: Readonly<Record<string, (network: string, empty: string, revision: string) => readonly string[]>> = {
  'around the networks': (network) => {
    const site = network.replace(/\/networks\/.*/, '');
    const ofSite = ['', '/library', '/settings', '/audit', '/people', '/mails'].map((page) => `${site}${page}`);
    return ['/sites', ...ofSite, '/account', '/nowhere', '/unreachable'];
  },
  'of the drawing': (network, empty) => [
    `${network}/drawing`,
    `${network}/drawing?element=TR5`,
    `${network}/drawing?element=L24`,
    `${network}/drawing?case=rt5open`,
    `${network}/drawing?element=TE1`,
    `${network}/drawing?case=worst&element=TR5`,
    `${empty}/drawing`,
  ],
  'of the lists': (network, empty) => [
    ...LISTS.map((list) => `${network}/lists?list=${list}`),
    `${network}/lists?case=worst`,
    `${empty}/lists`,
  ],
  'of results and cases': (network, empty) => [
    `${network}/ledger?element=TR5`,
    `${network}/ledger?case=worst`,
    `${network}/try`,
    `${network}/try?element=TR5`,
    `${network}/cases?case=rt5open`,
    `${network}/cases?show=compare`,
    `${network}/gauges`,
    `${network}/gauges/reading`,
    `${network}/report`,
    `${network}/method`,
    `${network}/method#check-stall`,
    ...['ledger', 'cases', 'try', 'gauges'].map((view) => `${empty}/${view}`),
  ],
  'of revisions': (network, empty, revision) => [
    `${network}/revisions`,
    `${network}/revisions?revision=working`,
    `${network}/revisions/${revision}/verification`,
    `${network}/frozen/${revision}/drawing?element=TR5`,
    `${network}/frozen/${revision}/lists`,
    `${empty}/revisions`,
  ],
};

test('no axe findings on the pages before one is signed in, in both themes', async ({ page }) => {
  for (const path of ['/sign-in', '/forgotten-password', '/invitation', `/password-reset#${'A'.repeat(43)}`]) {
    await page.goto(path);
    await page.waitForLoadState('networkidle');
    await expectNoFindings(path, page);
  }
});

for (const [about, paths] of Object.entries(PAGES)) {
  test(`no axe findings on the pages ${about}, in both themes`, async ({ page }) => {
    test.setTimeout(300_000);
    // an administrator sees what a designer sees, and the log of the site
    await signIn(page, 'admin');
    const network = await demoNetworkPath(page);
    await openEmptyNetwork(page, `Nothing yet ${about}`);
    const empty = new URL(page.url()).pathname.replace(/\/drawing$/, '');
    for (const path of paths(network, empty, await newestRevision(page, network))) {
      await page.goto(path);
      await page.waitForLoadState('networkidle');
      await expectNoFindings(path, page);
    }
  });
}

test('no page is wider than its window, on a phone and at a zoom of 200 %', async ({ page }) => {
  test.setTimeout(300_000);
  await signIn(page, 'admin');
  const network = await demoNetworkPath(page);
  const site = network.replace(/\/networks\/.*/, '');
  const revision = await newestRevision(page, network);
  for (const size of SIZES) {
    await page.setViewportSize(size);
    for (const path of [
      '/sites',
      site,
      `${site}/library`,
      `${site}/settings`,
      `${site}/audit`,
      '/account',
      `${network}/drawing`,
      `${network}/lists`,
      `${network}/ledger?element=TR5`,
      `${network}/cases?case=rt5open`,
      `${network}/cases?show=compare`,
      `${network}/try?element=TR5`,
      `${network}/gauges`,
      `${network}/gauges/reading`,
      `${network}/report`,
      `${network}/revisions`,
      `${network}/revisions?revision=working`,
      `${network}/frozen/${revision}/drawing`,
      `${network}/revisions/${revision}/verification`,
      `${network}/method`,
    ]) {
      await page.goto(path);
      await page.waitForLoadState('networkidle');
      const overflow = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
      expect(overflow, `${path} at ${String(size.width)} px`).toBeLessThanOrEqual(0);
    }
  }
});

async function newestRevision(page: Page, network: string): Promise<string> {
  const answer = await page.request.get(`/api/networks/${network.split('/').at(-1) ?? ''}/revisions`);
  const [newest] = (await answer.json()) as { id: string }[];
  return newest?.id ?? 'none';
}

/** A theme changes colours alone: once a page has met every rule, the dark one is held to those of colour; the long form holds it to all. */
async function expectNoFindings(path: string, page: Page): Promise<void> {
  for (const colorScheme of THEMES) {
    await page.emulateMedia({ colorScheme });
    const axe = new AxeBuilder({ page });
    if (colorScheme === 'light' || process.env['RISEBACK_TEST_FULL'] === '1')
      axe.withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']);
    else axe.withRules(['color-contrast', 'link-in-text-block']);
    const { violations } = await axe.analyze();
    const found = violations.map(
      ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`,
    );
    expect(found, `${path}, ${colorScheme}`).toEqual([]);
  }
}
