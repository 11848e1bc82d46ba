import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from '@playwright/test';
import { copyOfDemo, type DemoPerson, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const PASSWORD = 'demo-tern-quay';

/** Another person at another machine. */
async function openAs(browser: Browser, person: DemoPerson): Promise<Page> {
  const context = await browser.newContext();
  const page = await context.newPage();
  await signIn(page, person);
  return page;
}

async function freeze(page: Page, title: string, reason: string): Promise<void> {
  await page.getByRole('button', { name: 'Freeze a revision' }).first().click();
  const dialog = page.getByRole('dialog', { name: 'Freeze a revision' });
  await dialog.getByLabel('Title').fill(title);
  await dialog.getByLabel('Reason').fill(reason);
  await dialog.getByRole('button', { name: 'Freeze', exact: true }).click();
  await expect(dialog).toBeHidden();
}

async function submitForReview(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Submit for review' }).click();
  await page.getByLabel('Note to the reviewers').fill('Look at the lift first.');
  await page.getByRole('button', { name: 'Submit for review' }).click();
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

test('a revision is submitted, returned with a comment on a pipe, mended, and signed by someone else', async ({
  page,
  browser,
}) => {
  test.setTimeout(240_000);
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Revisions from end to end');

  // the designer freezes what there is and submits it
  await page.goto(`${network}/revisions`);
  await expect(page.getByRole('heading', { name: 'No revision yet' })).toBeVisible();
  await freeze(page, 'As surveyed', 'First issue of the hall.');
  const review = page.getByRole('complementary', { name: 'Review and sign' });
  await expect(review.getByText('A, draft.')).toBeVisible();
  await submitForReview(page);
  await expect(review.getByText('A, under review.')).toBeVisible();
  await expect(review.getByText('Reviewers sign revisions; your role here does not.')).toBeVisible();
  await expect(review.getByLabel('Your password, once more')).toHaveCount(0);

  // the reviewer comments on a pipe of the frozen copy, which nobody can edit, and returns it
  const reviewer = await openAs(browser, 'reviewer');
  await reviewer.goto(`${network}/revisions`);
  await reviewer.getByRole('link', { name: 'See it as frozen' }).click();
  await expect(reviewer.getByText('Revision A, frozen: cannot be edited.')).toBeVisible();
  await expect(reviewer.getByRole('button', { name: 'Delete' })).toHaveCount(0);
  const frozen = new URL(reviewer.url()).pathname;
  await reviewer.goto(`${frozen}?element=L24`);
  await reviewer.getByRole('tab', { name: 'Comments' }).click();
  const comment = reviewer.getByLabel(/^New comment on /);
  await comment.fill('Is this riser carried to the rack? @In');
  await expect(reviewer.getByRole('listbox', { name: 'Names' }).getByRole('option')).toHaveCount(1);
  await comment.press('Enter');
  await expect(comment).toHaveValue(/@\S+ \S+ $/);
  // what is typed outlives the page
  await reviewer.reload();
  await reviewer.getByRole('tab', { name: 'Comments' }).click();
  await expect(comment).toHaveValue(/carried to the rack/);
  await reviewer.getByRole('button', { name: 'Comment', exact: true }).click();
  await expect(reviewer.getByRole('article', { name: /^Comment 1: / })).toBeVisible();
  await expect(comment).toHaveValue('');
  await reviewer.getByRole('link', { name: 'Review and sign' }).click();
  await reviewer.getByRole('button', { name: 'Return with comments' }).click();
  await reviewer.getByRole('button', { name: 'Return with comments' }).click();
  await expect(reviewer.getByText('Say why: it is kept with the revision.')).toBeVisible();
  await reviewer.getByLabel('Why it is returned').fill('The riser is not carried.');
  await reviewer.getByRole('button', { name: 'Return with comments' }).click();
  await expect(reviewer.getByText('Revision A is returned.')).toBeVisible();

  // the designer hears of it without asking, goes to the pipe, answers and mends it
  await expect(review.getByText('A, returned.')).toBeVisible();
  await expect(review.getByText('The riser is not carried.')).toBeVisible();
  await page.goto(`${network}/drawing?element=L24`);
  await savedAndSolved(page);
  await page.getByRole('tab', { name: /^Comments 1/ }).click();
  await page.getByRole('button', { name: 'Answer comment 1' }).click();
  await page.getByLabel('Answer to comment 1').fill('Mended: it is longer now.');
  await page.getByRole('button', { name: 'Answer', exact: true }).click();
  await expect(page.getByText('Mended: it is longer now.')).toBeVisible();
  await page.getByRole('button', { name: 'Resolve comment 1' }).click();
  await expect(page.getByRole('button', { name: /1 resolved/ })).toBeVisible();
  await page.getByRole('tab', { name: 'Inputs' }).click();
  const length = page.getByLabel('Length', { exact: true });
  await length.fill('60 ft');
  await length.press('Enter');
  await savedAndSolved(page);
  await page.getByRole('link', { name: 'Working, after A' }).click();
  await freeze(page, 'Riser carried', 'The riser goes to the rack.');
  await expect(review.getByText('B, draft.')).toBeVisible();
  await submitForReview(page);
  await expect(review.getByText('B, under review.')).toBeVisible();

  // signing, by keyboard alone
  await reviewer.goto(`${network}/revisions`);
  const lines = reviewer.getByRole('group', { name: 'Before you sign' }).getByRole('checkbox');
  await expect(lines).toHaveCount(3);
  await expect(reviewer.getByText('SHA-256').first()).toBeVisible();
  await expectNoFindings(reviewer);
  const sign = reviewer.getByRole('button', { name: 'Sign revision B' });
  await sign.focus();
  await reviewer.keyboard.press('Enter');
  await expect(reviewer.getByText(/^Not signed yet: tick/)).toBeVisible();
  // the keyboard stands on the first line that is missing
  for (let line = 0; line < 3; line += 1) {
    await expect(lines.nth(line)).toBeFocused();
    await reviewer.keyboard.press('Space');
    await reviewer.keyboard.press('Tab');
  }
  await sign.focus();
  await reviewer.keyboard.press('Enter');
  const password = reviewer.getByLabel('Your password, once more', { exact: true });
  await expect(password).toBeFocused();
  await reviewer.keyboard.type('not-my-password');
  await reviewer.keyboard.press('Enter');
  await expect(reviewer.getByText('This is not your present password.')).toBeVisible();
  await expect(password).toBeFocused();
  await reviewer.keyboard.type(PASSWORD);
  await reviewer.keyboard.press('Enter');
  await expect(reviewer.getByText('You signed revision B as approved.')).toBeVisible();
  await expect(reviewer.getByText('B, approved.')).toBeVisible();

  // and anyone can verify it
  await reviewer.getByRole('link', { name: 'Verify', exact: true }).click();
  await expect(reviewer.getByText('Everything that is there matches.')).toBeVisible();
  await expect(reviewer.getByText(/verify-revision -- /)).toBeVisible();
  await expectNoFindings(reviewer);
  await reviewer.context().close();
  await expect(review.getByText('B, approved.')).toBeVisible();
});

test('a comment on a finding shows on the drawing, is kept while it cannot be sent, and is read by a viewer', async ({
  page,
  browser,
}) => {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, 'Comments at findings');
  await page.goto(`${network}/drawing`);
  await savedAndSolved(page);
  await page.getByRole('button', { name: 'Comment on BL-2: Capacity' }).click();
  const comment = page.getByLabel('New comment on BL-2, capacity in Design');
  await expect(comment).toBeFocused();
  await page.route('**/comments', (route) => (route.request().method() === 'POST' ? route.abort() : route.continue()));
  await page.keyboard.type('Is the measured load known?');
  await page.keyboard.press('Control+Enter');
  await expect(page.getByText('The server cannot be reached')).toBeVisible();
  await expect(comment).toHaveValue('Is the measured load known?');
  await page.unroute('**/comments');
  await comment.press('Control+Enter');
  await expect(page.getByRole('article', { name: 'Comment 1: BL-2, capacity in Design' })).toBeVisible();
  await expect(page.getByRole('button', { name: /^BL-2,.*1 open comment/ })).toBeVisible();

  // its mark leads to it
  const viewer = await openAs(browser, 'viewer');
  await viewer.goto(`${network}/drawing`);
  await viewer.locator('app-drawing-sheet .comment').click();
  await expect(viewer.getByText('Is the measured load known?')).toBeVisible();
  await expect(viewer.getByText('Your role here reads comments and does not write them.')).toBeVisible();
  await expect(viewer.getByRole('button', { name: 'Answer comment 1' })).toHaveCount(0);
  await viewer.goto(`${network}/revisions`);
  await expect(
    viewer.getByText('Your role here does not freeze revisions: a designer of the site does.'),
  ).toBeVisible();
  await viewer.context().close();
});
