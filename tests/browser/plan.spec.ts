import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from '@playwright/test';
import { pngOf } from '../fixtures/images';
import { pdfOf } from '../fixtures/pdf';
import { copyOfDemo, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

// each stands by itself: two browsers share what would else be the longest file
test.describe.configure({ mode: 'parallel' });

/** Paper with a dark frame and two dark posts, 400 px apart in the middle of the sheet. */
const HALL = pngOf(800, 500, (x, y) => {
  const frame = x < 8 || y < 8 || x >= 792 || y >= 492;
  const post = Math.abs(y - 250) < 12 && (Math.abs(x - 200) < 12 || Math.abs(x - 600) < 12);
  return frame || post ? 40 : 255;
});

const panel = (page: Page) => page.locator('app-plan-panel');
const image = (page: Page) => page.locator('[appPlanLayer] image');
const status = (page: Page) => panel(page).locator('[role=status]').last();

async function choose(page: Page, name: string, buffer: Buffer): Promise<void> {
  await panel(page)
    .getByLabel('File of the plan')
    .setInputFiles({ name, mimeType: 'application/octet-stream', buffer });
}

async function openCopy(page: Page, name: string): Promise<string> {
  await signIn(page, 'designer');
  const network = await copyOfDemo(page, name);
  await page.goto(`${network}/drawing`);
  await savedAndSolved(page);
  return network;
}

/** Where the elements stand on the screen, to the pixel. */
const places = (page: Page) =>
  page.locator('[data-element]').evaluateAll((marks) =>
    marks.map((mark) => {
      const { x, y } = mark.getBoundingClientRect();
      return `${mark.getAttribute('data-element') ?? ''} ${x.toFixed(1)} ${y.toFixed(1)}`;
    }),
  );

async function axeFindsNothing(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html ?? ''}`)).toEqual([]);
  }
  await page.emulateMedia({ colorScheme: 'light' });
}

async function openAs(browser: Browser, person: 'viewer' | 'admin', address: string): Promise<Page> {
  const page = await (await browser.newContext()).newPage();
  await signIn(page, person);
  await page.goto(address);
  return page;
}

/** A point of the plan, given as shares of its width and height, on the screen. */
async function onScreen(page: Page, across: number, down: number): Promise<{ x: number; y: number }> {
  const box = await image(page).boundingBox();
  if (box === null) throw new Error('no plan on the screen');
  return { x: box.x + box.width * across, y: box.y + box.height * down };
}

test('a PNG lies under the drawing, is scaled by two points and moved, and moves no element', async ({ page }) => {
  const network = await openCopy(page, 'Over a plan');
  const before = await places(page);

  await test.step('put there', async () => {
    await page.getByRole('toolbar').getByRole('button', { name: 'Plan', exact: true }).click();
    await expect(panel(page).getByRole('heading', { name: 'Plan under the drawing' })).toBeFocused();
    await choose(page, 'hall.png', HALL);
    await expect(status(page)).toContainText('lies under the drawing');
    await expect(image(page)).toBeVisible();
    expect(await places(page)).toEqual(before);
    await axeFindsNothing(page);
  });

  await test.step('two points and a distance', async () => {
    await panel(page).getByRole('button', { name: 'Show two points and their distance' }).click();
    await expect(page.locator('app-plan-overlay .hand')).toBeFocused();
    for (const across of [0.25, 0.75]) {
      const { x, y } = await onScreen(page, across, 0.5);
      await page.mouse.click(x, y);
    }
    const field = panel(page).getByLabel('Distance between the two points');
    await expect(field).toBeFocused();
    await axeFindsNothing(page);
    await field.fill('40 ft');
    await field.press('Enter');
    await expect(status(page)).toContainText('The scale is set');
    // 40 ft over half the plan's width; a click is a pixel of the screen off at most
    await expect
      .poll(async () => {
        const { widthPx, unitsPerPixel, metresPerUnit = 0 } = await readPlan(page, network);
        return Math.abs(metresPerUnit / (12.192 / ((widthPx * unitsPerPixel) / 2)) - 1);
      })
      .toBeLessThan(0.01);
    await expect(page.locator('app-plan-overlay .bar text')).toContainText('ft on the plan');
    expect(await places(page)).toEqual(before);
  });

  await test.step('how strongly it shows, by keys', async () => {
    const slider = panel(page).getByLabel('How strongly it shows');
    await slider.focus();
    for (let i = 0; i < 4; i += 1) await slider.press('ArrowRight');
    await expect(image(page)).toHaveAttribute('opacity', '0.7');
    await expect.poll(async () => (await readPlan(page, network)).opacity).toBe(0.7);
  });

  await test.step('moved by arrows, put back, moved by a drag, and by typing', async () => {
    const start = await readPlan(page, network);
    await panel(page).getByRole('button', { name: 'Move it on the sheet' }).click();
    await page.keyboard.press('ArrowRight');
    await page.keyboard.press('Shift+ArrowDown');
    await expect(image(page)).toHaveAttribute('x', String(start.x + 1));
    await expect(image(page)).toHaveAttribute('y', String(start.y + 20));
    await page.keyboard.press('Escape');
    await expect(image(page)).toHaveAttribute('x', String(start.x));
    await panel(page).getByRole('button', { name: 'Move it on the sheet' }).click();
    const from = await onScreen(page, 0.5, 0.5);
    await page.mouse.move(from.x, from.y);
    await page.mouse.down();
    await page.mouse.move(from.x + 30, from.y + 10, { steps: 3 });
    await page.mouse.up();
    await panel(page).getByRole('button', { name: 'Leave it there' }).click();
    await expect.poll(async () => (await readPlan(page, network)).x).toBeGreaterThan(start.x);
    expect(await places(page)).toEqual(before);
    await panel(page).getByLabel('Left edge').fill('-120');
    await panel(page).getByLabel('Left edge').press('Enter');
    await expect.poll(async () => (await readPlan(page, network)).x).toBe(-120);
  });
});

test('a plan stays, what one does to it arrives at the other, a viewer sees it, and it goes when it is taken away', async ({
  page,
  browser,
}) => {
  const network = await openCopy(page, 'A plan for all');
  await choose(page, 'hall.png', HALL);
  await expect(image(page)).toBeVisible();
  await panel(page).getByLabel('Left edge').fill('-90');
  await panel(page).getByLabel('Left edge').press('Enter');
  await expect.poll(async () => (await readPlan(page, network)).x).toBe(-90);

  await test.step('a reload keeps it, and what someone else does to it arrives', async () => {
    await page.reload();
    await expect(image(page)).toHaveAttribute('x', '-90');
    const other = await openAs(browser, 'admin', `${network}/drawing`);
    await expect(image(other)).toBeVisible();
    await panel(other).getByLabel('Top edge').fill('60');
    await panel(other).getByLabel('Top edge').press('Enter');
    await expect(image(page)).toHaveAttribute('y', '60');
    await other.context().close();
  });

  await test.step('a viewer sees it, may hide it for themselves, and can do no more', async () => {
    const viewer = await openAs(browser, 'viewer', `${network}/drawing`);
    await expect(image(viewer)).toBeVisible();
    await expect(panel(viewer).getByRole('button')).toHaveCount(0);
    await expect(panel(viewer).getByRole('slider')).toHaveCount(0);
    await panel(viewer).getByLabel('Show it to me').uncheck();
    await expect(image(viewer)).toHaveCount(0);
    await viewer.reload();
    await expect(panel(viewer).getByLabel('Show it to me')).not.toBeChecked();
    await expect(image(viewer)).toHaveCount(0);
    await expect(image(page)).toBeVisible();
    await axeFindsNothing(viewer);
    await viewer.context().close();
  });

  await test.step('it is not printed', async () => {
    await page.emulateMedia({ media: 'print' });
    await expect(image(page)).toBeHidden();
    await page.emulateMedia({ media: 'screen' });
  });

  await test.step('taken away, after saying what that means', async () => {
    await panel(page).getByRole('button', { name: 'Take the plan away' }).click();
    await expect(panel(page)).toContainText('undo does not bring it back');
    await panel(page).getByRole('button', { name: 'Keep' }).click();
    await expect(image(page)).toBeVisible();
    await panel(page).getByRole('button', { name: 'Take the plan away' }).click();
    await panel(page).getByRole('button', { name: 'Take it away' }).click();
    await expect(image(page)).toHaveCount(0);
    await expect(status(page)).toContainText('The plan is gone');
  });
});

test('a page of a PDF is chosen, drawn in the browser and sent as an image; the PDF itself never leaves', async ({
  page,
}) => {
  const network = await openCopy(page, 'Over a page');
  const sent: string[] = [];
  page.on('request', (request) => {
    if (request.method() === 'PUT') sent.push(request.headers()['content-type'] ?? '');
  });
  await choose(page, 'rack.pdf', pdfOf(3));
  const pages = page.locator('app-plan-pages');
  await expect(pages).toContainText('of 3');
  await expect.poll(() => pages.locator('canvas').evaluate((canvas: HTMLCanvasElement) => canvas.width)).toBe(664);
  await pages.getByRole('button', { name: 'Next' }).press('Enter');
  await expect(pages.getByRole('spinbutton', { name: 'Page' })).toHaveValue('2');
  await axeFindsNothing(page);
  const third = pages.getByRole('spinbutton', { name: 'Page' });
  await third.fill('3');
  await third.press('Enter');
  await expect(pages.getByRole('button', { name: 'Put this page there' })).toBeEnabled();
  await pages.getByRole('button', { name: 'Put this page there' }).click();
  await expect(image(page)).toBeVisible();
  expect(sent).toEqual(['image/png']);
  const plan = await readPlan(page, network);
  expect(plan).toMatchObject({ name: 'rack.pdf, page 3', mediaType: 'image/png', widthPx: 4096 });
  // the hall of the third sheet, and paper beside it, where the sheet has them
  expect(await inkAt(page, [200 / 1190, 1 - 250 / 842])).toBeLessThan(60);
  expect(await inkAt(page, [300 / 1190, 1 - 250 / 842])).toBe(255);
});

test('what cannot lie under a drawing is refused in words, and the scale can be set without a mouse', async ({
  page,
}) => {
  await openCopy(page, 'Over nothing');
  const refused = async (name: string, content: Buffer, words: RegExp) => {
    await choose(page, name, content);
    await expect(panel(page).getByRole('alert')).toHaveText(words);
  };
  await refused(
    'hall.svg',
    Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'),
    /hall\.svg: It is an SVG\. Choose a PNG/,
  );
  await refused('hall.png', HALL.subarray(0, 300), /hall\.png: This PNG ends before its picture does/);
  await refused('rack.pdf', pdfOf(1).subarray(0, 60), /rack\.pdf: It is damaged/);
  const spoilt = Buffer.from(HALL);
  spoilt.fill(0, 60, 200);
  await refused('post.png', spoilt, /post\.png: The browser cannot show it/);
  await axeFindsNothing(page);
  await choose(page, 'hall.png', HALL);
  await expect(image(page)).toBeVisible();
  await expect(panel(page).getByRole('alert')).toHaveCount(0);
  await panel(page).getByRole('button', { name: 'Show two points and their distance' }).press('Enter');
  await page.keyboard.press('Enter');
  for (let i = 0; i < 5; i += 1) await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('Enter');
  const field = panel(page).getByLabel('Distance between the two points');
  await expect(field).toBeFocused();
  await page.keyboard.type('10 m');
  await page.keyboard.press('Enter');
  await expect(status(page)).toContainText('The scale is set');
});

interface ReadPlan {
  readonly x: number;
  readonly y: number;
  readonly unitsPerPixel: number;
  readonly metresPerUnit?: number;
  readonly opacity: number;
  readonly widthPx: number;
}
async function readPlan(page: Page, network: string): Promise<ReadPlan> {
  const answer = await page.request.get(`/api/networks/${network.split('/').at(-1) ?? ''}/plan`);
  return ((await answer.json()) as { plan: ReadPlan }).plan;
}

/** The grey level of the image at shares of its width and height. */
function inkAt(page: Page, [across, down]: readonly [number, number]): Promise<number> {
  return image(page).evaluate(
    async (node, place) => {
      const bitmap = new Image();
      bitmap.src = node.getAttribute('href') ?? '';
      await bitmap.decode();
      const canvas = document.createElement('canvas');
      [canvas.width, canvas.height] = [bitmap.width, bitmap.height];
      const context = canvas.getContext('2d');
      context?.drawImage(bitmap, 0, 0);
      const at = [Math.round(place.across * bitmap.width), Math.round(place.down * bitmap.height)] as const;
      return context?.getImageData(at[0], at[1], 1, 1).data[0] ?? -1;
    },
    { across, down },
  );
}
