import AxeBuilder from '@axe-core/playwright';
import type { Locator, Page } from '@playwright/test';
import { copyOfDemo, openEmptyNetwork, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const sheet = (page: Page) => page.getByRole('application');
const element = (page: Page, tag: string) => sheet(page).getByRole('button', { name: new RegExp(`^${tag},`) });
const status = (page: Page) => page.locator('main [role=status]').last();
const selected = (page: Page) => sheet(page).locator('[aria-pressed=true]');

/** Stands on a drawing with the keyboard in it. */
async function openDrawing(page: Page, path: string): Promise<void> {
  await page.goto(`${path}/drawing`);
  await savedAndSolved(page);
  await sheet(page).locator('[tabindex="0"]').focus();
}

async function openCopy(page: Page, name: string): Promise<string> {
  await signIn(page, 'designer');
  const path = await copyOfDemo(page, name);
  await openDrawing(page, path);
  return path;
}

async function key(page: Page, name: string, answer: RegExp): Promise<void> {
  await page.keyboard.press(name);
  await expect(status(page)).toHaveText(answer);
}

async function focus(page: Page, tag: string): Promise<void> {
  await page.keyboard.press('/');
  await page.getByLabel('Find a tag').fill(tag);
  await page.keyboard.press('Enter');
  await expect(element(page, tag)).toBeFocused();
}

/** The middle of a pipe's longest straight piece, in the window. */
async function onPiece(pipe: Locator): Promise<{ x: number; y: number; level: boolean }> {
  return pipe.locator('path.hit').evaluate((path) => {
    if (!(path instanceof SVGPathElement)) throw new Error('no path');
    const points = [...(path.getAttribute('d') ?? '').matchAll(/[ML]([-\d.]+),([-\d.]+)/g)].map(
      ([, x, y]) => new DOMPoint(Number(x), Number(y)),
    );
    const pieces = points.slice(1).map((b, i) => ({ a: points[i] ?? b, b }));
    pieces.sort((p, q) => Math.hypot(q.a.x - q.b.x, q.a.y - q.b.y) - Math.hypot(p.a.x - p.b.x, p.a.y - p.b.y));
    const [longest] = pieces;
    if (longest === undefined) throw new Error('no piece');
    const { a, b } = longest;
    const { x, y } = new DOMPoint((a.x + b.x) / 2, (a.y + b.y) / 2).matrixTransform(path.getScreenCTM() ?? undefined);
    return { x, y, level: a.y === b.y };
  });
}

/** Every corner of a pipe is a right angle. */
async function isRightAngled(pipe: Locator): Promise<boolean> {
  const d = (await pipe.locator('path.hit').getAttribute('d')) ?? '';
  const points = [...d.matchAll(/[ML]([-\d.]+),([-\d.]+)/g)].map(([, x, y]) => [Number(x), Number(y)] as const);
  return points.every(([x, y], i) => {
    const [px, py] = points[i - 1] ?? [x, y];
    return px === x || py === y;
  });
}

test('copies, cuts, pastes and duplicates from the keyboard, between networks too', async ({ page }) => {
  const path = await openCopy(page, 'Copied from');
  const before = await sheet(page).locator('[data-element]').count();
  await focus(page, 'RT-1');
  await page.keyboard.press('PageDown');
  await page.keyboard.press('PageDown');
  await key(page, 'Control+Space', /selected too/);
  await key(
    page,
    'Control+c',
    /2 elements and 1 pipe copied; \d pipes? to elements? outside the selection left behind/,
  );
  await key(page, 'Control+v', /2 elements and 1 pipe pasted/);
  await expect(selected(page)).toHaveCount(3);
  await expect(sheet(page).locator('[data-element]')).toHaveCount(before + 3);
  await expect(sheet(page).getByRole('button', { name: /^RT-9, trap.*selected$/ })).toHaveCount(1);
  await expect(element(page, 'RT-1')).toHaveCount(1);
  await key(page, 'Control+z', /Undone: 2 elements and 1 pipe pasted/);
  await expect(sheet(page).locator('[data-element]')).toHaveCount(before);
  await focus(page, 'RT-2');
  await key(page, 'Control+d', /1 element duplicated.*left behind/);
  await key(page, 'Control+z', /Undone/);
  await savedAndSolved(page);

  const other = await copyOfDemo(page, 'Pasted into');
  await openDrawing(page, other);
  await key(page, 'Control+v', /2 elements and 1 pipe pasted/);
  await savedAndSolved(page);
  await page.reload();
  await expect(sheet(page).locator('[data-element]')).toHaveCount(before + 3);

  // what cannot go along is said before a cut
  await openDrawing(page, path);
  await focus(page, 'RT-1');
  await page.keyboard.press('Control+x');
  await expect(page.getByRole('dialog')).toContainText(/pipe/);
  await page.getByRole('dialog').getByRole('button', { name: 'Delete' }).click();
  await expect(status(page)).toHaveText(/1 element cut/);
  await expect(element(page, 'RT-1')).toHaveCount(0);
  await key(page, 'Control+v', /pasted, from RT-1/);
});

test('says so when the clipboard holds something else', async ({ page, context }) => {
  await context.grantPermissions(['clipboard-read', 'clipboard-write']);
  await openCopy(page, 'Foreign clipboard');
  await page.evaluate(() => navigator.clipboard.writeText('TR-101\t0.05\n<script>'));
  await key(page, 'Control+v', /Nothing pasted. The clipboard holds nothing that was copied from a drawing/);
  await focus(page, 'RT-3');
  await key(page, 'Control+c', /copied/);
  expect(await page.evaluate(() => navigator.clipboard.readText())).toContain('riseback-piece');
  await key(page, 'Control+v', /1 element pasted/);
});

test('aligns and distributes by menu, and never stacks', async ({ page }) => {
  await openCopy(page, 'Aligned');
  for (const [i, tag] of ['RT-1', 'RT-3', 'RT-5'].entries())
    await element(page, tag).click({ modifiers: i === 0 ? [] : ['Shift'] });
  await page.getByRole('toolbar').getByRole('button', { name: 'Align' }).click();
  await page.getByRole('menuitem', { name: 'Distribute horizontally' }).click();
  await expect(status(page)).toHaveText(/distributed horizontally|stand like that already/);
  await page.getByRole('toolbar').getByRole('button', { name: 'Align' }).click();
  await page.getByRole('menuitem', { name: 'Align left' }).click();
  // they stand in one row: on one column they would lie on one another
  await expect(status(page)).toHaveText(/Nothing moved: .* would lie on/);
  await element(page, 'RT-1').focus();
  await key(page, 'm', /Moving 3 elements/);
  await page.keyboard.press('Escape');
  await element(page, 'RT-3').click();
  await key(page, 'm', /Moving/);
  await page.keyboard.press('ArrowUp');
  await key(page, 'Enter', /moved/);
  for (const tag of ['RT-1', 'RT-5']) await element(page, tag).click({ modifiers: ['Shift'] });
  await page.keyboard.press('Shift+F10');
  await page.getByRole('menuitem', { name: 'Align and distribute' }).click();
  await page.getByRole('menuitem', { name: 'Align bottom' }).click();
  await expect(status(page)).toHaveText(/3 elements aligned to the lowest/);
  await key(page, 'Control+z', /Undone: 3 elements aligned/);
});

test('bends a pipe with the mouse, by keys and by menu', async ({ page }) => {
  await openCopy(page, 'Bent');
  const pipe = element(page, 'CR-119');
  const line = () => pipe.locator('path.hit').getAttribute('d');
  const straight = await line();
  const piece = await onPiece(pipe);
  await page.mouse.move(piece.x, piece.y);
  await page.mouse.down();
  await page.mouse.move(piece.x + (piece.level ? 0 : 30), piece.y + (piece.level ? 30 : 0), { steps: 5 });
  await page.mouse.up();
  await expect(status(page)).toHaveText(/bend of pipe CR-119 moved/);
  expect(await line()).not.toBe(straight);
  expect(await isRightAngled(pipe)).toBe(true);
  // dragged back into line it leaves no bend
  await page.mouse.move(piece.x + (piece.level ? 0 : 30), piece.y + (piece.level ? 30 : 0));
  await page.mouse.down();
  await page.mouse.move(piece.x, piece.y, { steps: 5 });
  await page.mouse.up();
  await expect.poll(line).toBe(straight);

  await focus(page, 'CR-119');
  await key(page, 'b', /New bend in pipe CR-119/);
  await page.keyboard.press(piece.level ? 'ArrowDown' : 'ArrowRight');
  await key(page, 'Enter', /bend of pipe CR-119 moved/);
  expect(await line()).not.toBe(straight);
  expect(await isRightAngled(pipe)).toBe(true);
  await key(page, 'm', /Moving bend 1/);
  await key(page, 'Delete', /bend taken out|cannot do without/);
  await key(page, 'ContextMenu', /./);
  await page.getByRole('menuitem', { name: 'Take all bends out' }).click();
  await expect.poll(line).toBe(straight);
  await expect(pipe).toBeFocused();
});

test('parallel pipes stand apart, and a pipe follows its ends at right angles', async ({ page }) => {
  await openCopy(page, 'Parallel');
  await focus(page, 'CR-119');
  const first = await element(page, 'CR-119').locator('path.hit').getAttribute('d');
  await page.keyboard.press('PageUp');
  await key(page, 'p', /Pipe from/);
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('Escape');
  const name = (await element(page, 'CR-119').getAttribute('aria-label')) ?? '';
  const [, , to = ''] = /pipe from (\S+) to (\S+),/.exec(name) ?? [];
  await key(page, 'p', /Pipe from/);
  await page.keyboard.type(to);
  await key(page, 'Enter', /give its length and size/);
  const inspector = page.getByRole('complementary', { name: 'Inspector' });
  await inspector.getByLabel('Tag', { exact: true }).fill('CR-900');
  await inspector.getByLabel('Tag', { exact: true }).press('Enter');
  await expect(element(page, 'CR-900')).toBeFocused();
  const second = await element(page, 'CR-900').locator('path.hit').getAttribute('d');
  expect(second).not.toBe(first);
  expect(await isRightAngled(element(page, 'CR-900'))).toBe(true);
  expect(await element(page, 'CR-119').locator('path.hit').getAttribute('d')).toBe(first);
  await page.keyboard.press('PageUp');
  await key(page, 'm', /Moving/);
  await page.keyboard.press('ArrowUp');
  await key(page, 'Enter', /moved/);
  for (const tag of ['CR-119', 'CR-900']) expect(await isRightAngled(element(page, tag))).toBe(true);
});

test('commands by the right button: on an element, on the sheet', async ({ page }) => {
  await openCopy(page, 'Right button');
  await element(page, 'RT-4').click({ button: 'right' });
  await expect(page.getByRole('menu', { name: 'RT-4' })).toBeVisible();
  await page.getByRole('menuitem', { name: /^Duplicate/ }).click();
  await expect(status(page)).toHaveText(/1 element duplicated/);
  await page.keyboard.press('Control+z');
  const box = await sheet(page).boundingBox();
  if (box === null) throw new Error('no sheet');
  await page.mouse.click(box.x + 12, box.y + box.height - 12, { button: 'right' });
  await page.getByRole('menuitem', { name: 'Place a junction' }).click();
  await expect(status(page)).toHaveText(/New junction: give its tag and elevation/);
  await page.keyboard.press('Escape');
});

test('an overview stands where part of the network is out of sight, and looks elsewhere', async ({ page }) => {
  await openCopy(page, 'Overview');
  const map = page.locator('app-overview-map svg');
  await expect(map).toHaveCount(0);
  for (let i = 0; i < 4; i++) await page.getByRole('button', { name: 'Zoom in' }).click();
  await expect(map).toBeVisible();
  const frame = map.locator('rect');
  const before = await frame.getAttribute('x');
  await map.click({ position: { x: 20, y: 20 } });
  await expect(frame).not.toHaveAttribute('x', before ?? '');
  await sheet(page).locator('[tabindex="0"]').focus();
  const there = await frame.getAttribute('x');
  await key(page, 'Control+ArrowRight', /View moved right/);
  await expect(frame).not.toHaveAttribute('x', there ?? '');
  await page.keyboard.press('0');
  await expect(map).toHaveCount(0);
});

test('edits never move what they do not touch', async ({ page }) => {
  await openCopy(page, 'Still');
  const places = () =>
    sheet(page)
      .locator('[data-element]')
      .evaluateAll((marks) =>
        Object.fromEntries(
          marks.map((mark) => {
            const at = mark.querySelector('path.hit')?.getAttribute('d') ?? '';
            const matrix = mark instanceof SVGGraphicsElement ? mark.getScreenCTM() : null;
            return [mark.getAttribute('data-element') ?? '', `${at} ${String(matrix?.e)} ${String(matrix?.f)}`];
          }),
        ),
      );
  const before = await places();
  const untouched = async (touched: readonly string[]) => {
    const now = await places();
    for (const [id, place] of Object.entries(before))
      if (id in now && !touched.includes(id)) expect(now[id], id).toBe(place);
  };
  await focus(page, 'RT-5');
  await page.keyboard.press('Control+d');
  await expect(status(page)).toHaveText(/duplicated/);
  await untouched([]);
  await page.keyboard.press('m');
  await page.keyboard.press('Shift+ArrowDown');
  await page.keyboard.press('Enter');
  await untouched([]);
  await page.keyboard.press('Delete');
  await page.getByRole('dialog').getByRole('button', { name: 'Delete' }).click();
  await untouched([]);
  await focus(page, 'RT-5');
  await page.keyboard.press('Delete');
  await page.getByRole('dialog').getByRole('button', { name: 'Delete' }).click();
  await expect(element(page, 'RT-5')).toHaveCount(0);
  await untouched([]);
  await page.keyboard.press('Control+z');
  await untouched([]);
});

test('the keys are listed, grouped', async ({ page }) => {
  await signIn(page, 'designer');
  await openEmptyNetwork(page, 'Keys');
  await sheet(page).focus();
  await page.keyboard.press('?');
  const list = page.getByRole('dialog', { name: 'Keys of the drawing' });
  for (const words of ['Ctrl+C, Ctrl+X, Ctrl+V', 'B on a pipe', 'Shift+F10, Menu', 'Ctrl+arrow'])
    await expect(list.getByRole('rowheader', { name: words })).toBeVisible();
});

test('no axe findings with the menus, the overview and the list of keys open, in both themes', async ({ page }) => {
  await openCopy(page, 'Audited');
  const violations = async (...without: string[]) =>
    (await new AxeBuilder({ page }).disableRules(without).analyze()).violations.map(({ id, nodes }) => [
      id,
      nodes.map(({ target }) => target),
    ]);
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme, reducedMotion: 'reduce' });
    await page.getByRole('button', { name: 'Zoom in' }).click();
    await element(page, 'RT-5').click();
    await element(page, 'RT-7').click({ modifiers: ['Shift'] });
    expect(await violations(), `selection, ${colorScheme}`).toEqual([]);
    await page.keyboard.press('Shift+F10');
    await page.getByRole('menuitem', { name: 'Align and distribute' }).click();
    await expect(page.getByRole('menuitem', { name: 'Align left' })).toBeVisible();
    // menus lie over the page, in no landmark of it
    expect(await violations('region'), `menus, ${colorScheme}`).toEqual([]);
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
    await element(page, 'RT-5').focus();
    await page.keyboard.press('?');
    await expect(page.getByRole('dialog', { name: 'Keys of the drawing' })).toBeVisible();
    expect(await violations(), `keys, ${colorScheme}`).toEqual([]);
    await page.getByRole('button', { name: 'Close' }).click();
  }
});
