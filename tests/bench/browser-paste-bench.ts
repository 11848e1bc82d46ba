import { type Desk, measured } from './browser-window';

/** From the keys of the paste to the preview, and from its button to the rows in the list. */
export async function pasteRows(desk: Desk, path: string, rows: number, barMs: number): Promise<string> {
  const page = await desk.freshWindow();
  await page.goto(`${desk.address}${path}/lists?list=traps`);
  const grid = page.getByRole('grid');
  await grid.waitFor();
  await page.waitForLoadState('networkidle');
  const cells = Array.from(
    { length: rows },
    (_, i) => `P-${i + 1}\tHall\t5\t75\t${100 + i}\tInverted bucket\t3\tConstant`,
  );
  await page.evaluate(
    (text) => navigator.clipboard.writeText(text),
    ['Tag\tArea\tElevation\tInlet\tLoad\tType\tSizing factor\tService', ...cells].join('\n'),
  );
  await grid.focus();
  await page.evaluate(watchFor, `${rows} rows`);
  await page.keyboard.press('Control+V');
  const previewMs = await measured(page);
  const take = page.getByRole('dialog').getByRole('button', { name: /^Add \d+/ });
  await take.focus();
  await page.evaluate(watchFor, `Traps ${rows}`);
  await page.keyboard.press('Enter');
  const takenMs = await measured(page);
  await page.context().close();
  return (
    `Pasting ${rows} rows: ${previewMs.toFixed(0)} ms to the preview, ${takenMs.toFixed(0)} ms from its button to the list, ` +
    `${(previewMs + takenMs).toFixed(0)} ms together (bar ${barMs} ms)`
  );
}

/** Runs in the page: the time from the next key until some words have been painted. */
function watchFor(words: string): void {
  window.measuredMs = new Promise<number>((resolve) => {
    addEventListener(
      'keydown',
      () => {
        const from = performance.now();
        const look = (): void => {
          const there = document.body.innerText.replace(/\s+/g, ' ').includes(words);
          if (!there) requestAnimationFrame(look);
          else requestAnimationFrame(() => setTimeout(() => resolve(performance.now() - from)));
        };
        requestAnimationFrame(look);
      },
      { capture: true, once: true },
    );
  });
}
