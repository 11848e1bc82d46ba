import type { Page } from '@playwright/test';
import { percentile } from './browser-figures';
import { type Desk, measured, pageCpuSeconds } from './browser-window';

const VISITS = 3;
const MOVES = 120;
const EDITS = 25;
const WARM_UPS = 5;
/** Between edits a person thinks; the bands of the last one are computed meanwhile. */
const THINKS_MS = 500;

/** From navigation until every element is painted and one of them can take the keyboard. */
export async function openingTime(desk: Desk, path: string, elements: number, barS: number): Promise<string> {
  const fresh: Opening[] = [];
  const used: Opening[] = [];
  for (let visit = 0; visit < VISITS; visit++) {
    const first = await desk.freshWindow();
    fresh.push(await opening(first, desk.address + path, elements));
    await first.context().close();
    const again = await desk.usedWindow('/sites');
    used.push(await opening(again, desk.address + path, elements));
    await again.context().close();
  }
  return (
    `${elements} elements interactive: ${seconds(used)} on a visit, ${seconds(fresh)} on the first with an empty store ` +
    `(median of ${VISITS}; bar ${barS} s)`
  );
}

interface Opening {
  readonly wallS: number;
  readonly cpuS: number;
}

async function opening(page: Page, address: string, elements: number): Promise<Opening> {
  await page.addInitScript((wanted) => {
    const look = (): void => {
      const marks = document.querySelectorAll('[data-element]').length;
      const takesFocus = document.querySelector('[data-element][tabindex="0"]') !== null;
      if (marks < wanted || !takesFocus) requestAnimationFrame(look);
      // a frame later it has been painted
      else requestAnimationFrame(() => setTimeout(() => (window.measuredMs = performance.now())));
    };
    requestAnimationFrame(look);
  }, elements);
  await page.goto(address);
  await page.waitForFunction(() => window.measuredMs !== undefined, undefined, { timeout: 60_000 });
  const wallS = (await measured(page)) / 1000;
  return { wallS, cpuS: await pageCpuSeconds(page) };
}

function seconds(openings: readonly Opening[]): string {
  const middle = (pick: (opening: Opening) => number) => percentile(openings.map(pick), 50).toFixed(2);
  return `${middle(({ wallS }) => wallS)} s (processor ${middle(({ cpuS }) => cpuS)} s)`;
}

/** Frames while one trap is dragged about, with at least one move of the mouse to a frame. */
export async function dragFrames(desk: Desk, path: string, elements: number, barMs: number): Promise<string> {
  const page = await desk.freshWindow();
  await openDrawing(page, desk.address + path, elements);
  const trap = page.locator('[data-element="T100"]');
  const box = await trap.boundingBox();
  if (box === null) throw new Error('the trap to be dragged is not on the drawing');
  const at = { x: box.x + box.width / 2, y: box.y + box.height / 2 };
  await page.mouse.move(at.x, at.y);
  await page.mouse.down();
  await page.mouse.move(at.x + 8, at.y + 8);
  await page.evaluate(() => {
    const record = { frames: [] as number[], moves: 0, on: true };
    Object.assign(globalThis, { record });
    addEventListener('pointermove', () => (record.moves += 1), true);
    let before = performance.now();
    const frame = (now: number): void => {
      record.frames.push(now - before);
      before = now;
      if (record.on) requestAnimationFrame(frame);
    };
    requestAnimationFrame(frame);
  });
  // one after the other: sent all at once they would be taken together as a few
  for (let i = 0; i < MOVES; i++) {
    await page.mouse.move(at.x + 60 * Math.sin(i / 8), at.y + 40 * Math.cos(i / 11) + i / 4);
  }
  const { frames, moves } = await page.evaluate(() => {
    const { record } = globalThis as unknown as { record: { frames: number[]; moves: number; on: boolean } };
    record.on = false;
    return record;
  });
  await page.keyboard.press('Escape');
  await page.mouse.up();
  await page.context().close();
  const counted = frames.slice(1);
  return (
    `Dragging a trap among ${elements} elements, all in sight: frame p50 ${percentile(counted, 50).toFixed(1)} ms, ` +
    `p95 ${percentile(counted, 95).toFixed(1)} ms (bar ${barMs} ms; ${counted.length} frames, ${moves} moves)`
  );
}

/** From the key that ends an edit until the pressure it leads to has been painted, by way of the server. */
export async function editToPressures(desk: Desk, path: string, pipes: number, barMs: number): Promise<string> {
  const page = await desk.freshWindow();
  await page.goto(`${desk.address}${path}?element=T50`);
  await page.getByText(/^Solved \d\d:\d\d/).waitFor();
  const inspector = page.getByRole('complementary', { name: 'Inspector' });
  await inspector.getByRole('tab', { name: 'Inputs' }).click();
  const field = inspector.getByLabel('Elevation', { exact: true });
  const times: number[] = [];
  for (let edit = 0; edit < WARM_UPS + EDITS; edit++) {
    await field.fill(`${-1 - (edit % 9)} ft`);
    await page.evaluate(watchPressure, 'T50');
    await field.press('Enter');
    const ms = await measured(page);
    if (edit >= WARM_UPS) times.push(ms);
    await page.waitForTimeout(THINKS_MS);
  }
  await page.context().close();
  return (
    `From an edit to its pressures on the screen, ${pipes} pipes, server included: p50 ${percentile(times, 50).toFixed(0)} ms, ` +
    `p95 ${percentile(times, 95).toFixed(0)} ms (bar ${barMs} ms; ${times.length} edits)`
  );
}

/** Runs in the page. The name of an element carries its pressure and is written in the same rendering as what is drawn. */
function watchPressure(id: string): void {
  const mark = document.querySelector(`[data-element="${id}"]`);
  const pressure = (): string => /[\d.]+ psig/.exec(mark?.getAttribute('aria-label') ?? '')?.[0] ?? '';
  const before = pressure();
  window.measuredMs = new Promise<number>((resolve) => {
    addEventListener(
      'keydown',
      () => {
        const from = performance.now();
        const look = (): void => {
          if (pressure() === before) requestAnimationFrame(look);
          else requestAnimationFrame(() => setTimeout(() => resolve(performance.now() - from)));
        };
        requestAnimationFrame(look);
      },
      { capture: true, once: true },
    );
  });
}

async function openDrawing(page: Page, address: string, elements: number): Promise<void> {
  await page.goto(address);
  await page.waitForFunction((wanted) => document.querySelectorAll('[data-element]').length >= wanted, elements, {
    timeout: 60_000,
  });
  await page.getByText(/^Solved \d\d:\d\d/).waitFor({ timeout: 60_000 });
  await page.waitForLoadState('networkidle');
}
