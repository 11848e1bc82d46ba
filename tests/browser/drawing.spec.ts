import { execFile } from 'node:child_process';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import type { Page } from '@playwright/test';
import { openEmptyNetwork, savedAndSolved, signIn } from './people';
import { expect, test } from './violations';

const inspector = (page: Page) => page.getByRole('complementary', { name: 'Inspector' });
const element = (page: Page, tag: string) =>
  page.getByRole('application').getByRole('button', { name: new RegExp(`^${tag},`) });

/** Fills the form of a new element and confirms it from the keyboard. */
async function give(
  page: Page,
  fields: Readonly<Record<string, string>>,
  choices: Readonly<Record<string, string>> = {},
): Promise<void> {
  for (const [label, text] of Object.entries(fields))
    await inspector(page).getByLabel(label, { exact: true }).fill(text);
  for (const [label, option] of Object.entries(choices)) {
    await inspector(page).getByLabel(label, { exact: true }).selectOption({ label: option });
  }
  const [last] = Object.keys(fields).slice(-1);
  await inspector(page)
    .getByLabel(last ?? 'Tag', { exact: true })
    .press('Enter');
}

const SIZE = { 'Standard and schedule': 'ASME B36.10M, 40', Size: '1 in (DN 25)' };

/** 10 ft of rise between two traps at the floor and the header: half a psi a foot, 5.0 psi (common practice). */
async function readsFivePsiOfLift(page: Page, tag: string): Promise<void> {
  await savedAndSolved(page);
  await page.getByRole('link', { name: 'Lift & ledger' }).click();
  await page.getByRole('link', { name: new RegExp(tag) }).click();
  const closing = page.getByRole('row', { name: /Back pressure/ }).last();
  await expect(closing).toContainText('5.0');
  await page.getByRole('link', { name: 'Drawing' }).first().click();
}

async function undoRedoReload(page: Page): Promise<void> {
  await expect(element(page, 'CR-3')).toBeVisible();
  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect(element(page, 'CR-3')).toHaveCount(0);
  await page.getByRole('button', { name: /^Redo/ }).click();
  await expect(element(page, 'CR-3')).toBeVisible();
  await savedAndSolved(page);
  await page.reload();
  for (const tag of ['R-1', 'J-1', 'TR-1', 'TR-2', 'CR-1', 'CR-2', 'CR-3'])
    await expect(element(page, tag)).toBeVisible();
  await savedAndSolved(page);
}

/** The command line and the screen answer the same for the file that the server gives back. */
async function solvesTheSameFromTheCommandLine(page: Page): Promise<void> {
  const networkId = /networks\/([^/]+)/.exec(page.url())?.[1] ?? '';
  const file = await (await page.request.get(`/api/networks/${networkId}/file`)).text();
  const path = join(mkdtempSync(join(tmpdir(), 'riseback-drawn-')), 'drawn.json');
  writeFileSync(path, file);
  const { stdout } = await promisify(execFile)('npm', ['run', '--silent', 'solve', '--', path], { maxBuffer: 1e8 });
  const results = (await (await page.request.get(`/api/networks/${networkId}/results`)).json()) as {
    state: string;
    cases: { result: unknown }[];
  };
  expect(results.state).toBe('finished');
  expect(JSON.parse(stdout)).toEqual(results.cases[0]?.result);
}

test('a network drawn with the mouse', async ({ page }) => {
  await signIn(page, 'designer');
  await openEmptyNetwork(page, 'Drawn with the mouse');
  const sheet = await page.getByRole('application').boundingBox();
  if (sheet === null) throw new Error('no sheet');
  const at = (right: number, down: number) => ({ x: sheet.x + right, y: sheet.y + down });
  const place = async (tool: string, right: number, down: number, fields: Readonly<Record<string, string>>) => {
    await page
      .getByRole('toolbar')
      .getByRole('button', { name: new RegExp(`^${tool}`) })
      .click();
    const { x, y } = at(right, down);
    await page.mouse.click(x, y);
    await give(page, fields);
  };
  await place('Receiver', 760, 200, { Tag: 'R-1', Elevation: '10 ft' });
  await place('Junction', 480, 200, { Tag: 'J-1', Elevation: '10 ft' });
  await place('Trap', 360, 400, { Tag: 'TR-1', Elevation: '0 ft', 'Inlet pressure': '75 psig', Load: '400 lb/h' });
  await place('Trap', 560, 400, { Tag: 'TR-2', Elevation: '0 ft', 'Inlet pressure': '75 psig', Load: '300 lb/h' });
  const connect = async (from: string, to: string, tag: string, length: string) => {
    await page.getByRole('toolbar').getByRole('button', { name: /^Pipe/ }).click();
    await element(page, from).click();
    await element(page, to).click();
    await give(page, { Tag: tag, Length: length }, SIZE);
    await expect(element(page, tag)).toBeVisible();
  };
  await connect('TR-1', 'J-1', 'CR-1', '20 ft');
  await connect('TR-2', 'J-1', 'CR-2', '6.1 m');
  await connect('J-1', 'R-1', 'CR-3', '100 ft');
  await readsFivePsiOfLift(page, 'TR-1');
  await undoRedoReload(page);
  await solvesTheSameFromTheCommandLine(page);
});

test('the same network drawn from the keyboard alone', async ({ page }) => {
  await signIn(page, 'designer');
  await openEmptyNetwork(page, 'Drawn from the keyboard');
  const status = page.locator('main [role=status]').last();
  const key = async (name: string, answer: RegExp) => {
    await page.keyboard.press(name);
    await expect(status).toHaveText(answer);
  };
  await page.getByRole('application').focus();
  await key('r', /New receiver/);
  await give(page, { Tag: 'R-1', Elevation: '10 ft' });
  await expect(element(page, 'R-1')).toBeFocused();
  await key('j', /New junction/);
  await give(page, { Tag: 'J-1', Elevation: '10 ft' });
  await expect(element(page, 'J-1')).toBeFocused();
  const pipeTo = async (tag: string, to: string, length: string) => {
    await key('p', /Pipe from/);
    await page.keyboard.type(to);
    await key('Enter', /give its length and size/);
    await give(page, { Tag: tag, Length: length }, SIZE);
    await expect(element(page, tag)).toBeFocused();
  };
  await pipeTo('CR-3', 'R-1', '100 ft');
  for (const [tag, pipe, load, length] of [
    ['TR-1', 'CR-1', '400 lb/h', '20 ft'],
    ['TR-2', 'CR-2', '300 lb/h', '20 ft'],
  ] as const) {
    await key('t', /New trap/);
    await give(page, { Tag: tag, Elevation: '0 ft', 'Inlet pressure': '75 psig', Load: load });
    await expect(element(page, tag)).toBeFocused();
    await pipeTo(pipe, 'J-1', length);
  }
  // Page Down goes with the flow, End to the receiver; what is read out says what stands behind a trap.
  await page.keyboard.press('Home');
  await expect(page.locator(':focus')).toHaveAccessibleName(/^TR-\d, trap, elevation 0 ft/);
  await page.keyboard.press('PageDown');
  await expect(page.locator(':focus')).toHaveAccessibleName(/^CR-/);
  await page.keyboard.press('End');
  await expect(element(page, 'R-1')).toBeFocused();
  await savedAndSolved(page);
  await expect(element(page, 'TR-1')).toHaveAccessibleName(/psig behind it/);
  // Enter opens the fields, Escape returns.
  await page.keyboard.press('Enter');
  await expect(inspector(page).getByRole('tab', { name: 'Inputs' })).toHaveAttribute('aria-selected', 'true');
  await page.keyboard.press('Escape');
  await expect(element(page, 'R-1')).toBeFocused();
  // Move a trap one grid step, set it down, take it back.
  await page.keyboard.press('Home');
  await key('m', /[Mm]ov/);
  await page.keyboard.press('ArrowDown');
  await key('Enter', /moved/);
  await key('Control+z', /Undone/);
  await key('Control+Shift+z', /Done again/);
  await key('Control+z', /Undone/);
  // Delete says what goes along and asks.
  await page.keyboard.press('Delete');
  await expect(page.getByRole('dialog')).toContainText(/CR-/);
  await page.keyboard.press('Escape');
  await expect(page.getByRole('dialog')).toHaveCount(0);
  await readsFivePsiOfLift(page, 'TR-1');
  await solvesTheSameFromTheCommandLine(page);
});
